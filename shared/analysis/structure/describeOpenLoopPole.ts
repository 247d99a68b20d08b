import type { FrequencyUnit } from '../../types/analysis'
import { BOUNDARY_DISTANCE } from '../factors/BoundaryRule'

export interface PlanePole {
  /** rad/s in the plane of s */
  re: number
  im: number
  /** whether it is a whole sample of dead time, z = 0 */
  atOriginOfZ: boolean
}

/** An open-loop pole in words: 'pole at 12.3 rad/s, damping 0.02', 'integrator', 'unstable real pole at 3 rad/s', 'sample of delay'. */
export function describeOpenLoopPole({ re, im, atOriginOfZ }: PlanePole, unit: FrequencyUnit): string {
  if (atOriginOfZ) return 'sample of delay'
  const size = Math.hypot(re, im)
  if (size === 0) return 'integrator'
  const place = placeInWords(size, unit)
  const unstable = re > BOUNDARY_DISTANCE * size ? 'unstable ' : ''
  if (im === 0) return `${unstable}real pole at ${place}`
  return `${unstable}pole at ${place}, damping ${unstable ? 'minus ' : ''}${Number((Math.abs(re) / size).toPrecision(3))}`
}

/** A frequency (rad/s) as short as four digits allow, in the unit given: '12.3 rad/s'. */
export function placeInWords(w: number, unit: FrequencyUnit): string {
  return `${Number((w / (unit === 'Hz' ? 2 * Math.PI : 1)).toPrecision(4))} ${unit}`
}
