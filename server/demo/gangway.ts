import type { DemoSystem } from './DemoSystem'
import { gangwayBlocks } from './gangwayBlocks'

/**
 * An invented motion-compensated access gangway: four hydraulic axes with a rate loop inside a position loop each.
 * Hydraulic natural frequencies fall with the stroke (longer oil columns, more inertia), structural modes of the boom too;
 * all numbers are made up to be of the size such a machine has.
 */
export const gangway: DemoSystem = {
  name: 'Tern 30 access gangway',
  customer: 'Norrhavn Offshore',
  documentNumber: 'WB-0042',
  frequencyUnit: 'rad/s',
  description: 'Motion-compensated offshore access gangway, 18 m to 30 m, four hydraulic axes: slew, luff, telescope and roll of the cabin. Each axis has a rate loop inside a position loop that follows the vessel motion compensator.',
  hasCustomerAccount: true,
  conditions: [
    { code: 'C1', name: 'Retracted, calm', coordinates: [{ name: 'stroke', unit: 'm', value: 18 }, { name: 'payload', unit: 'kg', value: 0 }, { name: 'wave height', unit: 'm', value: 0.5 }], tags: ['calm'], notes: '' },
    { code: 'C2', name: 'Mid-stroke, calm', coordinates: [{ name: 'stroke', unit: 'm', value: 24 }, { name: 'payload', unit: 'kg', value: 0 }, { name: 'wave height', unit: 'm', value: 0.5 }], tags: ['calm'], notes: '' },
    { code: 'C3', name: 'Extended, calm', coordinates: [{ name: 'stroke', unit: 'm', value: 30 }, { name: 'payload', unit: 'kg', value: 0 }, { name: 'wave height', unit: 'm', value: 0.5 }], tags: ['calm', 'extended'], notes: '' },
    { code: 'C4', name: 'Extended, sea state 5', coordinates: [{ name: 'stroke', unit: 'm', value: 30 }, { name: 'payload', unit: 'kg', value: 150 }, { name: 'wave height', unit: 'm', value: 3.2 }], tags: ['sea', 'extended'], notes: 'Warm oil, accumulators at working pressure.' },
    { code: 'C5', name: 'Payload 600 kg', coordinates: [{ name: 'stroke', unit: 'm', value: 26 }, { name: 'payload', unit: 'kg', value: 600 }, { name: 'wave height', unit: 'm', value: 1.5 }], tags: ['payload'], notes: 'Load transfer, landing cone not engaged.' },
  ],
  parameters: [
    { name: 'kSlR', unit: '1/s', notes: 'slew rate gain', values: [6.5, 6.5, 6.5, 6.5, 6.5] },
    { name: 'kSlP', unit: '1/s', notes: 'slew position gain', values: [6.6, 6.6, 6.6, 6.6, 6.6] },
    { name: 'kLuR', unit: '1/s', notes: 'luff rate gain', values: [7.5, 7.5, 7.5, 7.5, 7.5] },
    { name: 'kLuP', unit: '1/s', notes: 'luff position gain', values: [3.4, 3.4, 3.4, 3.4, 3.4] },
    { name: 'kTeR', unit: '1/s', notes: 'telescope rate gain', values: [11, 11, 11, 11, 11] },
    { name: 'kTeP', unit: '1/s', notes: 'telescope position gain', values: [4, 4, 4, 4, 4] },
    { name: 'kRoR', unit: '1/s', notes: 'roll rate gain', values: [13, 13, 13, 13, 13] },
    { name: 'kRoP', unit: '1/s', notes: 'roll position gain', values: [3.5, 3.5, 3.5, 3.5, 3.5] },
    { name: 'whSl', unit: 'rad/s', notes: 'slew hydraulic natural frequency', values: [34, 29, 24, 23.4, 26] },
    { name: 'whLu', unit: 'rad/s', notes: 'luff hydraulic natural frequency', values: [42, 35, 29, 28.3, 31] },
    { name: 'whTe', unit: 'rad/s', notes: 'telescope hydraulic natural frequency', values: [58, 50, 43, 42, 40] },
    { name: 'whRo', unit: 'rad/s', notes: 'roll hydraulic natural frequency', values: [64, 60, 56, 55, 52] },
    { name: 'zh', unit: '', notes: 'hydraulic damping with pressure feedback', values: [0.36, 0.34, 0.32, 0.38, 0.33] },
    { name: 'wLat', unit: 'rad/s', notes: 'first lateral mode of the boom', values: [72, 62, 53, 51.5, 57] },
    { name: 'wVer', unit: 'rad/s', notes: 'first vertical mode of the boom', values: [96, 82, 70, 68, 74] },
    { name: 'wAx', unit: 'rad/s', notes: 'axial mode of the telescope drive', values: [150, 128, 110, 107, 112] },
    { name: 'wTor', unit: 'rad/s', notes: 'torsion mode of the boom tip', values: [140, 124, 110, 108, 102] },
    { name: 'zTor', unit: '', notes: 'damping of the torsion mode', values: [0.012, 0.011, 0.010, 0.010, 0.011] },
  ],
  blocks: gangwayBlocks,
  loops: [
    {
      code: 'SL-R', name: 'Slew rate', axis: 'slew', breakPoint: 'servo valve command of the slew motor', breakAt: { block: 'SlValve', side: 'input' }, loopStates: { 'SL-P': 'open' }, notes: '',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CSlR*SlValve*HydSl*BoomSl*SlGyro*TCtrl*TSl' } },
    },
    {
      code: 'SL-P', name: 'Slew position', axis: 'slew', breakPoint: 'slew rate command', breakAt: { block: 'RateSl', side: 'input' }, loopStates: { 'SL-R': 'closed' }, notes: 'The closed rate loop stands in the model as a second-order lag at 0.62 of the hydraulic frequency.',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CSlP*RateSl*TipSl*Int*TCtrl*TSl*TRef' } },
    },
    {
      code: 'LU-R', name: 'Luff rate', axis: 'luff', breakPoint: 'servo valve command of the luff cylinders', breakAt: { block: 'LuValve', side: 'input' }, loopStates: { 'LU-P': 'open' }, notes: '',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CLuR*LuValve*HydLu*BoomLu*TCtrl*TLu' } },
      sweeps: {
        conditionCodes: ['C1', 'C2', 'C3', 'C4', 'C5'], name: 'sweep 1', reasonModelIsSetAside: 'measured on the first article', from: 0.8, to: 140, pointsPerDecade: 110, fine: [{ around: 'wVer', from: 0.9, to: 1.25, points: 90 }],
        truth: { whLu: 0.985, wVer: 1.012, kLuR: 1.03 }, averages: 64, noise: 0.0006, seed: 4201, amplitude: 'valve command 4 % of full scale, 0 to peak',
      },
    },
    {
      code: 'LU-P', name: 'Luff position', axis: 'luff', breakPoint: 'luff rate command', breakAt: { block: 'RateLu', side: 'input' }, loopStates: { 'LU-R': 'closed' }, notes: '',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CLuP*RateLu*TipLu*Int*TCtrl*TLu*TRefLR' } },
    },
    {
      code: 'TE-R', name: 'Telescope rate', axis: 'telescope', breakPoint: 'servo valve command of the telescope winch', breakAt: { block: 'TeValve', side: 'input' }, loopStates: { 'TE-P': 'open' }, notes: '',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CTeR*TeValve*HydTe*BoomTe*TCtrl*TTe' } },
      sweeps: {
        conditionCodes: ['C2', 'C3'], name: 'sweep 1', reasonModelIsSetAside: 'measured on the first article', from: 1, to: 220, pointsPerDecade: 120, fine: [{ around: 'wAx', from: 0.9, to: 1.1, points: 80 }],
        truth: { whTe: 0.97, wAx: 0.993 }, averages: 64, noise: 0.0005, seed: 4207, amplitude: 'valve command 5 % of full scale, 0 to peak',
      },
    },
    {
      code: 'TE-P', name: 'Telescope position', axis: 'telescope', breakPoint: 'telescope rate command', breakAt: { block: 'RateTe', side: 'input' }, loopStates: { 'TE-R': 'closed' }, notes: 'Two integrators in the compensator: the loop is conditionally stable, the gain may not fall far.',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CTeP*RateTe*Int*TCtrl*TTe*TRef' } },
    },
    {
      code: 'RO-R', name: 'Roll rate', axis: 'roll', breakPoint: 'servo valve command of the roll actuator', breakAt: { block: 'HydRo', side: 'input' }, loopStates: { 'RO-P': 'open' }, notes: 'The torsion mode of the boom tip lifts the gain above one a second time.',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CRoR*HydRo*BoomRo*TCtrl*TRo' } },
    },
    {
      code: 'RO-P', name: 'Roll position', axis: 'roll', breakPoint: 'roll rate command', breakAt: { block: 'RateRo', side: 'input' }, loopStates: { 'RO-R': 'closed' }, notes: '',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CRoP*RateRo*TipRo*Int*TCtrl*TRo*TRefLR' } },
    },
  ],
  report: {
    title: 'Stability margins of all axes',
    documentNumber: 'WB-0042',
    remarks: 'Every axis is looked at in five operating conditions. Rate loops are opened at the servo valve command, position loops at the rate command.\n\n**Open points**\n\n- SL-P passes its gain and phase margins with the boom extended, but comes nearer to the critical point than 0.5 between the two crossovers.\n- RO-R: the torsion mode governs, not the first crossover. A notch is under study.',
    loopRemarks: {
      'SL-P': 'The smallest return difference lies between the gain crossover and the phase crossover: neither margin shows it.',
      'TE-P': 'Conditionally stable. In saturation the effective gain falls: the anti-windup must hold the second integrator.',
      'RO-R': 'The secondary gain crossover at the torsion mode sets the phase margin in every condition but the first.',
    },
  },
  revisions: [
    { changeNote: 'First issue, for the design review', set: { kSlP: [7.2, 7.2, 7.2, 7.2, 7.2], kRoR: [14.5, 14.5, 14.5, 14.5, 14.5] } },
    { changeNote: 'Slew position gain lowered to 6.6 1/s, roll rate gain to 13 1/s', set: { kSlP: [6.6, 6.6, 6.6, 6.6, 6.6], kRoR: [13, 13, 13, 13, 13] } },
  ],
}
