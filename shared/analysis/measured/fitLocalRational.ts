/** Relative misfit at which a fit counts as exact. */
const exact = 1e-7

/** A rational function through three samples of a window, in barycentric form, that fits the others of the window best. */
export interface LocalRational {
  /** root mean square misfit at the samples that are not interpolated, relative to |L| */
  misfit: number
  /** writes [Re, Im] at a frequency */
  evaluate: (frequency: number, out: Float64Array) => void
  /** its poles: real part a frequency in the input's unit, with the size of what the pole adds to L at a frequency */
  poles: { frequency: number, halfWidth: number, contributionAt: (frequency: number) => number }[]
}

/**
 * Fits samples `first`..`last` by the adaptive Antoulas-Anderson algorithm stopped at three support points at most (type (2, 2)): support
 * points taken where the misfit is largest, weights as the least singular vector of the Loewner matrix, its rows relative to |L|.
 * Few enough parameters not to follow noise over some ten samples, enough to carry one resonance on a smooth background.
 *
 * Source: Y. Nakatsukasa, O. Sete, L. N. Trefethen, The AAA algorithm for rational approximation, SIAM J. Sci. Comput. 40 (2018).
 * Returns null for fewer than six samples.
 */
export function fitLocalRational(frequency: Float64Array, re: Float64Array, im: Float64Array, first: number, last: number): LocalRational | null {
  const count = last - first + 1
  if (count < 6) return null
  const center = (frequency[first]! + frequency[last]!) / 2
  const scale = (frequency[last]! - frequency[first]!) / 2
  const u = Float64Array.from({ length: count }, (_, i) => (frequency[first + i]! - center) / scale)
  const vr = re.subarray(first, last + 1)
  const vi = im.subarray(first, last + 1)
  const chosen = new Uint8Array(count)
  let best: { form: Barycentric, misfit: number } | null = null
  let next = furthestFromMean(vr, vi)
  for (let size = 1; size <= 3; size++) {
    chosen[next] = 1
    const form = fitThrough([...chosen.keys()].filter(i => chosen[i]), u, vr, vi, chosen)
    if (form === null) break
    const found = misfitOf(form, u, vr, vi, chosen)
    // Another support point must earn its place: otherwise it follows noise, or rounding where the smaller fit is exact.
    if (best === null || found.misfit < best.misfit / 2) best = { form, misfit: found.misfit }
    if (found.misfit < exact) break
    next = found.worst
  }
  if (best === null) return null
  const { form, misfit } = best
  return {
    misfit,
    evaluate: (at, out) => evaluateBarycentric(form, (at - center) / scale, out),
    poles: polesOf(form).map(({ re, im, residue }) => ({
      frequency: center + scale * re,
      halfWidth: scale * Math.abs(im),
      contributionAt: at => residue / Math.hypot((at - center) / scale - re, im),
    })),
  }
}

interface Barycentric {
  u: number[]
  vr: number[]
  vi: number[]
  wr: number[]
  wi: number[]
}

function furthestFromMean(vr: Float64Array, vi: Float64Array): number {
  const [mr, mi] = [vr, vi].map(values => values.reduce((sum, value) => sum + value, 0) / values.length) as [number, number]
  const errors = Array.from(vr, (value, i) => Math.hypot(value - mr, vi[i]! - mi) / Math.hypot(value, vi[i]!))
  return errors.indexOf(Math.max(...errors))
}

/** Root mean square misfit at the samples not chosen, relative to |L|, and the sample that fits worst. */
function misfitOf(form: Barycentric, u: Float64Array, vr: Float64Array, vi: Float64Array, chosen: Uint8Array): { misfit: number, worst: number } {
  const value = new Float64Array(2)
  let [worst, largest, squares, count] = [-1, -1, 0, 0]
  for (let i = 0; i < u.length; i++) {
    if (chosen[i]) continue
    evaluateBarycentric(form, u[i]!, value)
    const error = Math.hypot(value[0]! - vr[i]!, value[1]! - vi[i]!) / Math.hypot(vr[i]!, vi[i]!)
    squares += error * error
    count++
    if (error > largest) [worst, largest] = [i, error]
  }
  return { misfit: Math.sqrt(squares / count), worst }
}

function evaluateBarycentric({ u, vr, vi, wr, wi }: Barycentric, at: number, out: Float64Array): void {
  let [nr, ni, dr, di] = [0, 0, 0, 0]
  for (let k = 0; k < u.length; k++) {
    const gap = at - u[k]!
    if (gap === 0) {
      out[0] = vr[k]!
      out[1] = vi[k]!
      return
    }
    const [a, b] = [wr[k]! / gap, wi[k]! / gap]
    dr += a
    di += b
    nr += a * vr[k]! - b * vi[k]!
    ni += a * vi[k]! + b * vr[k]!
  }
  const size = dr * dr + di * di
  out[0] = (nr * dr + ni * di) / size
  out[1] = (ni * dr - nr * di) / size
}

/**
 * The barycentric form through the samples `support`. Its weights are the least eigenvector of the Gram matrix of the Loewner
 * rows, by inverse iteration with its adjugate (of order three at most). Squaring costs half the digits: enough, for the fit
 * only has to tell a hidden feature from none.
 */
function fitThrough(support: number[], u: Float64Array, vr: Float64Array, vi: Float64Array, chosen: Uint8Array): Barycentric | null {
  const size = support.length
  const form: Barycentric = { u: support.map(i => u[i]!), vr: support.map(i => vr[i]!), vi: support.map(i => vi[i]!), wr: [1], wi: [0] }
  if (size === 1) return form
  const gr = new Float64Array(9)
  const gi = new Float64Array(9)
  const [ar, ai] = [new Float64Array(3), new Float64Array(3)]
  for (let i = 0; i < u.length; i++) {
    if (chosen[i]) continue
    const weight = 1 / Math.hypot(vr[i]!, vi[i]!)
    for (let k = 0; k < size; k++) {
      const factor = weight / (u[i]! - form.u[k]!)
      ar[k] = (vr[i]! - form.vr[k]!) * factor
      ai[k] = (vi[i]! - form.vi[k]!) * factor
    }
    for (let p = 0; p < size; p++) {
      for (let q = 0; q < size; q++) {
        gr[3 * p + q]! += ar[p]! * ar[q]! + ai[p]! * ai[q]!
        gi[3 * p + q]! += ar[p]! * ai[q]! - ai[p]! * ar[q]!
      }
    }
  }
  const weights = leastEigenvector(gr, gi, size)
  return weights === null ? null : { ...form, wr: weights.re, wi: weights.im }
}

function leastEigenvector(gr: Float64Array, gi: Float64Array, size: number): { re: number[], im: number[] } | null {
  const minor = (r: number, c: number): [number, number] => {
    const rows = [0, 1, 2].filter(i => i < size && i !== r)
    const columns = [0, 1, 2].filter(i => i < size && i !== c)
    const at = (i: number, j: number): [number, number] => [gr[3 * rows[i]! + columns[j]!]!, gi[3 * rows[i]! + columns[j]!]!]
    if (size === 2) return at(0, 0)
    const [[a, b], [c1, d], [e, f], [g, h]] = [at(0, 0), at(1, 1), at(0, 1), at(1, 0)]
    return [a * c1 - b * d - (e * g - f * h), a * d + b * c1 - (e * h + f * g)]
  }
  const adjugate = Array.from({ length: size }, (_, row) => Array.from({ length: size }, (_, column) => {
    const [re, im] = minor(column, row)
    const sign = (row + column) % 2 === 0 ? 1 : -1
    return [sign * re, sign * im] as const
  }))
  let re = new Array<number>(size).fill(1)
  let im = new Array<number>(size).fill(0)
  for (let step = 0; step < 6; step++) {
    const [nr, ni] = [new Array<number>(size).fill(0), new Array<number>(size).fill(0)]
    for (let p = 0; p < size; p++) {
      for (let q = 0; q < size; q++) {
        const [a, b] = adjugate[p]![q]!
        nr[p]! += a * re[q]! - b * im[q]!
        ni[p]! += a * im[q]! + b * re[q]!
      }
    }
    const norm = Math.hypot(...nr, ...ni)
    if (!(norm > 0) || !Number.isFinite(norm)) return step === 0 ? null : { re, im }
    re = nr.map(value => value / norm)
    im = ni.map(value => value / norm)
  }
  return { re, im }
}

/** Zeros of the barycentric denominator (a polynomial of degree two at most), each with the size of its residue. */
function polesOf(form: Barycentric): { re: number, im: number, residue: number }[] {
  const { u, wr, wi } = form
  if (u.length < 3) return []
  const coefficients = [[0, 0], [0, 0], [0, 0]] as [number, number][]
  for (let k = 0; k < 3; k++) {
    const [a, b] = [u[(k + 1) % 3]!, u[(k + 2) % 3]!]
    ;[1, -(a + b), a * b].forEach((factor, power) => {
      coefficients[power]![0] += wr[k]! * factor
      coefficients[power]![1] += wi[k]! * factor
    })
  }
  const [a, b, c] = coefficients as [[number, number], [number, number], [number, number]]
  return quadraticRoots(a, b, c).map(([re, im]) => ({ re, im, residue: residueAt(form, re, im) }))
}

function quadraticRoots(a: [number, number], b: [number, number], c: [number, number]): [number, number][] {
  const times = (p: [number, number], q: [number, number]): [number, number] => [p[0] * q[0] - p[1] * q[1], p[0] * q[1] + p[1] * q[0]]
  const over = (p: [number, number], q: [number, number]): [number, number] => {
    const size = q[0] * q[0] + q[1] * q[1]
    return [(p[0] * q[0] + p[1] * q[1]) / size, (p[1] * q[0] - p[0] * q[1]) / size]
  }
  const [bb, ac] = [times(b, b), times(a, c)]
  const [dr, di] = [bb[0] - 4 * ac[0], bb[1] - 4 * ac[1]]
  const size = Math.hypot(dr, di)
  let root: [number, number] = [Math.sqrt((size + dr) / 2), Math.sign(di || 1) * Math.sqrt((size - dr) / 2)]
  // The sign that adds, then the other root from the product.
  if (b[0] * root[0] + b[1] * root[1] < 0) root = [-root[0], -root[1]]
  const q: [number, number] = [-(b[0] + root[0]) / 2, -(b[1] + root[1]) / 2]
  return [over(q, a), over(c, q)].filter(([re, im]) => Number.isFinite(re) && Number.isFinite(im))
}

/** |N(p) / D'(p)| with N = sum w v / (u - u_k), D' = -sum w / (u - u_k)^2. */
function residueAt({ u, vr, vi, wr, wi }: Barycentric, re: number, im: number): number {
  let [nr, ni, sr, si] = [0, 0, 0, 0]
  for (let k = 0; k < u.length; k++) {
    const [x, y] = [re - u[k]!, im]
    const size = x * x + y * y
    if (size === 0) return 0
    const [ir, ii] = [x / size, -y / size]
    const [tr, ti] = [wr[k]! * ir - wi[k]! * ii, wr[k]! * ii + wi[k]! * ir]
    nr += tr * vr[k]! - ti * vi[k]!
    ni += tr * vi[k]! + ti * vr[k]!
    sr += tr * ir - ti * ii
    si += tr * ii + ti * ir
  }
  return Math.hypot(nr, ni) / Math.hypot(sr, si)
}
