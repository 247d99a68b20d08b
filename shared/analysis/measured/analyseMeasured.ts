import type { ClosestApproach, CoverageException, GainCrossover, LoopAnalysis, MeasuredInput, PhaseCrossover, VectorMargin } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import { wrapDegrees } from '../margins/wrapDegrees'
import { buildMeasuredCurve } from './buildMeasuredCurve'
import { curveAt, curveInGap } from './curveAt'
import { distanceOf } from './distanceOf'
import { type DistanceMinimum, findDistanceMinima } from './findDistanceMinima'
import { findLevelCrossings, type LevelCrossings } from './findLevelCrossings'
import { exceptionsOf, judgeGaps, leavesCountOpen } from './judgeGaps'
import { leastDistanceBetween } from './leastDistanceBetween'
import type { MeasuredCurve } from './MeasuredCurve'
import { measuredStability } from './measuredStability'
import { diskMarginOf, summariseMeasured } from './summariseMeasured'

const degrees = 180 / Math.PI
/** Longest list of one kind that is given back. */
const listLimit = 10_000
/** ln of a ratio in dB */
const nepers = Math.LN10 / 20

/**
 * Analyses a measured response by the contract of `LoopAnalysis`: everything within the samples, nothing beyond them.
 *
 * Between samples log magnitude and unwrapped phase are monotone cubics of log frequency; all lists and the vector margin are those
 * of this interpolant. That the loop itself goes this way between its samples is never proven: each gap is judged, and those
 * that cannot be trusted are exceptions with place, code and reason. Samples with coherence and averages carry their 95 % discs.
 *
 * @throws AnalysisInputError for samples that are no loop gain and for a band without samples
 */
export function analyseMeasured(input: MeasuredInput): LoopAnalysis {
  const curve = buildMeasuredCurve(input)
  const frequencyUnit = input.frequencyUnit ?? 'rad/s'
  const floor = (input.gainFloor ?? -60) * nepers
  const [from, to] = bandOf(input, curve)
  const inBand = ({ frequency }: { frequency: number }) => frequency >= from && frequency <= to

  const gainLevels = findLevelCrossings(curve, 'gain')
  const phaseLevels = findLevelCrossings(curve, 'phase')
  const gainCrossovers = gainLevels.crossings.filter(inBand).map(crossing => gainCrossoverAt(curve, crossing, frequencyUnit === 'Hz' ? 2 * Math.PI : 1))
  const phaseCrossovers = phaseLevels.crossings.filter(inBand).filter(({ gap, t }) => curveInGap(curve, gap, t).gain >= floor).map(crossing => phaseCrossoverAt(curve, crossing))
  const minima = findDistanceMinima(curve).filter(inBand)
  const vectorMargin = vectorMarginOf(curve, minima, from, to)

  const faults = judgeGaps(curve, floor)
  const openFault = faults.find(fault => leavesCountOpen(curve, fault))
  const openGap = openFault === undefined ? null : { from: curve.frequency[openFault.gap]!, to: curve.frequency[openFault.gap + 1]! }
  const stability = measuredStability(input, curve, openGap)
  const approaches = minima.filter(minimum => minimum.gain >= floor && minimum.frequency > from && minimum.frequency < to).map(minimum => approachAt(curve, minimum))
  const stable = stability.verdict === 'stable'
  const exceptions = [
    ...outsideData(input, curve), ...exceptionsOf(curve, faults, from, to), ...contactsIn(curve, gainLevels, phaseLevels, from, to),
    ...pastListLimit(gainCrossovers, 'gain crossovers', to), ...pastListLimit(phaseCrossovers, 'phase crossovers', to), ...pastListLimit(approaches, 'closest approaches', to),
  ].sort((a, b) => a.from - b.from)
  return {
    ...(input.name !== undefined && { name: input.name }),
    frequencyUnit,
    gainCrossovers: gainCrossovers.slice(0, listLimit),
    phaseCrossovers: phaseCrossovers.slice(0, listLimit),
    closestApproaches: approaches.slice(0, listLimit),
    vectorMargin,
    summary: stable ? summariseMeasured(curve, from, to, gainCrossovers, phaseCrossovers, vectorMargin.distance) : null,
    diskMargin: stable ? diskMarginOf(curve, from, to) : null,
    stability,
    coverage: { proven: false, from, to, exceptions },
    samples: curve.frequency.filter(frequency => frequency >= from && frequency <= to).length,
    ...discsIn(curve, from, to),
  }
}

/** The part of the data that is analysed: all of it, or what the asked band has of it. */
function bandOf({ band }: MeasuredInput, { frequency }: MeasuredCurve): [number, number] {
  const [first, last] = [frequency[0]!, frequency[frequency.length - 1]!]
  if (band === undefined) return [first, last]
  const [from, to] = [Math.max(band[0], first), Math.min(band[1], last)]
  if (from >= to) throw new AnalysisInputError(`band goes from ${band[0]} to ${band[1]}, but the samples go from ${first} to ${last}.`, 'band')
  return [from, to]
}

function gainCrossoverAt(curve: MeasuredCurve, { frequency, gap, t, slope }: LevelCrossings['crossings'][number], radiansPerUnit: number): GainCrossover {
  const { phase } = curveInGap(curve, gap, t)
  const margin = wrapDegrees(180 + phase * degrees)
  const lag = margin < 0 ? margin + 360 : margin
  return { frequency, phaseMargin: margin, delayMargin: lag / degrees / (frequency * radiansPerUnit), slope, distance: distanceOf({ gain: 0, phase }) }
}

function phaseCrossoverAt(curve: MeasuredCurve, { frequency, gap, t, slope }: LevelCrossings['crossings'][number]): PhaseCrossover {
  const { gain } = curveInGap(curve, gap, t)
  const withinNoise = curve.radius !== null && [gap, gap + 1].some(i => curve.radius![i]! >= Math.exp(curve.gain[i]!))
  return { frequency, gainMargin: gain === 0 ? 0 : -gain / nepers, slope, distance: Math.abs(Math.expm1(gain)), ...(withinNoise && { withinNoise }) }
}

function approachAt(curve: MeasuredCurve, minimum: DistanceMinimum): ClosestApproach {
  const { frequency, distance, gain, phase, depth, sample } = minimum
  const noise = curve.radius === null ? 0 : curve.radius[sample]!
  return {
    frequency,
    distance,
    gainChange: gain === 0 ? 0 : -gain / nepers,
    // The lag or lead that turns L to the negative real axis: arg(-1) - arg L.
    phaseChange: wrapDegrees(180 - phase * degrees),
    // Two samples, each somewhere in its circle, differ by up to its width.
    ...(depth < 2 * noise && { withinNoise: true }),
  }
}

/** The least |1 + L| over the band: one of its minima, or one of its ends. */
function vectorMarginOf(curve: MeasuredCurve, minima: DistanceMinimum[], from: number, to: number): VectorMargin {
  const ends = [from, to].map(frequency => ({ frequency, distance: distanceOf(curveAt(curve, frequency)!) }))
  const { frequency, distance } = [...minima, ...ends].reduce((least, place) => place.distance < least.distance ? place : least)
  return { distance, frequency }
}

/** What of the asked band, or towards frequency 0, the samples do not reach. */
function outsideData({ band }: MeasuredInput, { frequency, atZero, re, im }: MeasuredCurve): CoverageException[] {
  const [first, last] = [frequency[0]!, frequency[frequency.length - 1]!]
  const exceptions: CoverageException[] = []
  if (atZero !== null && (band === undefined || band[0] === 0)) {
    const leastDistance = leastDistanceBetween(atZero.re, atZero.im, re[0]!, im[0]!)
    exceptions.push({ from: 0, to: first, code: 'frequencyZero', leastDistance, reason: 'A sample at frequency 0 has no place on a logarithmic axis: what lies between it and the next is not analysed.' })
  }
  else if (band !== undefined && band[0] < first) {
    exceptions.push({ from: band[0], to: first, code: 'outsideData', reason: 'The band starts below the first sample.' })
  }
  if (band !== undefined && band[1] > last) exceptions.push({ from: last, to: band[1], code: 'outsideData', reason: 'The band ends above the last sample.' })
  return exceptions
}

/** Samples on |L| = 1 or on the negative real axis that do not cross it. */
function contactsIn(curve: MeasuredCurve, gainLevels: LevelCrossings, phaseLevels: LevelCrossings, from: number, to: number): CoverageException[] {
  const tell = (levels: LevelCrossings, what: string, touches: string, stays: string) => levels.contacts
    .filter(contact => contact.to >= from && contact.from <= to)
    .map((contact): CoverageException => ({
      ...contact,
      leastDistance: leastAtSamples(curve, contact.from, contact.to),
      ...contact.from === contact.to
        ? { code: touches, reason: `A sample touches ${what} without crossing it.` }
        : { code: stays, reason: `Samples in a row lie on ${what}: no single crossing can be told.` },
    }))
  return [
    ...tell(gainLevels, 'a loop gain of magnitude 1', 'gainTangency', 'unitGainOverStretch'),
    ...tell(phaseLevels, 'the negative real axis', 'phaseTangency', 'realOverStretch'),
  ]
}

function pastListLimit(list: { frequency: number | 'infinity' }[], what: string, to: number): CoverageException[] {
  const last = list[listLimit - 1]?.frequency
  if (list.length <= listLimit || typeof last !== 'number') return []
  return [{ from: last, to, code: 'listLimit', reason: `There are ${list.length} ${what}; the first ${listLimit} are listed.` }]
}

function leastAtSamples({ frequency, re, im }: MeasuredCurve, from: number, to: number): number {
  return frequency.reduce((least, at, i) => at < from || at > to ? least : Math.min(least, Math.hypot(1 + re[i]!, im[i]!)), Infinity)
}

function discsIn({ frequency, re, im, radius }: MeasuredCurve, from: number, to: number): Pick<LoopAnalysis, 'discs'> {
  if (radius === null) return {}
  const discs = [...frequency.keys()].filter(i => frequency[i]! >= from && frequency[i]! <= to)
    .map(i => ({ frequency: frequency[i]!, re: re[i]!, im: im[i]!, radius: Number.isFinite(radius[i]!) ? radius[i]! : null }))
  return { discs }
}
