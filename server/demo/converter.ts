import type { DemoBlock, DemoSystem } from './DemoSystem'

/** 50 kHz switching and sampling, one sample of computation: all numbers are made up to be of the size such a converter has. */
const sampleTime = 2e-5

const typed = (name: string, role: DemoBlock['role'], units: [string, string], expression: string, notes: string, sampled = false): DemoBlock =>
  ({ name, role, unitIn: units[0], unitOut: units[1], notes, gain: { kind: 'expression', expression, ...(sampled && { sampleTime }) } })

/** A digitally controlled 400 V to 48 V converter: an inner current loop and an outer voltage loop, both sampled at 50 kHz, at three loads. */
export const converter: DemoSystem = {
  name: 'Plover 48 V converter',
  customer: 'Norrhavn Offshore',
  documentNumber: 'WB-0051',
  frequencyUnit: 'Hz',
  description: 'Digitally controlled supply of the gangway drives: average current control inside a voltage loop, both sampled at 50 kHz with one sample of computation delay.',
  hasCustomerAccount: false,
  conditions: [
    { code: 'L1', name: 'Light load', coordinates: [{ name: 'load', unit: 'ohm', value: 20 }], tags: ['light'], notes: '' },
    { code: 'L2', name: 'Nominal load', coordinates: [{ name: 'load', unit: 'ohm', value: 5 }], tags: [], notes: '' },
    { code: 'L3', name: 'Full load', coordinates: [{ name: 'load', unit: 'ohm', value: 2 }], tags: ['full'], notes: 'Inductor saturates by a fifth.' },
  ],
  parameters: [
    { name: 'kI', unit: 'V/A', notes: 'current controller gain', values: [3.4, 3.4, 3.4] },
    { name: 'kV', unit: 'A/V', notes: 'voltage controller gain', values: [1.2, 1.2, 1.2] },
    { name: 'Lf', unit: 'H', notes: 'inductance', values: [180e-6, 180e-6, 144e-6] },
    { name: 'Rf', unit: 'ohm', notes: 'resistance of the inductor and the switches', values: [0.05, 0.05, 0.05] },
    { name: 'Co', unit: 'F', notes: 'output capacitance', values: [470e-6, 470e-6, 470e-6] },
    { name: 'Ro', unit: 'ohm', notes: 'load', values: [20, 5, 2] },
  ],
  blocks: [
    typed('CI', 'controller', ['A', 'V'], 'kI*(z-0.975)/(z-1)', 'current controller', true),
    typed('CV', 'controller', ['V', 'A'], 'kV*(z-0.995)/(z-1)', 'voltage controller', true),
    { name: 'Tc', role: 'delay', unitIn: 'V', unitOut: 'V', notes: 'computation, one sample', gain: { kind: 'deadTime', deadTime: 1, unit: 'samples' } },
    { name: 'H', role: 'hold', unitIn: 'V', unitOut: 'V', notes: 'the bridge, updated once a sample', gain: { kind: 'hold', hold: 'zeroOrder', sampleTime } },
    typed('GL', 'plant', ['V', 'A'], '1/(Lf*s+Rf)', 'inductor'),
    typed('GC', 'plant', ['A', 'V'], 'Ro/(Ro*Co*s+1)', 'output capacitor with the load'),
  ],
  loops: [
    {
      code: 'CU', name: 'Inductor current', axis: 'converter', breakPoint: 'duty cycle command', breakAt: { block: 'Tc', side: 'input' }, loopStates: { VO: 'open' }, notes: '',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CI*Tc*H*GL' } },
    },
    {
      code: 'VO', name: 'Output voltage', axis: 'converter', breakPoint: 'current command', breakAt: { block: 'CV', side: 'output' }, loopStates: { CU: 'closed' }, notes: 'The closed current loop stands in the expression as it is, L/(1 + L).',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CV * (CI*Tc*H*GL)/(1 + CI*Tc*H*GL) * (H*GC)' } },
    },
  ],
  report: {
    title: 'Stability margins of the 48 V supply',
    documentNumber: 'WB-0051',
    remarks: 'Both loops at three loads, sampled at 50 kHz.',
    loopRemarks: {},
  },
  revisions: [{ changeNote: 'First issue', set: {} }],
}
