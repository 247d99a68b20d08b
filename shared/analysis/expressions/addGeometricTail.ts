/**
 * Adds to `tail` the bounds of what a series leaves out beyond degree n, itself and its derivatives 1 to 3 on |y| <= 1, where its coefficients
 * are at most size * ratio^k: sum_(k > n) k^d x^k <= x^(n+1) (n+1)^d / (1 - x e^(d/(n+1))).
 */
export function addGeometricTail(tail: Float64Array, degree: number, size: number, ratio: number): void {
  const n = degree + 1
  const last = size * ratio ** n
  for (let d = 0; d < 4; d++) {
    const shrink = 1 - ratio * Math.exp(d / n)
    tail[d] = tail[d]! + (shrink > 0 ? last * n ** d / shrink : Infinity)
  }
}
