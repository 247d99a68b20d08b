import type { DemoSystem } from './DemoSystem'

/** 50 kHz switching and sampling, one sample of computation: all numbers are made up to be of the size such a converter has. */
const sampleTime = 2e-5
const inductance = 180e-6
const resistance = 0.05
const capacitance = 470e-6
const loads = [20, 5, 2]

const currentPole = Math.exp(-resistance * sampleTime / inductance)
const rounded = (value: number) => Number(value.toPrecision(9))
const currentLoop = 'kI*(z-0.975)/(z-1) * bL/(z-pL) / z'

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
    { name: 'pL', unit: '', notes: 'pole of the inductor, sampled with zero-order hold', values: [currentPole, currentPole, Math.exp(-resistance * sampleTime / (0.8 * inductance))].map(rounded) },
    { name: 'bL', unit: 'A/V', notes: 'gain of the inductor, sampled', values: [(1 - currentPole) / resistance, (1 - currentPole) / resistance, (1 - Math.exp(-resistance * sampleTime / (0.8 * inductance))) / resistance].map(rounded) },
    { name: 'pC', unit: '', notes: 'pole of the output capacitor with the load, sampled', values: loads.map(load => rounded(Math.exp(-sampleTime / (load * capacitance)))) },
    { name: 'bC', unit: 'V/A', notes: 'gain of the output capacitor with the load, sampled', values: loads.map(load => rounded((1 - Math.exp(-sampleTime / (load * capacitance))) * load)) },
  ],
  loops: [
    {
      code: 'CU', name: 'Inductor current', axis: 'converter', breakPoint: 'duty cycle command', loopStates: { VO: 'open' }, notes: '',
      model: { name: 'design model', definition: { kind: 'expression', expression: currentLoop, sampleTime } },
    },
    {
      code: 'VO', name: 'Output voltage', axis: 'converter', breakPoint: 'current command', loopStates: { CU: 'closed' }, notes: 'The closed current loop stands in the expression as it is, L/(1 + L).',
      model: { name: 'design model', definition: { kind: 'expression', expression: `kV*(z-0.995)/(z-1) * (${currentLoop})/(1 + ${currentLoop}) * bC/(z-pC)`, sampleTime } },
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
