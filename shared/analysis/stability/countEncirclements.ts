import type { SearchResult } from '../search/searchLoop'

const HALF_TURN = Math.PI
/** Stands for an angle as small as one likes beside an exact half turn. */
const NUDGE = 1e-6

export interface EncirclementCount {
  /** Counter-clockwise encirclements of -1 by L along the whole axis, poles on it passed on the right; null: not known. */
  encirclements: number | null
  /** Why it is not known. */
  reason?: string
}

/**
 * Encirclements of -1, counted by the crossings of the ray left of -1 (H. Nyquist, Regeneration theory, 1932; the count by crossings of
 * the negative real axis, Y. Z. Tsypkin 1949): twice the sign of the phase's slope over the phase crossovers with |L| > 1; once at zero frequency and
 * at the far end where L is real and less than -1, by the side the phase leaves to; less the odd half turns swept clockwise by the arcs of
 * infinite radius about poles on the axis.
 */
export function countEncirclements(result: SearchResult): EncirclementCount {
  const { axis, origin, infinity, boundary, phase, ties } = result
  if (result.search.stoppedAt !== Number.POSITIVE_INFINITY) {
    return { encirclements: null, reason: 'the search stopped before all phase crossovers with |L| > 1 were found' }
  }
  if (result.endless && infinity.logGain >= 0) {
    return { encirclements: null, reason: 'the loop is biproper with dead time and its gain at infinity is not below 1: L circles -1 endlessly' }
  }
  for (const exception of result.exceptions) {
    if (exception.code === 'phase touch' || exception.code === 'gain touch') continue
    if (exception.code.startsWith('phase') || exception.code === 'undamped root' || exception.code === 'order' || exception.code === 'refinement') {
      // A flat phase at an end does not matter where the next term tells which side it leaves to.
      if (exception.code === 'phase flat at an end') continue
      return { encirclements: null, reason: `the count of encirclements is open: ${exception.reason}` }
    }
  }
  if (infinity.open && infinity.logGain >= 0) return { encirclements: null, reason: infinity.open }
  if (ties.real) return countRealLocus(result)

  let count = 2 * result.search.turnsAbove.count
  for (let i = 0; i < phase.v.length; i++) {
    if (phase.logGain[i]! > 0) count += 2 * phase.direction[i]!
  }
  const originPoles = -axis.originWeight
  if (originPoles > 0) {
    const end = origin.quarterTurns * 0.5 * HALF_TURN
    const swept = sweptHalfTurns(end + originPoles * HALF_TURN, end, origin.phaseOffset)
    if (swept === null) return unknownArc('zero frequency')
    count -= swept
  }
  else if (isNegative(origin.value, origin.logGain)) {
    if (origin.phaseOffset === 0) return unknownArc('zero frequency')
    count += origin.phaseOffset
  }
  for (const root of boundary) {
    if (root.weight > 0) continue
    const swept = sweptAtUndamped(root.phaseBelow, root.phaseBelow + root.weight * HALF_TURN, root.phaseSlope, root.realLimit)
    if (swept === null) return unknownArc('an undamped pole')
    count -= 2 * swept
  }
  if (axis.degree > 0) {
    if (Number.isNaN(infinity.quarterTurns)) {
      return { encirclements: null, reason: 'a pole at z = -1 together with a dead time that is no whole number of samples has no closed locus to count' }
    }
    const start = infinity.quarterTurns * 0.5 * HALF_TURN
    // here the arc starts beside the exact angle, where the one at zero frequency ends beside it
    const swept = sweptHalfTurns(start, start - axis.degree * HALF_TURN, -infinity.phaseOffset)
    if (swept === null) return unknownArc('half the sampling frequency')
    count -= swept
  }
  else if (axis.degree === 0 && !result.endless) {
    if (Number.isNaN(infinity.quarterTurns)) {
      // The locus of a dead time of a fraction of a sample does not close at half the sampling frequency: it is closed by the chord there.
      if (infinity.re < -1) {
        return { encirclements: null, reason: 'with a dead time that is no whole number of samples the locus ends left of -1 at half the sampling frequency and does not close' }
      }
    }
    else if (isNegative(infinity.value, infinity.logGain)) {
      if (infinity.phaseOffset === 0) return unknownArc('the far end of the axis')
      count -= infinity.phaseOffset
    }
  }
  return { encirclements: count + 0 }
}

function isNegative(value: number, logGain: number): boolean {
  return value < 0 && logGain > 0
}

function unknownArc(place: string): EncirclementCount {
  return { encirclements: null, reason: `the phase leaves 180 deg at ${place} to a side that rounding hides` }
}

/** Odd half turns between start and end of a clockwise sweep whose ends lie `offset` beyond (towards more lag: -1) exact angles. */
function sweptHalfTurns(start: number, end: number, offset: number): number | null {
  const exactEnd = Math.abs(Math.abs(end / HALF_TURN) % 2 - 1) < 1e-9
  if (exactEnd && offset === 0) return null
  return oddHalfTurnsWithin(end + offset * NUDGE, start - offset * NUDGE)
}

function sweptAtUndamped(start: number, end: number, slope: number, realLimit: boolean): number | null {
  if (realLimit && slope === 0) return null
  if (!realLimit) return oddHalfTurnsWithin(end, start)
  // The limits are whole half turns, known here but for the end of a series. The phase goes on with its slope on both sides:
  // it comes from below the limit and leaves above it where it rises.
  const whole = (angle: number) => Math.round(angle / HALF_TURN) * HALF_TURN
  return oddHalfTurnsWithin(whole(end) + slope * NUDGE, whole(start) - slope * NUDGE)
}

function oddHalfTurnsWithin(low: number, high: number): number {
  const first = Math.ceil((low / HALF_TURN - 1) / 2)
  const last = Math.floor((high / HALF_TURN - 1) / 2)
  return Math.max(0, last - first + 1)
}

/** L real on the axis: 1 + L turns only along the arcs about the poles on it, clockwise by their order in half turns. */
function countRealLocus({ axis, boundary }: SearchResult): EncirclementCount {
  let halfTurns = Math.max(0, -axis.originWeight) + Math.max(0, axis.degree)
  for (const root of boundary) halfTurns += 2 * Math.max(0, -root.weight)
  return halfTurns % 2 === 0
    ? { encirclements: 0 - halfTurns / 2 }
    : { encirclements: null, reason: 'L is real along the whole axis and its arcs do not close' }
}
