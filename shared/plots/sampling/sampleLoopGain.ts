import type { LoopGain } from '../../analysis/LoopGain'
import type { SampledCurve } from '../FigureData'
import type { SamplePoint } from './SamplePoint'
import { thinSamples } from './thinSamples'
import { viewError } from './viewError'
import { wrapDegrees } from './wrapDegrees'

export interface SampleOptions {
  /** rad/s; the part outside the axis of the loop gain is left out */
  from: number
  to: number
  /** rad/s; frequencies that are samples themselves: crossings and minima */
  exact?: readonly number[]
  /** rad/s; frequencies to look at that need not stay: the samples of a measured response */
  seeds?: ArrayLike<number>
  /** px; greatest distance between curve and chords in a figure of usual size (96 px to the inch). @default 0.3 */
  tolerance?: number
  /** @default 8000 */
  mostPoints?: number
}

/** dB; beyond these no figure shows a difference. */
const clampedGain = 130
/** Evaluations after which the line ends: a chord over what was not looked at would be a made-up curve. */
const effort = 60_000
/** deg */
const longestPhaseStep = 60
/** rad; dead time may turn the phase by no more between neighbours, or whole turns would pass unseen. */
const longestDeadTimeTurn = 1.2
/** px of a figure of usual size; turns of the phase that lie closer are not drawn one by one. */
const closestTurns = 3
/** How many times the tolerance is good enough there. */
const windingTolerance = 8
const decadePixels = Math.LN10

/**
 * Samples a loop gain between two frequencies by its curvature, so that the line through the samples is within `tolerance` of the curve
 * in every figure at once: gain, phase and |1 + L| over frequency, gain over phase, and the neighbourhood of -1.
 * Features (roots near the axis, with their widths) are looked at first, so that a resonance of damping 1e-5 is drawn whole; the samples the
 * drawing does not need are dropped again. Frequencies of the result are in rad/s; a sample of NaN parts breaks the line (a pole on the boundary).
 * Where so many turns would have to be followed that the effort ends, the line ends too, and `drawnTo` says where.
 */
export function sampleLoopGain(gain: LoopGain, options: SampleOptions): SampledCurve {
  const from = Math.max(options.from, gain.axisStart)
  const to = Math.min(options.to, gain.axisEnd)
  const tolerance = options.tolerance ?? 0.3
  const most = options.mostPoints ?? 8000
  if (!(from > 0) || !(to > from)) return { frequency: new Float64Array(0), re: new Float64Array(0), im: new Float64Array(0) }

  const xScale = 600 / Math.max(1, Math.log(to / from) / decadePixels) / decadePixels
  const evaluate = evaluator(gain, xScale)
  const starts = startingPoints(gain, options, from, to)

  // Stage 1: enough points that every chord is close to the curve.
  const dense: SamplePoint[] = []
  let evaluations = starts.length
  let drawnTo: number | undefined
  let previous: SamplePoint | undefined
  const refine = (a: SamplePoint, b: SamplePoint, depth: number): void => {
    const tooNarrow = depth >= 48 || b.w - a.w <= 4e-14 * b.w
    if (evaluations > effort && !tooNarrow) {
      drawnTo ??= a.w
      dense.push(invalidBetween(a, b), b)
      return
    }
    if (tooNarrow) {
      if (a.valid && b.valid && Math.abs(wrapDegrees(b.phase - a.phase)) > 120) dense.push(invalidBetween(a, b))
      dense.push(b)
      return
    }
    // Next to a pole on the boundary the line ends where it has left every figure.
    if ((!a.valid && (!b.valid || b.gain >= clampedGain * 3)) || (!b.valid && a.gain >= clampedGain * 3)) {
      dense.push(b)
      return
    }
    const m = evaluate(Math.sqrt(a.w * b.w))
    evaluations++
    if (needsSplit(a, m, b, gain.deadTime, tolerance / 2)) {
      refine(a, m, depth + 1)
      refine(m, b, depth + 1)
      return
    }
    const left = evaluate(Math.sqrt(a.w * m.w))
    const right = evaluate(Math.sqrt(m.w * b.w))
    evaluations += 2
    if (needsSplit(a, left, m, gain.deadTime, tolerance / 2) || needsSplit(m, right, b, gain.deadTime, tolerance / 2)
      || needsSplit(a, left, b, gain.deadTime, tolerance / 2) || needsSplit(a, right, b, gain.deadTime, tolerance / 2)) {
      refine(a, m, depth + 1)
      refine(m, b, depth + 1)
      return
    }
    dense.push(left, m, right, b)
  }
  for (const { w, pinned } of starts) {
    const point = evaluate(w)
    point.pinned = pinned
    if (previous) refine(previous, point, 0)
    else dense.push(point)
    previous = point
  }

  // Stage 2: drop what the drawing does not need; more of it where dead time turns L faster than a figure can show.
  const windsFrom = xScale * 2 * Math.PI / (closestTurns * gain.deadTime)
  let kept = thinPieces(dense, tolerance / 2, windsFrom)
  for (let coarser = tolerance; kept.length > most && coarser < 1000; coarser *= 2) kept = thinPieces(dense, coarser, windsFrom)

  return {
    frequency: Float64Array.from(kept, point => point.w),
    re: Float64Array.from(kept, point => point.valid ? point.re : Number.NaN),
    im: Float64Array.from(kept, point => point.valid ? point.im : Number.NaN),
    ...(drawnTo !== undefined && { drawnTo }),
  }
}

function evaluator(gain: LoopGain, xScale: number): (w: number) => SamplePoint {
  const out = new Float64Array(2)
  return (w) => {
    const valid = gain.evaluate(w, out) && Number.isFinite(out[0]!) && Number.isFinite(out[1]!)
    const re = valid ? out[0]! : Number.NaN
    const im = valid ? out[1]! : Number.NaN
    const magnitude = Math.hypot(re, im)
    const distance = Math.hypot(1 + re, im)
    const decibels = Math.min(clampedGain, Math.max(-clampedGain, 20 * Math.log10(magnitude)))
    return {
      w,
      re,
      im,
      valid,
      x: xScale * Math.log(w),
      gain: 3 * decibels,
      distance: 130 * Math.min(2.5, Math.max(-6, Math.log10(distance))),
      phase: Math.atan2(im, re) * 180 / Math.PI,
      nearScale: 180 * Math.min(1, 2.5 / distance),
      pinned: false,
    }
  }
}

function needsSplit(a: SamplePoint, m: SamplePoint, b: SamplePoint, deadTime: number, tolerance: number): boolean {
  if (!a.valid || !m.valid || !b.valid) return true
  if ((b.w - a.w) * deadTime > longestDeadTimeTurn) return true
  const toMiddle = wrapDegrees(m.phase - a.phase)
  const onward = wrapDegrees(b.phase - m.phase)
  if (Math.abs(toMiddle) > longestPhaseStep || Math.abs(onward) > longestPhaseStep) return true
  return viewError(a, m, b, toMiddle, toMiddle + onward) > tolerance
}

/** The phase turns by half a turn between neighbouring doubles: a root on the boundary, where the line breaks. */
function invalidBetween(a: SamplePoint, b: SamplePoint): SamplePoint {
  return { ...a, w: (a.w + b.w) / 2, re: Number.NaN, im: Number.NaN, valid: false, pinned: true }
}

function startingPoints(gain: LoopGain, options: SampleOptions, from: number, to: number): { w: number, pinned: boolean }[] {
  const pinned = new Map<number, boolean>()
  const add = (w: number, pin: boolean) => {
    if (w >= from && w <= to) pinned.set(w, pin || pinned.get(w) === true)
  }
  add(from, true)
  add(to, true)
  for (const w of options.exact ?? []) add(w, true)
  for (const w of Array.from(options.seeds ?? [])) add(w, false)
  for (const { frequency, width } of gain.features) {
    for (const widths of [-3, -1, 0, 1, 3]) add(frequency + widths * width, false)
  }
  const decades = Math.log10(to / from)
  const steps = Math.max(12, Math.ceil(decades * 10))
  for (let i = 1; i < steps; i++) add(from * (to / from) ** (i / steps), false)
  return [...pinned].map(([w, pin]) => ({ w, pinned: pin })).sort((a, b) => a.w - b.w)
}

/** Unwraps and thins each piece between the breaks, coarsely from `windsFrom` (rad/s) on. */
function thinPieces(points: SamplePoint[], tolerance: number, windsFrom: number): SamplePoint[] {
  const kept: SamplePoint[] = []
  let piece: SamplePoint[] = []
  const close = () => {
    for (let i = 1; i < piece.length; i++) {
      piece[i]!.phase = piece[i - 1]!.phase + wrapDegrees(piece[i]!.phase - piece[i - 1]!.phase)
    }
    let winding = piece.findIndex(point => point.w >= windsFrom)
    if (winding < 0) winding = piece.length
    for (const point of thinSamples(piece.slice(0, winding), tolerance)) kept.push(point)
    for (const point of thinSamples(piece.slice(winding), tolerance * windingTolerance)) kept.push(point)
    piece = []
  }
  for (const point of points) {
    if (point.valid) {
      piece.push(point)
      continue
    }
    close()
    if (kept.length > 0 && kept[kept.length - 1]!.valid) kept.push(point)
  }
  close()
  return kept
}
