/**
 * (sI - A)^-1 for a real s, row by row, by elimination with row exchanges in doubles; null where sI - A is singular to the last bit. For sizes only: its error grows
 * with its condition.
 */
export function realInverse(a: Float64Array, size: number, s: number): Float64Array | null {
  const n = size
  const m = a.map(value => -value)
  const inverse = new Float64Array(n * n)
  for (let i = 0; i < n; i++) {
    m[i * n + i]! += s
    inverse[i * n + i] = 1
  }
  for (let k = 0; k < n; k++) {
    let pivot = k
    for (let i = k + 1; i < n; i++) if (Math.abs(m[i * n + k]!) > Math.abs(m[pivot * n + k]!)) pivot = i
    if (m[pivot * n + k] === 0) return null
    if (pivot !== k) {
      for (let j = 0; j < n; j++) {
        [m[k * n + j], m[pivot * n + j]] = [m[pivot * n + j]!, m[k * n + j]!]
        ;[inverse[k * n + j], inverse[pivot * n + j]] = [inverse[pivot * n + j]!, inverse[k * n + j]!]
      }
    }
    const scale = 1 / m[k * n + k]!
    for (let j = 0; j < n; j++) {
      m[k * n + j]! *= scale
      inverse[k * n + j]! *= scale
    }
    for (let i = 0; i < n; i++) {
      const factor = m[i * n + k]!
      if (i === k || factor === 0) continue
      for (let j = k; j < n; j++) m[i * n + j]! -= factor * m[k * n + j]!
      for (let j = 0; j < n; j++) inverse[i * n + j]! -= factor * inverse[k * n + j]!
    }
  }
  return inverse
}
