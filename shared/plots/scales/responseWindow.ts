/** dB; what lies further below the highest value is not shown. */
const deepest = 120

/** The range of gain (dB) in which to draw a response: all of it at multiples of 20 dB, down to 120 dB below its highest; at least 40 dB. */
export function responseWindow(gain: ArrayLike<number>): { from: number, to: number } {
  let low = Infinity
  let high = -Infinity
  for (const value of Array.from(gain)) {
    if (!Number.isFinite(value)) continue
    low = Math.min(low, value)
    high = Math.max(high, value)
  }
  if (low > high) return { from: -20, to: 20 }
  const to = 20 * Math.ceil((high + 2) / 20)
  return { from: Math.min(to - 40, Math.max(20 * Math.floor((low - 2) / 20), to - deepest)), to }
}
