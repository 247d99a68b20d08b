import type { LoopInput } from '../../types/analysis'
import { measuredInputOf } from '../blocks/measuredInputOf'

/** Frequencies (rad/s) at which a measured loop gain has its samples; null for a model. */
export function samplesOfInput(input: LoopInput): number[] | null {
  const measured = measuredInputOf(input)
  if (measured === null) return null
  const unit = input.frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  return measured.input.measured.points.map(({ frequency }) => frequency * unit)
}
