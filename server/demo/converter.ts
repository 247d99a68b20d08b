import type { DemoBlock, DemoSystem } from './DemoSystem'

/** 50 kHz switching and sampling, one sample of computation: all numbers are made up to be of the size such a converter has. */
const sampleTime = 2e-5

const typed = (name: string, role: DemoBlock['role'], units: [string, string], expression: string, notes: string, sampledAt?: number): DemoBlock =>
  ({ name, role, unitIn: units[0], unitOut: units[1], notes, gain: { kind: 'expression', expression, ...(sampledAt !== undefined && { sampleTime: sampledAt }) } })

/** s; the motor bridge switches at 10 kHz and is updated at both edges */
const motorSampleTime = 5e-5

/**
 * A digitally controlled 400 V to 48 V converter: an inner current loop and an outer voltage loop, both sampled at 50 kHz, at three loads; and the current loop of the
 * motor bridge behind it, whose pulse-width modulator is updated twice a period: with 1.5 samples of delay in all, the continuous approximation is wrong by more than 3 deg.
 */
export const converter: DemoSystem = {
  name: 'Plover 48 V converter',
  customer: 'Norrhavn Offshore',
  documentNumber: 'WB-0051',
  frequencyUnit: 'Hz',
  description: 'Digitally controlled supply of the gangway drives: average current control inside a voltage loop, both sampled at 50 kHz with one sample of computation delay; behind it the current loop of the motor bridge at 20 kHz.',
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
    { name: 'kM', unit: 'V/A', notes: 'motor current gain', values: [11, 11, 11] },
    { name: 'fM', unit: 'Hz', notes: 'corner of the integral part of the motor current controller', values: [60, 60, 60] },
    { name: 'LM', unit: 'H', notes: 'inductance of the motor', values: [1e-3, 1e-3, 1e-3] },
    { name: 'RM', unit: 'ohm', notes: 'resistance of the motor, warm at full load', values: [0.1, 0.1, 0.13] },
  ],
  blocks: [
    typed('CI', 'controller', ['A', 'V'], 'kI*(z-0.975)/(z-1)', 'current controller', sampleTime),
    typed('CV', 'controller', ['V', 'A'], 'kV*(z-0.995)/(z-1)', 'voltage controller', sampleTime),
    { name: 'Tc', role: 'delay', unitIn: 'V', unitOut: 'V', notes: 'computation, one sample', gain: { kind: 'deadTime', deadTime: 1, unit: 'samples' } },
    { name: 'H', role: 'hold', unitIn: 'V', unitOut: 'V', notes: 'the bridge, updated once a sample', gain: { kind: 'hold', hold: 'zeroOrder', sampleTime } },
    typed('GL', 'plant', ['V', 'A'], '1/(Lf*s+Rf)', 'inductor'),
    typed('GC', 'plant', ['A', 'V'], 'Ro/(Ro*Co*s+1)', 'output capacitor with the load'),
    typed('CM', 'controller', ['A', 'V'], `kM*(1 + 2*pi*fM*${motorSampleTime}/(z-1))`, 'motor current controller, a sample each half of the switching period', motorSampleTime),
    { name: 'TM', role: 'delay', unitIn: 'V', unitOut: 'V', notes: 'computation of the motor current, one sample', gain: { kind: 'deadTime', deadTime: 1, unit: 'samples' } },
    { name: 'HM', role: 'hold', unitIn: 'V', unitOut: 'V', notes: 'the motor bridge, updated at both edges', gain: { kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: motorSampleTime, duty: 0.5 } },
    typed('GM', 'plant', ['V', 'A'], '1/(LM*s+RM)', 'winding of the motor'),
    typed('FM', 'sensor', ['A', 'A'], '1/(1+s/(2*pi*10000))', 'filter of the current sensor'),
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
    {
      code: 'MC', name: 'Motor current', axis: 'motor bridge', breakPoint: 'voltage command', breakAt: { block: 'HM', side: 'input' }, loopStates: {},
      notes: 'Pulse-width modulation updated at both edges, 1.5 samples of delay in all: judged by the exact discrete equivalent; the continuous approximation stands beside it.',
      model: { name: 'design model', definition: { kind: 'expression', expression: 'CM*TM*HM*GM*FM' } },
    },
  ],
  report: {
    title: 'Stability margins of the 48 V supply',
    documentNumber: 'WB-0051',
    remarks: 'All loops at three loads: current and voltage sampled at 50 kHz, motor current at 20 kHz.',
    loopRemarks: {},
  },
  revisions: [{ changeNote: 'First issue', set: {} }],
}
