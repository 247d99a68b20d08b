import type { LoopInput } from '../../types/analysis'

/** Frequencies (rad/s) at which a measured loop gain has its samples; null for a model. */
export function samplesOfInput(input: LoopInput): number[] | null {
  const points = pointsOf(input)
  if (points === null) return null
  const unit = input.frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  return points.map(({ frequency }) => frequency * unit)
}

function pointsOf(input: LoopInput): readonly { frequency: number }[] | null {
  if ('measured' in input) return input.measured.points
  if (!('expression' in input)) return null
  // A measured block makes the whole loop gain one of its samples.
  const block = Object.values(input.blocks ?? {}).find(({ kind }) => kind === 'measured')
  return block?.kind === 'measured' ? block.points : null
}
