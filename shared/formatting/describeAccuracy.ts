import type { LoopStructure } from '../types/analysis'

/**
 * How closely the factors analysed follow the loop gain as given: 'built from state space: relative error on the axis below 3e-13'.
 * Rounded upwards to one digit. Null where nothing stands between the two.
 */
export function describeAccuracy(structure: LoopStructure | undefined): string | null {
  const accuracy = structure?.accuracy
  if (accuracy === undefined) return null
  if (!(accuracy.relative > 0 && accuracy.relative < 1)) return `${accuracy.basis}: relative error on the axis ${accuracy.relative === 0 ? 'none' : 'not bounded'}`
  const power = Math.floor(Math.log10(accuracy.relative) + 1e-9)
  const digit = Math.ceil(accuracy.relative / 10 ** power - 1e-9)
  const [figure, exponent] = digit === 10 ? [1, power + 1] : [digit, power]
  return `${accuracy.basis}: relative error on the axis below ${figure}e${exponent}`
}
