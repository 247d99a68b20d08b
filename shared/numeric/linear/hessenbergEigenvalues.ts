const MOST_STEPS = 60
/** Steps after which an entry below the diagonal counts as zero beside the norm and no longer beside its neighbours: rounding keeps a defective zero from less. */
const PATIENCE = 20

/**
 * Eigenvalues of a real upper Hessenberg matrix (size by size, row by row; overwritten) by the QR algorithm with double shifts, in doubles:
 * conjugate pairs exact. The routine 'hqr' of R. S. Martin, G. Peters, J. H. Wilkinson ('The QR algorithm for real Hessenberg matrices',
 * Numerische Mathematik 14, 1970). Starting points only: nothing is proven of them. Null where it does not settle.
 */
export function hessenbergEigenvalues(h: Float64Array, size: number): { re: Float64Array, im: Float64Array } | null {
  const n = size
  const re = new Float64Array(n)
  const im = new Float64Array(n)
  let norm = 0
  for (let i = 0; i < n; i++) for (let j = Math.max(0, i - 1); j < n; j++) norm += Math.abs(h[i * n + j]!)
  let shifted = 0
  let last = n - 1
  let steps = 0
  while (last >= 0) {
    let start = last
    for (; start > 0; start--) {
      const around = Math.abs(h[(start - 1) * n + start - 1]!) + Math.abs(h[start * n + start]!)
      if (Math.abs(h[start * n + start - 1]!) <= 2 ** -53 * (around === 0 || steps >= PATIENCE ? norm : around)) {
        h[start * n + start - 1] = 0
        break
      }
    }
    let x = h[last * n + last]!
    if (start === last) {
      re[last] = x + shifted
      im[last] = 0
      last--
      steps = 0
      continue
    }
    let y = h[(last - 1) * n + last - 1]!
    let w = h[last * n + last - 1]! * h[(last - 1) * n + last]!
    if (start === last - 1) {
      const p = 0.5 * (y - x)
      const q = p * p + w
      const z = Math.sqrt(Math.abs(q))
      x += shifted
      if (q >= 0) {
        const far = p + (p < 0 ? -z : z)
        re[last - 1] = x + far
        re[last] = far === 0 ? x : x - w / far
      }
      else {
        re[last - 1] = x + p
        re[last] = x + p
        im[last - 1] = z
        im[last] = -z
      }
      last -= 2
      steps = 0
      continue
    }
    if (steps === MOST_STEPS) return null
    if (steps % 10 === 9) {
      // an exceptional shift, where the usual ones go round in circles
      shifted += x
      for (let i = 0; i <= last; i++) h[i * n + i]! -= x
      const s = Math.abs(h[last * n + last - 1]!) + Math.abs(h[(last - 1) * n + last - 2]!)
      x = 0.75 * s
      y = x
      w = -0.4375 * s * s
    }
    steps++
    doubleStep(h, n, start, last, x, y, w)
  }
  return { re, im }
}

/** One implicit step with the two shifts whose sum is x + y and whose product is x y - w, on rows and columns `start` to `last`. */
function doubleStep(h: Float64Array, n: number, start: number, last: number, x: number, y: number, w: number): void {
  let p = 0
  let q = 0
  let r = 0
  let m = last - 2
  for (; m >= start; m--) {
    const z = h[m * n + m]!
    const rr = x - z
    const ss = y - z
    p = (rr * ss - w) / h[(m + 1) * n + m]! + h[m * n + m + 1]!
    q = h[(m + 1) * n + m + 1]! - z - rr - ss
    r = h[(m + 2) * n + m + 1]!
    const scale = Math.abs(p) + Math.abs(q) + Math.abs(r)
    p /= scale
    q /= scale
    r /= scale
    if (m === start) break
    const u = Math.abs(h[m * n + m - 1]!) * (Math.abs(q) + Math.abs(r))
    const v = Math.abs(p) * (Math.abs(h[(m - 1) * n + m - 1]!) + Math.abs(z) + Math.abs(h[(m + 1) * n + m + 1]!))
    if (u <= 2 ** -53 * v) break
  }
  for (let i = m + 2; i <= last; i++) {
    h[i * n + i - 2] = 0
    if (i > m + 2) h[i * n + i - 3] = 0
  }
  for (let k = m; k < last; k++) {
    const triple = k < last - 1
    let scale = 1
    if (k !== m) {
      p = h[k * n + k - 1]!
      q = h[(k + 1) * n + k - 1]!
      r = triple ? h[(k + 2) * n + k - 1]! : 0
      scale = Math.abs(p) + Math.abs(q) + Math.abs(r)
      if (scale === 0) continue
      p /= scale
      q /= scale
      r /= scale
    }
    const s = Math.sqrt(p * p + q * q + r * r) * (p < 0 ? -1 : 1)
    if (k !== m) h[k * n + k - 1] = -s * scale
    else if (start !== m) h[k * n + k - 1]! *= -1
    p += s
    const fx = p / s
    const fy = q / s
    const fz = r / s
    q /= p
    r /= p
    for (let j = k; j <= last; j++) {
      let sum = h[k * n + j]! + q * h[(k + 1) * n + j]!
      if (triple) {
        sum += r * h[(k + 2) * n + j]!
        h[(k + 2) * n + j]! -= sum * fz
      }
      h[(k + 1) * n + j]! -= sum * fy
      h[k * n + j]! -= sum * fx
    }
    const bottom = Math.min(last, k + 3)
    for (let i = start; i <= bottom; i++) {
      let sum = fx * h[i * n + k]! + fy * h[i * n + k + 1]!
      if (triple) {
        sum += fz * h[i * n + k + 2]!
        h[i * n + k + 2]! -= sum * r
      }
      h[i * n + k + 1]! -= sum * q
      h[i * n + k]! -= sum
    }
  }
}
