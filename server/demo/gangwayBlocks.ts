import type { BlockRole } from '#shared/types/block'
import type { DemoBlock } from './DemoSystem'

const typed = (name: string, role: BlockRole, units: [string, string], expression: string, notes: string): DemoBlock =>
  ({ name, role, unitIn: units[0], unitOut: units[1], notes, gain: { kind: 'expression', expression } })

const delay = (name: string, seconds: number, notes: string): DemoBlock =>
  ({ name, role: 'delay', unitIn: '', unitOut: '', notes, gain: { kind: 'deadTime', deadTime: seconds, unit: 's' } })

/**
 * The gangway as it is built, once: eight controllers, valves, hydraulics, the boom as each rate loop and each position loop sees it, and the delays they share.
 * The position loops have the closed rate loop as a lag of its own, as it was identified or designed for, so that they do not move with the rate controllers.
 */
export const gangwayBlocks: DemoBlock[] = [
  typed('CSlR', 'controller', ['rad/s', 'V'], 'kSlR*(1+s/40)/s', 'slew rate controller'),
  typed('CSlP', 'controller', ['rad', 'rad/s'], 'kSlP*(1+0.15/s)', 'slew position controller'),
  typed('CLuR', 'controller', ['rad/s', 'V'], 'kLuR*(1+s/60)/s', 'luff rate controller'),
  typed('CLuP', 'controller', ['rad', 'rad/s'], 'kLuP*(1+0.2/s)', 'luff position controller'),
  typed('CTeR', 'controller', ['m/s', 'V'], 'kTeR*(1+s/80)/s', 'telescope rate controller'),
  typed('CTeP', 'controller', ['m', 'm/s'], 'kTeP*(1+1.2/s)^2', 'telescope position controller with two integrators'),
  typed('CRoR', 'controller', ['rad/s', 'V'], 'kRoR*(1+s/40)/s', 'roll rate controller'),
  typed('CRoP', 'controller', ['rad', 'rad/s'], 'kRoP*(1+0.3/s)', 'roll position controller'),
  typed('SlValve', 'actuator', ['V', 'l/min'], '1/(s/160+1)', 'servo valve of the slew motor'),
  typed('LuValve', 'actuator', ['V', 'l/min'], '1/(s/200+1)', 'servo valve of the luff cylinders'),
  typed('TeValve', 'actuator', ['V', 'l/min'], '1/(s/220+1)', 'servo valve of the telescope winch'),
  typed('HydSl', 'actuator', ['l/min', 'rad/s'], '1/(s^2/whSl^2+2*zh*s/whSl+1)', 'oil columns of the slew motor with the inertia'),
  typed('HydLu', 'actuator', ['l/min', 'rad/s'], '1/(s^2/whLu^2+2*zh*s/whLu+1)', 'oil columns of the luff cylinders with the inertia'),
  typed('HydTe', 'actuator', ['l/min', 'm/s'], '1/(s^2/whTe^2+2*zh*s/whTe+1)', 'oil columns of the winch motor with the inertia'),
  typed('HydRo', 'actuator', ['V', 'rad/s'], '1/(s^2/whRo^2+0.84*s/whRo+1)', 'roll actuator with its valve'),
  typed('LatMode', 'plant', ['', ''], '1/(s^2/wLat^2+0.03*s/wLat+1)', 'first lateral mode of the boom, in the slew rate and the slew position loop'),
  typed('BoomSl', 'plant', ['rad/s', 'rad/s'], '(s^2/(0.9*wLat)^2+0.04*s/wLat+1)*LatMode', 'boom at the slew bearing: the lateral mode with the zeros below it'),
  typed('TipSl', 'plant', ['rad/s', 'rad/s'], '(1+0.9*s/wLat)*LatMode', 'boom at its tip, lateral'),
  typed('BoomLu', 'plant', ['rad/s', 'rad/s'], '(s^2/(1.12*wVer)^2+0.04*s/wVer+1)/(s^2/wVer^2+0.03*s/wVer+1)', 'boom at the luff cylinders: the vertical mode with the zeros above it'),
  typed('TipLu', 'plant', ['rad/s', 'rad/s'], '(1+0.2*s/wVer)/(s^2/wVer^2+0.02*s/wVer+1)', 'boom at its tip, vertical'),
  typed('BoomTe', 'plant', ['m/s', 'm/s'], '(s^2/(0.93*wAx)^2+0.028*s/(0.93*wAx)+1)/(s^2/wAx^2+0.02*s/wAx+1)', 'axial mode of the telescope drive with the zeros below it'),
  typed('BoomRo', 'plant', ['rad/s', 'rad/s'], '(s^2/(1.3*wTor)^2+0.02*s/wTor+1)/(s^2/wTor^2+2*zTor*s/wTor+1)', 'torsion mode of the boom tip with the zeros above it'),
  {
    name: 'TipRo', role: 'plant', unitIn: 'rad/s', unitOut: 'rad/s', notes: 'torsion mode of the boom tip as identified',
    gain: ({ values: { wTor = 0 } }) => ({
      kind: 'modal', frequencyUnit: 'rad/s', derivative: 0, rigid: [], inputs: [], outputs: [],
      modes: [{ name: 'torsion', frequency: wTor, damping: 0.01, gainIn: [wTor * wTor], gainOut: [1] }],
    }),
  },
  typed('RateSl', 'actuator', ['rad/s', 'rad/s'], '1/(s^2/(0.62*whSl)^2+1.0*s/(0.62*whSl)+1)', 'closed slew rate loop, as a lag at 0.62 of the hydraulic frequency'),
  typed('RateLu', 'actuator', ['rad/s', 'rad/s'], '1/(s/20+1)/(s^2/whLu^2+0.7*s/whLu+1)', 'closed luff rate loop'),
  typed('RateTe', 'actuator', ['m/s', 'm/s'], '1/(s/30+1)/(s^2/whTe^2+0.8*s/whTe+1)', 'closed telescope rate loop'),
  {
    name: 'RateRo', role: 'actuator', unitIn: 'rad/s', unitOut: 'rad/s', notes: 'closed roll rate loop as identified',
    gain: ({ values: { whRo = 0 } }) => ({
      kind: 'coefficients', numerator: [1],
      // (s/25 + 1)(s^2/wh^2 + 0.8 s/wh + 1)
      denominator: [1 / (25 * whRo ** 2), 0.8 / (25 * whRo) + 1 / whRo ** 2, 1 / 25 + 0.8 / whRo, 1],
    }),
  },
  typed('SlGyro', 'sensor', ['rad/s', 'rad/s'], '1/(s/160+1)', 'rate gyro of the slew axis'),
  typed('Int', 'plant', ['rad/s', 'rad'], '1/s', 'rate to position, of all axes'),
  delay('TCtrl', 0.002, 'computation and output, of all loops'),
  delay('TSl', 0.004, 'drive bus of the slew axis'),
  delay('TLu', 0.003, 'drive bus of the luff axis'),
  delay('TTe', 0.002, 'drive bus of the telescope'),
  delay('TRo', 0.001, 'drive bus of the roll axis'),
  delay('TRef', 0.002, 'link to the rate controllers of slew and telescope'),
  delay('TRefLR', 0.005, 'link to the rate controllers of luff and roll'),
]
