import type { FactoredLoop } from '../FactoredLoop'

/** A pole on or beyond the stability boundary that a zero cancels; of a conjugate pair the one above the real axis. */
export interface CancelledPole {
  re: number
  im: number
  onBoundary: boolean
}

/** The poles on or beyond the stability boundary that a zero cancels exactly: modes of the loop that L does not show. */
export function cancelledPoles({ zeros, poles, sampleTime }: FactoredLoop): CancelledPole[] {
  const sampled = sampleTime !== undefined
  const used = new Set<number>()
  const cancelled: CancelledPole[] = []
  for (let k = 0; k < poles.re.length; k++) {
    const re = poles.re[k]!
    const im = poles.im[k]!
    const beyond = sampled ? (Math.abs(re) - 1) * (Math.abs(re) + 1) + im * im > 0 : re > 0
    if (!beyond && !poles.onBoundary[k]) continue
    const zero = Array.from(zeros.re).findIndex((value, j) => !used.has(j) && value === re && zeros.im[j] === im)
    if (zero < 0) continue
    used.add(zero)
    if (im >= 0) cancelled.push({ re, im, onBoundary: poles.onBoundary[k] === 1 })
  }
  return cancelled
}
