import type { SectionsDefinition } from '#shared/types/block'
import type { DemoBlock, DemoLoop, DemoSystem } from './DemoSystem'
import { correlateModes } from './correlateModes'
import { makeMatrices } from './makeMatrices'
import { elevations, mountModes } from './mountModes'

/** s; rate loops at 1 kHz */
const sampleTime = 1e-3
/** 1/s, of the azimuth and the elevation bearings, found in the survey */
const bearingFriction = [0.021, 0.034]
const codes = elevations.map(elevation => `E${elevation}`)

/** Second-order sections as they stand in the drive's code, in 1/16384. */
const sections = (rows: number[][]): SectionsDefinition => ({ kind: 'sections', gain: '1', sampleTime, rows: rows.map(row => row.map(cell => `${cell}/16384`)) })
const lowPass = [1501, 3002, 1501, 16384, -16149, 5769]

const blocks: DemoBlock[] = [
  { name: 'CAz', role: 'controller', unitIn: 'rad/s', unitOut: 'N m', notes: 'azimuth rate controller', gain: { kind: 'expression', expression: 'kAz*(z-0.992)/(z-1)', sampleTime } },
  { name: 'CEl', role: 'controller', unitIn: 'rad/s', unitOut: 'N m', notes: 'elevation rate controller', gain: { kind: 'expression', expression: 'kEl*(z-0.992)/(z-1)', sampleTime } },
  {
    name: 'NAz', role: 'filter', unitIn: 'N m', unitOut: 'N m', notes: 'notches at 13.8 Hz (yoke) and 21.7 Hz (train pinion), low pass at 120 Hz, as coded',
    gain: sections([[16089, -31953, 15985, 16384, -31953, 15690], [16174, -31943, 16068, 16384, -31943, 15858], lowPass]),
  },
  {
    name: 'NEl', role: 'filter', unitIn: 'N m', unitOut: 'N m', notes: 'notches at 11.3 Hz (yoke) and 25.4 Hz (elevation screw), low pass at 120 Hz, as coded',
    gain: sections([[16183, -32183, 16082, 16384, -32183, 15880], [15750, -30879, 15527, 16384, -30879, 14893], lowPass]),
  },
  { name: 'H', role: 'hold', unitIn: 'N m', unitOut: 'N m', notes: 'torque command kept over the sample', gain: { kind: 'hold', hold: 'zeroOrder', sampleTime } },
  { name: 'Tc', role: 'delay', unitIn: 'N m', unitOut: 'N m', notes: 'computation and drive bus, 1.6 samples', gain: { kind: 'deadTime', deadTime: 0.0016, unit: 's' } },
  { name: 'Drive', role: 'actuator', unitIn: 'N m', unitOut: 'N m', notes: 'torque loop of the drives', gain: { kind: 'expression', expression: '1/(s/800+1)' } },
  {
    name: 'G', role: 'plant', unitIn: 'N m', unitOut: 'rad/s', notes: 'correlated with the modal survey: 60 states, a set of matrices an elevation in one file',
    file: { name: 'mount-correlated.csv', text: makeMatrices(codes.map((code, index) => ({ code, table: correlateModes(mountModes(index), 6100 + index) })), bearingFriction) },
    gain: ({ code, uploadId }) => ({ kind: 'stateSpace', uploadId, set: code, states: null, inputs: [], outputs: [] }),
  },
  { name: 'Gd', role: 'plant', unitIn: 'N m', unitOut: 'rad/s', notes: 'design model: modal table of the finite element model', gain: ({ index }) => mountModes(index) },
  { name: 'Gyro', role: 'sensor', unitIn: 'rad/s', unitOut: 'rad/s', notes: 'rate gyros at the dish', gain: { kind: 'expression', expression: '1/(s/942.5+1)' } },
]

const rateLoop = (code: string, name: string, axis: 'Az' | 'El', channels: string): DemoLoop => ({
  code, name, axis: axis === 'Az' ? 'azimuth' : 'elevation', breakPoint: 'torque command of the drive', breakAt: { block: 'H', side: 'input' }, loopStates: {}, notes: '',
  model: { name: 'correlated model', definition: { kind: 'expression', expression: `C${axis}*N${axis} * H*Tc*Drive*G[${channels}]*Gyro` } },
  setAside: [{
    name: 'design model', reason: 'correlated with the modal survey of the first article since',
    definition: { kind: 'expression', expression: `C${axis}*N${axis} * H*Tc*Drive*Gd[${channels}]*Gyro` },
  }],
})

/**
 * An invented stabilised antenna mount: two rate loops at 1 kHz on a plant of 60 states with twenty lightly damped modes, at three elevations. The plant
 * stands twice, as the modal table it was designed with and as state-space matrices correlated with a survey.
 */
export const antennaMount: DemoSystem = {
  name: 'Skua stabilised antenna mount',
  customer: 'Skerry Radio Survey',
  documentNumber: 'WB-0063',
  frequencyUnit: 'Hz',
  description: 'Ship antenna of 4 m on a two-axis mount. Sampled rate loops at 1 kHz with notch filters as coded; twenty lightly damped modes between 11 Hz and 160 Hz.',
  hasCustomerAccount: false,
  conditions: elevations.map((elevation, index) => ({
    code: codes[index] ?? '', name: `Elevation ${elevation} deg`, coordinates: [{ name: 'elevation', unit: 'deg', value: elevation }], tags: [], notes: '',
  })),
  parameters: [
    { name: 'kAz', unit: 'N m s', notes: 'azimuth rate gain', values: [16500, 16500, 16500] },
    { name: 'kEl', unit: 'N m s', notes: 'elevation rate gain', values: [8300, 8300, 8300] },
  ],
  blocks,
  loops: [
    rateLoop('AZ', 'Azimuth rate', 'Az', 'azRate, azTorque'),
    rateLoop('EL', 'Elevation rate', 'El', 'elRate, elTorque'),
  ],
  report: {
    title: 'Stability margins of the mount',
    documentNumber: 'WB-0063',
    remarks: 'Both rate loops at three elevations, from the correlated model.',
    loopRemarks: {},
  },
  revisions: [],
}
