import type { SampledCurve } from '../FigureData'

/** Index of the last sample at or under the frequency, -1 where there is none. */
export function sampleIndexAt(frequencies: Float64Array, frequency: number): number {
  let low = -1
  let high = frequencies.length
  while (high - low > 1) {
    const middle = (low + high) >> 1
    if (frequencies[middle]! <= frequency) low = middle
    else high = middle
  }
  return low
}

/** Where a frequency lies in a curve: between sample `index` and the next, at the fraction `t` of the way in log frequency; null outside. */
export function placeInCurve({ frequency: all, re }: SampledCurve, frequency: number): { index: number, t: number } | null {
  let index = sampleIndexAt(all, frequency)
  if (index < 0 || all.length < 2) return null
  if (index === all.length - 1) {
    if (frequency > all[index]! * (1 + 1e-9)) return null
    index -= 1
  }
  const t = Math.min(1, Math.log(frequency / all[index]!) / Math.log(all[index + 1]! / all[index]!))
  if (Number.isNaN(re[index]!)) return null
  if (t > 0 && Number.isNaN(re[index + 1]!)) return t < 1e-6 ? { index, t: 0 } : null
  return { index, t }
}

/**
 * L at a frequency, from the samples beside it by log magnitude and phase over log frequency; null where the curve has no value.
 * As exact as the drawing, no more: tables take their numbers from the analysis.
 */
export function interpolateCurve(curve: SampledCurve, frequency: number): { re: number, im: number } | null {
  const place = placeInCurve(curve, frequency)
  if (!place) return null
  const { index: i, t } = place
  const [re0, im0] = [curve.re[i]!, curve.im[i]!]
  if (t === 0) return { re: re0, im: im0 }
  const [re1, im1] = [curve.re[i + 1]!, curve.im[i + 1]!]
  if (t === 1) return { re: re1, im: im1 }
  const [m0, m1] = [Math.hypot(re0, im0), Math.hypot(re1, im1)]
  if (m0 === 0 || m1 === 0) return { re: re0 + t * (re1 - re0), im: im0 + t * (im1 - im0) }
  // the angle from the first sample to the second, the short way round
  const turn = Math.atan2(im1 * re0 - re1 * im0, re1 * re0 + im1 * im0)
  const magnitude = m0 * (m1 / m0) ** t
  const angle = Math.atan2(im0, re0) + t * turn
  return { re: magnitude * Math.cos(angle), im: magnitude * Math.sin(angle) }
}
