import type { CrossingSlope } from '../../types/analysis'
import { cubicOfGap } from './cubicOfGap'
import type { MeasuredCurve } from './MeasuredCurve'
import { solveMonotoneCubic } from './solveMonotoneCubic'

export interface LevelCrossing {
  /** in the input's unit */
  frequency: number
  /** the gap it lies in and the place there, 0 at the left sample to 1 at the right one */
  gap: number
  t: number
  slope: CrossingSlope
}

/** Samples that lie on the level without crossing it: one that touches it, or a run of them. */
export interface LevelContact {
  from: number
  to: number
}

export interface LevelCrossings {
  crossings: LevelCrossing[]
  contacts: LevelContact[]
}

/**
 * Every crossing of |L| = 1, or of a real and negative L, by the interpolant. Each is exact for the interpolant: gain and phase are
 * monotone between samples. Samples on the level to within rounding count as crossings when the curve goes on to the other side,
 * or ends there; otherwise they are contacts, told and not listed.
 */
export function findLevelCrossings(curve: MeasuredCurve, which: 'gain' | 'phase'): LevelCrossings {
  const found: LevelCrossings = { crossings: [], contacts: [] }
  const y = curve[which]
  const slope = which === 'gain' ? curve.gainSlope : curve.phaseSlope
  const last = y.length - 1
  for (let i = 0; i <= last; i++) {
    const level = levelAt(y[i]!, which)
    if (level !== null) i = readRun(curve, y, i, level, found)
    if (i < last) addInterior(curve, y, slope, i, which, found.crossings)
  }
  return found
}

const slopeWord = (step: number): CrossingSlope => step > 0 ? 'rising' : 'falling'
const nearestLevel = (value: number, which: 'gain' | 'phase') => which === 'gain' ? 0 : (2 * Math.round((value / Math.PI - 1) / 2) + 1) * Math.PI

/** The level on which a sample lies to within rounding, null where it lies on none. */
function levelAt(value: number, which: 'gain' | 'phase'): number | null {
  const level = nearestLevel(value, which)
  return Math.abs(value - level) <= 4 * Number.EPSILON * (1 + Math.abs(level)) ? level : null
}

/** Reads the run of samples on a level that starts at `start`; returns its last sample. */
function readRun({ frequency }: MeasuredCurve, y: Float64Array, start: number, level: number, found: LevelCrossings): number {
  const which = level === 0 ? 'gain' : 'phase'
  let end = start
  while (end + 1 < y.length && levelAt(y[end + 1]!, which) === level) end++
  const before = start > 0 ? Math.sign(y[start - 1]! - level) : 0
  const after = end + 1 < y.length ? Math.sign(y[end + 1]! - level) : 0
  if (end > start || (before === after && before !== 0)) found.contacts.push({ from: frequency[start]!, to: frequency[end]! })
  else {
    const atEnd = start === y.length - 1
    found.crossings.push({ frequency: frequency[start]!, gap: atEnd ? start - 1 : start, t: atEnd ? 1 : 0, slope: slopeWord(after - before) })
  }
  return end
}

function addInterior(curve: MeasuredCurve, y: Float64Array, slope: Float64Array, gap: number, which: 'gain' | 'phase', crossings: LevelCrossing[]): void {
  const [from, to] = [y[gap]!, y[gap + 1]!]
  const [low, high] = [Math.min(from, to), Math.max(from, to)]
  const levels: number[] = []
  const step = 2 * Math.PI
  // Levels within half a turn of the ends at most: the phase goes from sample to sample by the shorter way.
  for (let level = nearestLevel(low, which) - (which === 'gain' ? 0 : step); level <= high; level += step) {
    if (level > low && level < high && levelAt(from, which) !== level && levelAt(to, which) !== level) levels.push(level)
    if (which === 'gain') break
  }
  if (levels.length === 0) return
  const cubic = cubicOfGap(curve.x, y, slope, gap)
  for (const level of levels) {
    const t = solveMonotoneCubic(cubic, level)
    crossings.push({ frequency: frequencyAt(curve, gap, t), gap, t, slope: slopeWord(to - from) })
  }
}

/** Frequency at a place in a gap, in the input's unit. */
export function frequencyAt({ frequency, x }: MeasuredCurve, gap: number, t: number): number {
  return frequency[gap]! * Math.exp(t * (x[gap + 1]! - x[gap]!))
}
