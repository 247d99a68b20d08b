import { formatFrequency } from '../../formatting/formatFrequency'
import type { FrequencyUnit } from '../../types/analysis'
import { BOUNDARY_DISTANCE } from '../factors/BoundaryRule'

export interface PlanePole {
  /** rad/s in the plane of s */
  re: number
  im: number
  /** whether it is a whole sample of dead time, z = 0 */
  atOriginOfZ: boolean
}

/** An open-loop pole in words: 'pole at 12.30 rad/s, damping 0.0200', 'integrator', 'unstable real pole at 3.000 rad/s', 'sample of delay'. */
export function describeOpenLoopPole({ re, im, atOriginOfZ }: PlanePole, unit: FrequencyUnit): string {
  if (atOriginOfZ) return 'sample of delay'
  const size = Math.hypot(re, im)
  if (size === 0) return 'integrator'
  const place = formatFrequency(size / (unit === 'Hz' ? 2 * Math.PI : 1), unit)
  const unstable = re > BOUNDARY_DISTANCE * size ? 'unstable ' : ''
  if (im === 0) return `${unstable}real pole at ${place}`
  const damping = Math.abs(re) / size
  return `${unstable}pole at ${place}, damping ${unstable ? 'minus ' : ''}${damping < 0.1 ? damping.toFixed(4) : damping.toFixed(3)}`
}
