import type { CoverageException } from '../../types/analysis'
import { curveAt } from './curveAt'
import { fitLocalRational, type LocalRational } from './fitLocalRational'
import { leastDistanceBetween } from './leastDistanceBetween'
import type { MeasuredCurve } from './MeasuredCurve'

/** Why a gap between two samples is not trusted. */
export type GapCode = 'phaseStep' | 'magnitudeStep' | 'otherSide' | 'neighbourFit' | 'confidenceCircle'

/** A gap that is not trusted; `least` bounds |1 + L| in it from below. */
export interface GapFault {
  gap: number
  code: GapCode
  least: number
}

/** Where phase or magnitude step too far a mode may lie between: |L| is then taken to stay within this factor (20 dB) of the samples. */
const unseenMode = 10
/** A phase step over this is not known to be the shorter way round. rad */
const widestPhaseStep = Math.PI / 3
/** A magnitude step over this hides what is between: 10 dB. */
const widestGainStep = 10 / 20 * Math.LN10
/** A fit through the neighbours that differs from the curve by more than this part of |1 + L| tells that something is between. */
const largestDifference = 0.25
/** Samples on each side of a gap that the fit takes. */
const neighbours = 5

/**
 * The gaps between samples that cannot be trusted, in order, each with its foremost reason:
 * - the phase steps by more than 60 deg, or the magnitude by more than 10 dB, and the confidence circles do not explain it;
 * - the locus could pass -1 on its other side: -1 lies in the ellipse with the two samples as foci and 1.5 times their distance as length;
 * - a rational fit through the five samples on each side differs from the curve;
 * - the 95 % confidence circle of a sample beside it holds -1.
 * Gaps whose ends are both under the gain floor are passed over. The thresholds are this program's own choice (no source).
 *
 * @param floor ln |L| under which crossings are left out
 */
export function judgeGaps(curve: MeasuredCurve, floor: number): GapFault[] {
  const faults: GapFault[] = []
  const { gain, phase, re, im, radius, frequency } = curve
  const count = frequency.length
  const distance = (i: number) => Math.hypot(1 + re[i]!, im[i]!)
  for (let gap = 0; gap + 1 < count; gap++) {
    const next = gap + 1
    if (gain[gap]! < floor && gain[next]! < floor) continue
    const least = leastDistanceBetween(re[gap]!, im[gap]!, re[next]!, im[next]!)
    const noisy = stepIsNoise(curve, gap)
    if (!noisy && Math.abs(phase[next]! - phase[gap]!) > widestPhaseStep) faults.push({ gap, code: 'phaseStep', least: leastWithUnseenMode(gain[gap]!, gain[next]!) })
    else if (least === 0) faults.push({ gap, code: 'otherSide', least })
    else if (radius !== null && (radius[gap]! >= distance(gap) || radius[next]! >= distance(next))) faults.push({ gap, code: 'confidenceCircle', least: 0 })
    else if (!noisy && Math.abs(gain[next]! - gain[gap]!) > widestGainStep) faults.push({ gap, code: 'magnitudeStep', least: leastWithUnseenMode(gain[gap]!, gain[next]!) })
    else {
      const hidden = hiddenByFit(curve, gap)
      if (hidden !== null) faults.push({ gap, code: 'neighbourFit', least: Math.min(least, hidden) })
    }
  }
  return faults
}

/** Least |1 + L| where only the magnitude is bounded, by a factor about that of the samples. */
function leastWithUnseenMode(gain: number, nextGain: number): number {
  return Math.max(0, 1 - unseenMode * Math.exp(Math.max(gain, nextGain)), Math.exp(Math.min(gain, nextGain)) / unseenMode - 1)
}

/** Whether two samples may be of one loop gain: their 95 % circles meet, so a step between them is no sign of anything between. */
function stepIsNoise({ re, im, radius }: MeasuredCurve, gap: number): boolean {
  return radius !== null && Math.hypot(re[gap + 1]! - re[gap]!, im[gap + 1]! - im[gap]!) <= radius[gap]! + radius[gap + 1]!
}

/**
 * Whether the number of turns about -1 in a gap is open: -1 may lie on either side, a mode unseen at |L| over 0.03 could go round it,
 * or the locus turns outside the unit circle by an unknown angle.
 */
export function leavesCountOpen({ gain }: MeasuredCurve, { gap, code, least }: GapFault): boolean {
  if (code === 'phaseStep' && Math.max(gain[gap]!, gain[gap + 1]!) > 0) return true
  return least === 0 || (code !== 'otherSide' && code !== 'confidenceCircle' && least < 0.7)
}

/**
 * Whether the fit through the neighbours shows something between two samples that the curve does not: null where fit and curve agree,
 * otherwise a lower bound of |1 + L| for what hides there, 1 - 2 |L| of the fit (6 dB for what the places compared leave out), else 0.
 * A difference counts only when it stands clear of noise: the misfit of the fit, and the confidence circles.
 */
function hiddenByFit(curve: MeasuredCurve, gap: number): number | null {
  const { frequency, re, im } = curve
  const first = Math.max(0, gap + 1 - neighbours)
  const fit = fitLocalRational(frequency, re, im, first, Math.min(frequency.length - 1, gap + neighbours))
  if (fit === null) return null
  const noise = Math.max(fit.misfit, 1e-7, noiseOfSamples(curve, gap))
  const value = new Float64Array(2)
  let greatest = 0
  let differs = false
  for (const at of placesToCompare(curve, gap, fit, noise)) {
    const point = curveAt(curve, at)
    if (point === null) continue
    const size = Math.exp(point.gain)
    const [cr, ci] = [size * Math.cos(point.phase), size * Math.sin(point.phase)]
    fit.evaluate(at, value)
    const difference = Math.hypot(value[0]! - cr, value[1]! - ci)
    const reach = Math.hypot(value[0]!, value[1]!)
    greatest = Math.max(greatest, reach)
    if (difference <= 8 * noise * size) continue
    if (difference > largestDifference * Math.hypot(1 + cr, ci) || crossesUnity(size, reach, curve, gap)) differs = true
  }
  return differs ? Math.max(0, 1 - 2 * greatest) : null
}

/** Relative rms error of the samples beside a gap, from their 95 % circles (sqrt(-ln 0.05) = 1.73 of it for complex normal errors). */
function noiseOfSamples({ radius, gain }: MeasuredCurve, gap: number): number {
  if (radius === null) return 0
  return Math.max(radius[gap]! / Math.exp(gain[gap]!), radius[gap + 1]! / Math.exp(gain[gap + 1]!)) / 1.73
}

/** A fit that is above 1 where the curve and both samples stay below it, or the other way round. */
function crossesUnity(size: number, reach: number, { gain }: MeasuredCurve, gap: number): boolean {
  const above = gain[gap]! > 0
  if (above !== (gain[gap + 1]! > 0)) return false
  return above ? reach < 0.95 && size > 1 : reach > 1.05 && size < 1
}

/** A quarter, a half and three quarters of the gap, and each pole of the fit in it whose effect at the samples stands clear of noise. */
function placesToCompare({ frequency, re, im }: MeasuredCurve, gap: number, fit: LocalRational, noise: number): number[] {
  const [from, to] = [frequency[gap]!, frequency[gap + 1]!]
  const places = [0.25, 0.5, 0.75].map(part => from + part * (to - from))
  for (const pole of fit.poles) {
    if (!(pole.frequency > from && pole.frequency < to)) continue
    const clear = [gap, gap + 1].every(i => pole.contributionAt(frequency[i]!) > 8 * noise * Math.hypot(re[i]!, im[i]!))
    if (clear) places.push(pole.frequency)
  }
  return places
}

const reasons: Record<GapCode, string> = {
  phaseStep: 'The phase steps by more than 60 deg from sample to sample, so which way it turned is not known.',
  magnitudeStep: 'The magnitude steps by more than 10 dB from sample to sample, so what lies between is not known.',
  otherSide: 'The samples lie so far apart that the locus could pass -1 on its other side.',
  neighbourFit: 'A rational fit through the samples on both sides shows a feature between two samples that neither of them holds.',
  confidenceCircle: 'The 95 % confidence circle of a sample holds -1, so on which side the locus passes is not known.',
}

/** The faults as stretches of the band [from, to], neighbouring gaps of one code put together. */
export function exceptionsOf(curve: MeasuredCurve, faults: readonly GapFault[], from: number, to: number): CoverageException[] {
  const exceptions: CoverageException[] = []
  let before: GapFault | null = null
  for (const fault of faults) {
    const stretch = { from: Math.max(from, curve.frequency[fault.gap]!), to: Math.min(to, curve.frequency[fault.gap + 1]!) }
    if (stretch.from >= stretch.to) continue
    const open = exceptions.at(-1)
    if (open !== undefined && before !== null && before.gap + 1 === fault.gap && before.code === fault.code) {
      open.to = stretch.to
      open.leastDistance = Math.min(open.leastDistance ?? 0, fault.least)
    }
    else exceptions.push({ ...stretch, code: fault.code, reason: reasons[fault.code], leastDistance: fault.least })
    before = fault
  }
  return exceptions
}
