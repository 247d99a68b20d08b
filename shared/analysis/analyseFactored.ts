import type {
  ClosestApproach, CommonInput, CoverageException, DiskMargin, GainCrossover, ListedFrequency, LoopAnalysis, MarginSummary, PhaseCrossover,
  VectorMargin,
} from '../types/analysis'
import type { FactoredLoop } from './FactoredLoop'
import { findComplementaryPeak } from './margins/findComplementaryPeak'
import { findDiskMargin } from './margins/findDiskMargin'
import { findLowestDistance } from './margins/findLowestDistance'
import { summariseMargins } from './margins/summariseMargins'
import { wrapDegrees } from './margins/wrapDegrees'
import type { AxisLoop } from './search/AxisLoop'
import { axisLoopFromFactors } from './search/axisLoopFromFactors'
import { searchLoop, type SearchResult } from './search/searchLoop'
import type { SettledEnd } from './search/settleEnd'
import { judgeStability } from './stability/judgeStability'

const DEGREES = 180 / Math.PI
const DECIBELS = 20 / Math.LN10
const TWO_PI = 2 * Math.PI
const DEFAULT_FLOOR = -60
/** dB; farther down the rounding of doubles hides the phase of a loop that nears the real axis, and nothing is searched. */
const LOWEST_FLOOR = -400

/** Limits that only measurements of the engine itself change. */
export interface AnalysisLimits {
  /** Crossings of a kind that are listed at most. */
  maxListed: number
  /** Boxes and finds at most, before the search stops with an exception. */
  maxEffort: number
}

export const DEFAULT_LIMITS: AnalysisLimits = { maxListed: 10_000, maxEffort: 1_000_000 }

/** The complete proven analysis of a loop given by its factors: everything of the contract, in the input's frequency unit. */
export function analyseFactored(loop: FactoredLoop, input: CommonInput, limits: AnalysisLimits = DEFAULT_LIMITS): LoopAnalysis {
  return analyseAxisLoop(axisLoopFromFactors(loop), loop, input, limits)
}

/**
 * The same of a loop already on its axis. `loop` are its factors for the independent count of closed-loop poles; null where it is
 * more than factors.
 */
export function analyseAxisLoop(axis: AxisLoop, loop: FactoredLoop | null, input: CommonInput, limits: AnalysisLimits = DEFAULT_LIMITS): LoopAnalysis {
  const floor = Math.max(input.gainFloor ?? DEFAULT_FLOOR, LOWEST_FLOOR)
  const result = searchLoop(axis, { floorLog: floor / DECIBELS, maxFinds: limits.maxListed, maxEffort: limits.maxEffort })
  const scale = frequencyScale(axis, input)
  const band = readBand(axis, input, scale)
  const whole = findLowestDistance(result, 0, Number.POSITIVE_INFINITY)
  const lowest = band.whole ? whole : findLowestDistance(result, band.from, band.to)
  const stability = judgeStability(loop, result, whole ?? { distance: Number.POSITIVE_INFINITY, v: 0, rounding: 0 })

  const gainCrossovers = listGainCrossovers(result, scale, band, limits)
  const phaseCrossovers = listPhaseCrossovers(result, scale, band, limits, floor)
  const closestApproaches = listClosestApproaches(result, scale, band, limits, floor)
  const vectorMargin: VectorMargin | null = lowest && { distance: lowest.distance, frequency: scale.listed(lowest.v) }
  if ((input.gainFloor ?? DEFAULT_FLOOR) < LOWEST_FLOOR) {
    result.exceptions.push({
      from: result.infinity.edge, to: Number.POSITIVE_INFINITY, code: 'floor limit', reason: `|L| is searched down to ${LOWEST_FLOOR} dB, no farther`,
    })
  }
  const exceptions = listExceptions(result, scale, band, limits)
  let summary: MarginSummary | null = null
  let diskMargin: DiskMargin | null = null
  if (stability.verdict === 'stable' && lowest) {
    summary = summariseMargins({
      gainCrossovers, phaseCrossovers,
      vectorMargin: lowest.distance,
      complementarySensitivityPeak: findComplementaryPeak(result, band.from, band.to).peak,
      noDelayAllowed: axis.sampleTime === undefined && axis.degree === 0 && result.infinity.logGain > 0 && !result.infinity.unity,
    })
    diskMargin = describeDiskMargin(result, scale, band)
  }
  return {
    ...(input.name === undefined ? {} : { name: input.name }),
    frequencyUnit: input.frequencyUnit ?? 'rad/s',
    gainCrossovers, phaseCrossovers, closestApproaches, vectorMargin, summary, diskMargin, stability,
    coverage: {
      proven: exceptions.length === 0,
      from: band.whole ? 0 : input.band![0],
      to: band.whole ? scale.listed(Number.POSITIVE_INFINITY) : input.band![1],
      exceptions,
    },
  }
}

interface FrequencyScale {
  /** rad/s at v */
  radians: (v: number) => number
  /** The input's unit at v; the end of the axis of a continuous loop is 'infinity'. */
  listed: (v: number) => ListedFrequency
  /** v at a frequency of the input's unit. */
  place: (frequency: number) => number
}

interface Band { from: number, to: number, whole: boolean }

function frequencyScale(axis: AxisLoop, input: CommonInput): FrequencyScale {
  const unit = input.frequencyUnit === 'Hz' ? TWO_PI : 1
  const time = axis.sampleTime
  const radians = (v: number) => time === undefined ? v : 2 * Math.atan(v) / time
  return {
    radians,
    listed: v => v === Number.POSITIVE_INFINITY && time === undefined ? 'infinity' : radians(v) / unit,
    place: (frequency) => {
      const w = frequency * unit
      if (time === undefined) return w
      // At half the sampling frequency and beyond lies the end of the axis.
      return w * time >= Math.PI * (1 - 1e-12) ? Number.POSITIVE_INFINITY : Math.tan(0.5 * w * time)
    },
  }
}

function readBand(axis: AxisLoop, input: CommonInput, scale: FrequencyScale): Band {
  if (!input.band) return { from: 0, to: Number.POSITIVE_INFINITY, whole: true }
  return { from: scale.place(input.band[0]), to: scale.place(input.band[1]), whole: false }
}

function isListed(v: number, band: Band): boolean {
  return v >= band.from && v <= band.to
}

function distanceAt(logGain: number, phase: number): number {
  const size = Math.exp(logGain)
  return Math.hypot(1 + size * Math.cos(phase), size * Math.sin(phase))
}

function listGainCrossovers({ gain }: SearchResult, scale: FrequencyScale, band: Band, limits: AnalysisLimits): GainCrossover[] {
  const list: GainCrossover[] = []
  for (let i = 0; i < gain.v.length && list.length < limits.maxListed; i++) {
    const v = gain.v[i]!
    if (!isListed(v, band)) continue
    const phaseMargin = wrapDegrees(180 + gain.phase[i]! * DEGREES)
    const lag = phaseMargin < 0 ? phaseMargin + 360 : phaseMargin
    list.push({
      frequency: scale.listed(v) as number,
      phaseMargin,
      delayMargin: lag / DEGREES / scale.radians(v),
      slope: gain.direction[i]! > 0 ? 'rising' : 'falling',
      distance: distanceAt(0, gain.phase[i]!),
    })
  }
  return list
}

function listPhaseCrossovers(result: SearchResult, scale: FrequencyScale, band: Band, limits: AnalysisLimits, floor: number): PhaseCrossover[] {
  const { phase, origin, infinity, ties, endless } = result
  const list: PhaseCrossover[] = []
  const addEnd = (end: SettledEnd, v: number) => {
    if (ties.real || !(end.value < 0) || !isListed(v, band) || !(end.logGain * DECIBELS >= floor)) return
    list.push({
      frequency: scale.listed(v),
      gainMargin: end.unity ? 0 : -DECIBELS * end.logGain,
      // The offset is that of the phase as the end is left inwards.
      slope: (v === 0 ? end.phaseOffset : -end.phaseOffset) > 0 ? 'rising' : 'falling',
      distance: Math.abs(1 + end.value),
    })
  }
  addEnd(origin, 0)
  for (let i = 0; i < phase.v.length && list.length < limits.maxListed; i++) {
    if (!isListed(phase.v[i]!, band) || phase.logGain[i]! * DECIBELS < floor) continue
    list.push({
      frequency: scale.listed(phase.v[i]!) as number,
      gainMargin: -DECIBELS * phase.logGain[i]! + 0,
      slope: phase.direction[i]! > 0 ? 'rising' : 'falling',
      distance: Math.abs(Math.expm1(phase.logGain[i]!)),
    })
  }
  if (!endless && (result.axis.deadTime === 0) && list.length < limits.maxListed) addEnd(infinity, Number.POSITIVE_INFINITY)
  return list
}

function listClosestApproaches({ distance }: SearchResult, scale: FrequencyScale, band: Band, limits: AnalysisLimits, floor: number): ClosestApproach[] {
  const list: ClosestApproach[] = []
  for (let i = 0; i < distance.v.length && list.length < limits.maxListed; i++) {
    const logGain = distance.logGain[i]!
    if (!isListed(distance.v[i]!, band) || logGain * DECIBELS < floor) continue
    list.push({
      frequency: scale.listed(distance.v[i]!) as number,
      distance: distanceAt(logGain, distance.phase[i]!),
      gainChange: -DECIBELS * logGain + 0,
      phaseChange: wrapDegrees(180 - distance.phase[i]! * DEGREES),
    })
  }
  return list
}

function listExceptions(result: SearchResult, scale: FrequencyScale, band: Band, limits: AnalysisLimits): CoverageException[] {
  const list: CoverageException[] = []
  const { search, gain, phase, distance } = result
  const all = [...result.exceptions]
  if (search.stoppedAt !== Number.POSITIVE_INFINITY) {
    all.push({
      from: search.stoppedAt, to: Number.POSITIVE_INFINITY, code: 'effort',
      reason: 'the search stopped here: going on would take more effort than is allowed; nothing is told of what lies beyond',
    })
  }
  for (const [finds, name] of [[gain, 'gain crossovers'], [phase, 'phase crossovers'], [distance, 'closest approaches']] as const) {
    const inside = finds.v.filter(v => isListed(v, band))
    if (inside.length <= limits.maxListed || (result.endless && finds !== gain)) continue
    all.push({
      from: inside[limits.maxListed - 1]!, to: Number.POSITIVE_INFINITY, code: 'list limit',
      reason: `more than ${limits.maxListed} ${name}: the list stops here`,
    })
  }
  for (const { from, to, code, reason } of all) {
    if (to < band.from || from > band.to) continue
    list.push({ from: scale.listed(Math.max(from, band.from)) as number, to: scale.listed(Math.min(to, band.to)), code, reason })
  }
  return list.sort((x, y) => x.from - y.from)
}

function describeDiskMargin(result: SearchResult, scale: FrequencyScale, band: Band): DiskMargin | null {
  const disk = findDiskMargin(result, band.from, band.to)
  if (!disk) return null
  const { alpha, v } = disk
  // Gains from (2 - alpha)/(2 + alpha) to (2 + alpha)/(2 - alpha), phases to 2 atan(alpha/2); any for alpha >= 2.
  return {
    alpha,
    frequency: scale.listed(v),
    gainIncrease: alpha >= 2 ? null : 20 * Math.log10((2 + alpha) / (2 - alpha)),
    gainDecrease: alpha >= 2 ? null : 20 * Math.log10((2 - alpha) / (2 + alpha)),
    phase: 2 * Math.atan(alpha / 2) * DEGREES,
  }
}
