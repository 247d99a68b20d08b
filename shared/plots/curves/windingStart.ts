/** Turns that lie closer than a line is wide may be left out only where there are this many. */
const fewest = 4

/**
 * Index of the sample from which on a curve winds too closely to be drawn: every further whole turn of its phase (deg, unwrapped) moves it by less than
 * `least` px in `along`. The number of samples where it never does.
 */
export function windingStart(phase: Float64Array, along: Float64Array, least: number): number {
  let end = phase.length - 1
  let start = phase.length
  let turns = 0
  for (let i = end; i >= 0; i--) {
    if (Number.isNaN(phase[i]!)) break
    if (Math.abs(phase[end]! - phase[i]!) < 360) continue
    if (!(Math.abs(along[end]! - along[i]!) < least)) break
    turns++
    end = i
    start = i
  }
  return turns >= fewest ? start : phase.length
}
