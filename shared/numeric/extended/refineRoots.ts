import { evaluateDoubleDouble } from './evaluateDoubleDouble'
import { evaluateFixedPoint } from './evaluateFixedPoint'
import type { ScaledPolynomial } from './ScaledPolynomial'

/** Roots as doubles with a proven bound each: P(x) = lead prod(x - r_k) (1 + sum W_k / (x - r_k)) with |W_k| <= correction[k]. */
export interface RefinedRoots {
  re: Float64Array
  im: Float64Array
  correction: Float64Array
}

const MAXIMAL_SWEEPS = 80
const MOST_BITS = 20_000
/** Power of two of the product of a root's distances from the others. */
const LEAST_PRODUCT = -900

/**
 * Brings approximate simple roots of a real polynomial to the last bit of each part, conjugate pairs exact, and
 * proves how far the product of the factors is from the polynomial.
 *
 * Iteration: W. Boersch-Supan, 'Residuenabschaetzung fuer Polynom-Nullstellen mittels Lagrange-Interpolation', Numerische
 * Mathematik 14 (1970), r_k -= W_k / (1 + sum_j W_j / (r_k - r_j)), W_k = P(r_k) / (lead prod_j (r_k - r_j)) being the
 * correction of K. Weierstrass (1891). Only P(r_k) needs more than doubles: double-double first, and fixed point of as many
 * bits as a cluster or a wide range asks for. The identity in `RefinedRoots` is exact for any distinct r_k.
 *
 * @param onto what real parts are rounded to in the end, where not every double will do; the bounds are those of the roots so rounded
 * @throws RangeError when roots cannot be told apart (a multiple root: divide those out first)
 */
export function refineRoots(polynomial: ScaledPolynomial, start: { re: Float64Array, im: Float64Array }, onto?: (re: number) => number): RefinedRoots {
  const state = new Refinement(polynomial, start)
  state.iterate()
  state.pairConjugates()
  if (onto) state.re.set(state.re.map(onto))
  return { re: state.re, im: state.im, correction: state.finalCorrections() }
}

class Refinement {
  readonly re: Float64Array
  readonly im: Float64Array
  private readonly n: number
  private readonly wr: Float64Array
  private readonly wi: Float64Array
  /** Bound of the evaluation's error in W. */
  private readonly noise: Float64Array
  /** Bits of fixed point each root needs; 0 where double-double is enough. */
  private readonly bits: Int32Array
  private readonly settled: Uint8Array
  private readonly value = new Float64Array(2)
  private readonly polynomial: ScaledPolynomial

  constructor(polynomial: ScaledPolynomial, start: { re: Float64Array, im: Float64Array }) {
    this.polynomial = polynomial
    this.n = polynomial.degree
    this.re = start.re.slice()
    this.im = start.im.slice()
    this.wr = new Float64Array(this.n)
    this.wi = new Float64Array(this.n)
    this.noise = new Float64Array(this.n)
    this.bits = new Int32Array(this.n)
    this.settled = new Uint8Array(this.n)
    this.separate()
  }

  iterate(): void {
    let open = this.n
    for (let sweep = 0; open > 0; sweep++) {
      if (sweep === MAXIMAL_SWEEPS) throw new RangeError('the roots do not settle: some lie too close together')
      for (let k = 0; k < this.n; k++) if (!this.settled[k]) this.computeCorrection(k)
      for (let k = 0; k < this.n; k++) {
        if (this.settled[k]) continue
        if (this.step(k)) {
          this.settled[k] = 1
          open--
        }
      }
      this.separate()
    }
  }

  /** W_k with the error bound of its evaluation, with as many bits as the target asks for. */
  private computeCorrection(k: number): void {
    const x = this.re[k] as number
    const y = this.im[k] as number
    const n = this.n
    const shift = Math.round(Math.log2(Math.max(Math.abs(x), Math.abs(y), 1e-300)))
    const scaling = 2 ** -shift
    const a = x * scaling
    const b = y * scaling
    const coefficients = this.polynomial.at(shift)
    // product of the distances, kept in range
    let pr = coefficients.high[n] as number
    let pi = 0
    let exponent = 0
    if (pr === 0) {
      pr = 1
      exponent = Math.round(this.polynomial.logMagnitude(n)) + shift * n - coefficients.scale
    }
    for (let j = 0; j < n; j++) {
      if (j === k) continue
      const dr = (x - (this.re[j] as number)) * scaling
      const di = (y - (this.im[j] as number)) * scaling
      const t = pr * dr - pi * di
      pi = pr * di + pi * dr
      pr = t
      const size = Math.abs(pr) + Math.abs(pi)
      if (size > 1e100) {
        pr *= 2 ** -300
        pi *= 2 ** -300
        exponent += 300
      }
      else if (size < 1e-100) {
        pr *= 2 ** 300
        pi *= 2 ** 300
        exponent -= 300
      }
    }
    const square = pr * pr + pi * pi
    if (square === 0) throw new RangeError('two roots cannot be told apart')
    const product = Math.sqrt(square)
    // Below this the polynomial's value beside a root leaves the range of doubles, and its correction would seem smaller than it is.
    if (exponent + Math.log2(product) < LEAST_PRODUCT) throw new RangeError('the roots crowd too closely about one point')
    const modulus = Math.sqrt(a * a + b * b)
    // All below in units of 2^shift.
    const target = targetOf(a, b)
    let size = 0
    for (let j = n; j >= 0; j--) size = size * modulus + Math.abs(coefficients.high[j] as number)
    const unit = 2 ** Math.max(-1000, Math.min(1000, -exponent)) / product
    let noise = (n + 1) * 2 ** -100 * size * unit
    if (this.bits[k] === 0 && noise > target) this.bits[k] = 128
    if (this.bits[k] === 0) evaluateDoubleDouble(coefficients, a, b, this.value)
    else {
      const growth = Math.max(1, modulus) ** n
      const needed = Math.log2((n + 1) ** 2 * 8 * growth / product) - exponent - Math.log2(target)
      if (!(needed < MOST_BITS)) throw new RangeError('two roots cannot be told apart')
      this.bits[k] = Math.max(this.bits[k] as number, 64 * Math.ceil(needed / 64))
      noise = (n + 1) ** 2 * 2 ** (3 - (this.bits[k] as number)) * growth * unit
      if ((this.bits[k] as number) > 900) noise = target
      evaluateFixedPoint(this.polynomial, shift, a, b, this.bits[k] as number, this.value)
    }
    // value / product without leaving the range: the value is small where the product is
    const vr = this.value[0] as number
    const vi = this.value[1] as number
    const ur = pr / product
    const ui = pi / product
    this.wr[k] = (vr * ur + vi * ui) * unit * 2 ** shift
    this.wi[k] = (vi * ur - vr * ui) * unit * 2 ** shift
    this.noise[k] = noise * 2 ** shift
  }

  /** Moves root k; true when it had settled. */
  private step(k: number): boolean {
    const x = this.re[k] as number
    const y = this.im[k] as number
    let ur = 1
    let ui = 0
    for (let j = 0; j < this.n; j++) {
      if (j === k) continue
      const dr = x - (this.re[j] as number)
      const di = y - (this.im[j] as number)
      const square = dr * dr + di * di
      ur += ((this.wr[j] as number) * dr + (this.wi[j] as number) * di) / square
      ui += ((this.wi[j] as number) * dr - (this.wr[j] as number) * di) / square
    }
    const square = ur * ur + ui * ui
    const wr = this.wr[k] as number
    const wi = this.wi[k] as number
    let stepRe = (wr * ur + wi * ui) / square
    let stepIm = (wi * ur - wr * ui) / square
    if (!Number.isFinite(stepRe) || !Number.isFinite(stepIm)) {
      stepRe = wr
      stepIm = wi
    }
    this.re[k] = x - stepRe
    this.im[k] = y - stepIm
    const floor = Math.max(2 ** -84 * Math.hypot(x, y), 2 * (this.noise[k] as number))
    const enoughRe = Math.max(floor, 2 ** -50 * Math.abs(x))
    const enoughIm = Math.max(floor, 2 ** -50 * Math.abs(y))
    if (!(Math.abs(stepRe) <= enoughRe && Math.abs(stepIm) <= enoughIm)) return false
    // A step is small too where the corrections of other roots are still large: then this one's own must be small by itself.
    return Math.hypot(ur - 1, ui) <= 0.5 || Math.hypot(wr, wi) <= 8 * (enoughRe + enoughIm)
  }

  /** No two approximations may coincide: W would have no value. */
  private separate(): void {
    for (let k = 0; k < this.n; k++) {
      for (let j = 0; j < k; j++) {
        if (this.re[j] !== this.re[k] || this.im[j] !== this.im[k]) continue
        const size = Math.max(Math.abs(this.re[k] as number), Math.abs(this.im[k] as number))
        this.re[k] = (this.re[k] as number) + size * 2 ** -50 * (1 + (k % 7))
        if ((this.im[k] as number) !== 0) this.im[k] = (this.im[k] as number) + size * 2 ** -50 * (1 + (k % 5))
        this.settled[k] = 0
      }
    }
  }

  /** Makes real roots exactly real and pairs exactly conjugate; every root of the polynomial lies within n |W| of one of these. */
  pairConjugates(): void {
    const n = this.n
    const paired = new Uint8Array(n)
    const order = Array.from({ length: n }, (_, k) => k)
      .sort((i, j) => Math.abs(this.im[j] as number) - Math.abs(this.im[i] as number))
    for (const k of order) {
      if (paired[k]) continue
      const x = this.re[k] as number
      const y = this.im[k] as number
      let nearest = -1
      let smallest = Infinity
      for (let j = 0; j < n; j++) {
        if (j === k || paired[j]) continue
        const distance = Math.hypot(x - (this.re[j] as number), y + (this.im[j] as number))
        if (distance < smallest) {
          smallest = distance
          nearest = j
        }
      }
      if (nearest >= 0 && smallest < Math.abs(y)) {
        const upper = y > 0 ? k : nearest
        const lower = y > 0 ? nearest : k
        this.re[lower] = this.re[upper] as number
        this.im[lower] = -(this.im[upper] as number)
        paired[nearest] = 1
      }
      else {
        this.im[k] = 0
      }
      paired[k] = 1
    }
    this.separate()
  }

  /** Proven bounds of the corrections of the roots as they now stand. */
  finalCorrections(): Float64Array {
    const bound = new Float64Array(this.n)
    for (let k = 0; k < this.n; k++) {
      this.computeCorrection(k)
      // The factor covers the rounding of the product of distances: 2 n units of 2^-53 at most, n below 10,000.
      bound[k] = (Math.hypot(this.wr[k] as number, this.wi[k] as number) + (this.noise[k] as number)) * (1 + 1e-11)
    }
    return bound
  }
}

/** How exactly W of a root at a + j b (about 1 in size) should be known: a last-bit part of its distance from the imaginary axis, within reason. */
function targetOf(a: number, b: number): number {
  return Math.max(2 ** -50 * Math.abs(a), 2 ** -84 * Math.max(Math.abs(a), Math.abs(b)))
}
