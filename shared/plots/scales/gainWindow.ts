/** dB; what lies further from 0 dB than this is not shown, however far the curves run. */
const furthest = 80
const least = 20

/** The range of gain (dB) in which to draw curves: around 0 dB at multiples of 20 dB, no further than 80 dB either way. */
export function gainWindow(gains: readonly Float64Array[]): { from: number, to: number } {
  let low = 0
  let high = 0
  for (const gain of gains) {
    for (const value of gain) {
      if (value < low) low = value
      if (value > high) high = value
    }
  }
  return {
    from: -Math.max(least, Math.min(furthest, 20 * Math.ceil((-low + 2) / 20))),
    to: Math.max(least, Math.min(furthest, 20 * Math.ceil((high + 2) / 20))),
  }
}
