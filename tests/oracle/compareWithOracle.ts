import type { LoopAnalysis } from '#shared/types/analysis'
import { deadTimeAnswer } from './deadTimeAnswer'
import type { OracleRoots } from './ExactLoop'
import { exactAnswer, type ExactAnswer } from './exactAnswer'
import type { GeneratedLoop } from './generateLoop'

/** The accuracy the contract promises. */
const FREQUENCY = 1e-9
const DECIBELS = 1e-6
const DEGREES = 1e-6
const DISTANCE = 1e-9

export interface OracleComparison {
  /** Where the analysis and the oracle differ; empty where they agree. */
  differences: string[]
  /** Exceptions of the analysis, as told. */
  exceptions: string[]
  /** Why this loop is no target: a tie, or something the oracle leaves open. */
  setAside: string[]
}

interface Listed { frequency: number | 'infinity', uncertainty?: number }

const nearly = (a: number, b: number, relative: number) => a === b || Math.abs(a - b) <= relative * Math.abs(b)
const within = (a: number, b: number, absolute: number) => a === b || Math.abs(a - b) <= absolute
const turnedBy = (a: number, b: number) => Math.abs(((a - b) % 360 + 540) % 360 - 180)

function sameFrequency(a: number | 'infinity', b: number | 'infinity', uncertainty = 0): boolean {
  return typeof a === 'string' || typeof b === 'string' ? a === b : nearly(a, b, Math.max(FREQUENCY, uncertainty))
}

function compareLists<T extends Listed, U extends Listed>(name: string, found: T[], expected: U[], compareValues: (a: T, b: U) => string[]): string[] {
  const show = (list: Listed[]) => list.slice(0, 12).map(f => f.frequency).join(', ')
  if (found.length !== expected.length) return [`${name}: ${found.length} found, ${expected.length} exist; found ${show(found)}; exist ${show(expected)}`]
  return found.flatMap((entry, i) => {
    const truth = expected[i]!
    if (!sameFrequency(entry.frequency, truth.frequency, truth.uncertainty)) return [`${name}[${i}]: at ${entry.frequency}, truly at ${truth.frequency}`]
    return compareValues(entry, truth).map(difference => `${name}[${i}] at ${truth.frequency}: ${difference}`)
  })
}

const told = (what: string, a: unknown, b: unknown) => `${what} ${String(a)}, truly ${String(b)}`

const unitInLastPlace = 2 ** -52

/** Compares an analysis with the oracle's answer: the same sets, every value to the accuracy of the contract, the same counts. */
export function compareAnalysis(analysis: LoopAnalysis, truth: Omit<ExactAnswer, 'ties' | 'complementarySensitivityPeak' | 'diskMargin'> & Partial<ExactAnswer>, gainFloor: number): string[] {
  const differences = [
    ...compareLists('gainCrossovers', analysis.gainCrossovers, truth.gainCrossovers, (a, b) => [
      ...turnedBy(a.phaseMargin, b.phaseMargin) <= DEGREES ? [] : [told('phaseMargin', a.phaseMargin, b.phaseMargin)],
      ...within(a.delayMargin, b.delayMargin, Math.max(Math.max(1e-9, b.uncertainty ?? 0) * b.delayMargin, DEGREES / 57.29 / b.frequency)) || turnedBy(b.phaseMargin, 0) <= DEGREES ? [] : [told('delayMargin', a.delayMargin, b.delayMargin)],
      ...a.slope === b.slope ? [] : [told('slope', a.slope, b.slope)],
    ]),
    ...compareLists('phaseCrossovers', analysis.phaseCrossovers, truth.phaseCrossovers, (a, b) => [
      ...within(a.gainMargin, b.gainMargin, DECIBELS) ? [] : [told('gainMargin', a.gainMargin, b.gainMargin)],
      ...a.slope === b.slope ? [] : [told('slope', a.slope, b.slope)],
    ]),
    ...compareLists('closestApproaches', analysis.closestApproaches, truth.closestApproaches, (a, b) => [
      ...within(a.distance, b.distance, DISTANCE * Math.max(1, b.distance)) ? [] : [told('distance', a.distance, b.distance)],
      ...within(a.gainChange, b.gainChange, Math.max(DECIBELS, 20 * unitInLastPlace * (b.steepness ?? 0))) ? [] : [told('gainChange', a.gainChange, b.gainChange)],
      ...turnedBy(a.phaseChange, b.phaseChange) <= DEGREES ? [] : [told('phaseChange', a.phaseChange, b.phaseChange)],
    ]),
  ]
  const margin = truth.vectorMargin
  // above 1 - floor a dead-time oracle, which looks above the floor only, knows the vector margin no closer than that
  const unknown = truth.diskMargin === undefined && margin.distance > 1 - 10 ** (gainFloor / 20)
  if (!analysis.vectorMargin) differences.push('vectorMargin: none')
  else if (!unknown) {
    if (!within(analysis.vectorMargin.distance, margin.distance, DISTANCE)) differences.push(told('vectorMargin', analysis.vectorMargin.distance, margin.distance))
  }
  const { stability, summary } = analysis
  if (truth.openLoopUnstablePoles !== null && stability.openLoopUnstablePoles !== truth.openLoopUnstablePoles) {
    differences.push(told('openLoopUnstablePoles', stability.openLoopUnstablePoles, truth.openLoopUnstablePoles))
  }
  // a verdict withheld for a stretch that is told as an exception is no wrong verdict
  const withheld = stability.verdict === 'undetermined' && analysis.coverage.exceptions.length > 0
  if (truth.closedLoopUnstablePoles !== null && !withheld) {
    if (stability.closedLoopUnstablePoles !== truth.closedLoopUnstablePoles) differences.push(told('closedLoopUnstablePoles', stability.closedLoopUnstablePoles, truth.closedLoopUnstablePoles))
    const verdict = truth.closedLoopUnstablePoles === 0 ? 'stable' : 'unstable'
    if (stability.verdict !== verdict) differences.push(`${told('verdict', stability.verdict, verdict)} (${stability.reason ?? 'no reason'})`)
  }
  if (summary && truth.complementarySensitivityPeak !== undefined) {
    // the peaks follow from distances, which are good to an absolute rounding of L at -1
    const peaks = Math.max(1e-8, 1e-14 / margin.distance)
    if (!nearly(summary.sensitivityPeak, 1 / margin.distance, peaks)) differences.push(told('sensitivityPeak', summary.sensitivityPeak, 1 / margin.distance))
    if (!nearly(summary.complementarySensitivityPeak, truth.complementarySensitivityPeak, peaks)) differences.push(told('complementarySensitivityPeak', summary.complementarySensitivityPeak, truth.complementarySensitivityPeak))
    if (analysis.diskMargin && truth.diskMargin !== undefined && !within(analysis.diskMargin.alpha, truth.diskMargin, DISTANCE)) differences.push(told('diskMargin', analysis.diskMargin.alpha, truth.diskMargin))
  }
  return differences
}

/** Runs an analysis on a generated loop and holds it against the oracle. */
export function compareWithOracle(loop: GeneratedLoop, analyse: (input: unknown) => LoopAnalysis): OracleComparison {
  const deadTime = loop.input.deadTime ?? 0
  const answer = deadTime > 0 ? deadTimeAnswer(loop.input as OracleRoots, loop.gainFloor) : exactAnswer(loop.input, loop.gainFloor)
  const setAside = [...answer.ties, ...('open' in answer ? answer.open : [])]
  if (answer.phaseCrossovers.length > 10_000) setAside.push('more than 10,000 phase crossovers')
  const analysis = analyse({ ...loop.input, gainFloor: loop.gainFloor })
  const exceptions = analysis.coverage.exceptions.map(e => `${e.from} .. ${e.to}: ${e.reason}`)
  if (setAside.length > 0) return { differences: [], exceptions, setAside }
  const differences = compareAnalysis(analysis, answer, loop.gainFloor)
  if (analysis.coverage.proven !== (exceptions.length === 0)) differences.push(`proven is ${analysis.coverage.proven} with ${exceptions.length} exceptions`)
  return { differences, exceptions, setAside }
}
