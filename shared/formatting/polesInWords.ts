import type { FrequencyUnit } from '../types/analysis'
import { significantDigits } from './significantDigits'

interface Roots { re: ArrayLike<number>, im: ArrayLike<number>, onBoundary?: ArrayLike<number> }

/**
 * Poles in words, in order of frequency, one of a conjugate pair: '0, twice', '12.50 Hz, damping 0.00700', '40.00 rad/s, real', each that is not
 * stable with that word. Frequencies are |s| in the unit; those of a sampled gain are of ln(z)/T.
 *
 * @param roots in rad/s, or plain numbers with a sample time (s)
 */
export function polesInWords(roots: Roots, unit: FrequencyUnit, sampleTime?: number): string[] {
  const found: { frequency: number, words: string }[] = []
  for (let index = 0; index < roots.re.length; index++) {
    if (roots.im[index]! < 0) continue
    const [re, im] = sampleTime === undefined ? [roots.re[index]!, roots.im[index]!] : logarithm(roots.re[index]!, roots.im[index]!, sampleTime)
    const size = Math.hypot(re, im)
    const frequency = unit === 'Hz' ? size / (2 * Math.PI) : size
    found.push({ frequency, words: wordsOf({ re, im, size, frequency, isBoundary: roots.onBoundary?.[index] === 1 }, unit, roots.im[index] === 0 && roots.re[index]! < 0 && sampleTime !== undefined) })
  }
  found.sort((a, b) => a.frequency - b.frequency)
  const counts = new Map<string, number>()
  for (const { words } of found) counts.set(words, (counts.get(words) ?? 0) + 1)
  return [...counts].map(([words, count]) => count === 1 ? words : `${words}, ${count === 2 ? 'twice' : `${count} times`}`)
}

/** ln(z)/T; a pole at z = 0 is a sample of delay, as far left as can be. */
function logarithm(re: number, im: number, sampleTime: number): [number, number] {
  return [Math.log(Math.hypot(re, im)) / sampleTime, Math.atan2(im, re) / sampleTime]
}

function wordsOf({ re, im, size, frequency, isBoundary }: { re: number, im: number, size: number, frequency: number, isBoundary: boolean }, unit: FrequencyUnit, isNegative: boolean): string {
  if (size === Number.POSITIVE_INFINITY) return 'z = 0 (a sample of delay)'
  if (size === 0) return 'integrator'
  const place = `${significantDigits(frequency)} ${unit}`
  const standing = isBoundary || re === 0 ? ', on the stability boundary' : re > 0 ? ', unstable' : ''
  if (isNegative) return `${place}, at half the sample rate${standing}`
  return im === 0 ? `${place}, real${standing}` : `${place}, damping ${significantDigits(-re / size, 3)}${standing}`
}
