import type { DoubleDoubleRoots } from './DoubleDoubleRoots'
import { pairDoubleDoubleRoots } from './pairDoubleDoubleRoots'

/** Writes [Re P, Im P, exponent] at a point given by double-doubles: P = (Re + j Im) 2^exponent. */
export type PreciseValue = (re: number, reLow: number, im: number, imLow: number, out: Float64Array) => void

/** A number as mantissa * 2^exponent. */
export interface ScaledNumber {
  mantissa: number
  exponent: number
}

/** With conjugates kept conjugate; then without, where a pair and two reals could not be told apart by their starting points. */
const PAIRED_SWEEPS = 12
const FREE_SWEEPS = 300
const TARGET = 2 ** -97
/** In parts of `scale`. */
const FLOOR = 2 ** -104
/** Sweeps without progress after which what is left is rounding: of a root of multiplicity m it is the m-th root of that of the values. */
const STALLED = 4
const MOST_LEFT = 1e-4

/**
 * Brings approximate roots (doubles, conjugate pairs exact, all of the polynomial's) to double-double precision by the iteration of W. Boersch-Supan (Numerische
 * Mathematik 14, 1970): r_k -= W_k / (1 + sum W_j / (r_k - r_j)), W_k = P(r_k) / (lead prod (r_k - r_j)), the values of P precise, the rest in doubles: each sweep
 * gains some 13 digits. `lead` is the leading coefficient, `scale`
 * the size of the numbers that the values come from, below 2^-104 of which a root is not known.
 *
 * Roots of a cluster that rounding does not tell apart come with the large corrections that are left of them.
 *
 * @throws RangeError when the iteration leaves the range of doubles
 */
export function refineDoubleDoubleRoots(value: PreciseValue, lead: ScaledNumber, scale: number, start: { re: Float64Array, im: Float64Array }): DoubleDoubleRoots {
  const refinement = new Refinement(value, lead, scale, start)
  if (!refinement.settle(PAIRED_SWEEPS, true)) {
    refinement.spread()
    // roots of an exact multiple go round one another for ever, as near as rounding lets them: their corrections tell
    refinement.settle(FREE_SWEEPS, false)
    pairDoubleDoubleRoots(refinement.roots)
    refinement.separate()
    refinement.measure()
    if (refinement.roots.correction.some(size => !Number.isFinite(size))) throw new RangeError('the roots do not settle')
  }
  return refinement.roots
}

class Refinement {
  readonly roots: DoubleDoubleRoots
  private readonly n: number
  private readonly wr: Float64Array
  private readonly wi: Float64Array
  private readonly settled: Uint8Array
  private readonly stalls: Uint8Array
  private readonly out = new Float64Array(3)

  constructor(private readonly value: PreciseValue, private readonly lead: ScaledNumber, private readonly scale: number, start: { re: Float64Array, im: Float64Array }) {
    const n = start.re.length
    this.n = n
    this.roots = { re: start.re.slice(), reLow: new Float64Array(n), im: start.im.slice(), imLow: new Float64Array(n), correction: new Float64Array(n) }
    this.wr = new Float64Array(n)
    this.wi = new Float64Array(n)
    this.settled = new Uint8Array(n)
    this.stalls = new Uint8Array(n)
  }

  /** Iterates until every root has settled; false where some have not after so many sweeps. */
  settle(sweeps: number, paired: boolean): boolean {
    const { n, settled, stalls } = this
    const { re, reLow, im, imLow, correction } = this.roots
    const partner = paired ? partners(re, im) : null
    settled.fill(0)
    stalls.fill(0)
    correction.fill(Infinity)
    this.separate()
    for (let sweep = 0; sweep < sweeps; sweep++) {
      let open = 0
      for (let k = 0; k < n; k++) {
        if (settled[k] || (partner && im[k]! < 0)) continue
        this.computeCorrection(k)
        if (partner && im[k] === 0) this.wi[k] = 0
        const size = Math.hypot(this.wr[k]!, this.wi[k]!)
        if (size < 0.97 * correction[k]!) stalls[k] = 0
        else stalls[k]!++
        correction[k] = Math.min(correction[k]!, size)
        const modulus = Math.hypot(re[k]!, im[k]!)
        if (size <= Math.max(TARGET * modulus, FLOOR * this.scale) || (stalls[k]! >= STALLED && this.isRounding(k, size, paired))) {
          settled[k] = 1
          correction[k] = size
        }
        else open++
        if (partner) this.mirror(k, partner[k]!)
      }
      if (open === 0) return true
      for (let k = 0; k < n; k++) {
        if (settled[k] || (partner && im[k]! < 0)) continue
        const [stepRe, stepIm] = this.step(k)
        move(re, reLow, k, stepRe)
        if (!partner || im[k] !== 0) move(im, imLow, k, stepIm)
        if (partner) this.mirror(k, partner[k]!)
      }
      this.separate(partner)
    }
    return false
  }

  /** Whether what is left of W is rounding: of the kind of the least there was, and, as long as pairs are kept, far less than what is between the roots. */
  private isRounding(k: number, size: number, paired: boolean): boolean {
    if (size > 1e3 * this.roots.correction[k]! || size > MOST_LEFT * this.scale) return false
    if (!paired) return this.stalls[k]! >= 2 * STALLED
    const { re, im } = this.roots
    let nearest = Infinity
    for (let j = 0; j < this.n; j++) if (j !== k) nearest = Math.min(nearest, Math.hypot(re[k]! - re[j]!, im[k]! - im[j]!))
    return size <= 1e-3 * nearest
  }

  /** W of every root as they stand. */
  measure(): void {
    for (let k = 0; k < this.n; k++) {
      this.computeCorrection(k)
      this.roots.correction[k] = Math.hypot(this.wr[k]!, this.wi[k]!)
    }
  }

  /** Takes roots off the real axis and out of their symmetry, each its own way. */
  spread(): void {
    const { re, reLow, im, imLow } = this.roots
    for (let k = 0; k < this.n; k++) {
      if (this.settled[k]) continue
      const size = Math.max(Math.hypot(re[k]!, im[k]!), 2 ** -20 * this.scale)
      const angle = 1 + 2.4 * k
      move(re, reLow, k, 2 ** -22 * size * Math.cos(angle))
      move(im, imLow, k, 2 ** -22 * size * Math.sin(angle))
    }
  }

  /** No two may coincide: W would have no value. */
  separate(partner: Int32Array | null = null): void {
    const { re, reLow, im, imLow } = this.roots
    for (let k = 0; k < this.n; k++) {
      if (partner && im[k]! < 0) continue
      for (let j = 0; j < k; j++) {
        if (re[j] !== re[k] || im[j] !== im[k] || reLow[j] !== reLow[k] || imLow[j] !== imLow[k]) continue
        const size = Math.max(2 ** -44 * Math.max(Math.abs(re[k]!), Math.abs(im[k]!)), 2 ** -110 * this.scale)
        move(re, reLow, k, size * (1 + (k % 7)))
        if (im[k] !== 0) move(im, imLow, k, size * (1 + (k % 5)))
        if (partner) this.mirror(k, partner[k]!)
      }
    }
  }

  private computeCorrection(k: number): void {
    const { re, reLow, im, imLow } = this.roots
    const { out, lead } = this
    this.value(re[k]!, reLow[k]!, im[k]!, imLow[k]!, out)
    let pr = lead.mantissa
    let pi = 0
    let exponent = lead.exponent
    for (let j = 0; j < this.n; j++) {
      if (j === k) continue
      const dr = (re[k]! - re[j]!) + (reLow[k]! - reLow[j]!)
      const di = (im[k]! - im[j]!) + (imLow[k]! - imLow[j]!)
      const t = pr * dr - pi * di
      pi = pr * di + pi * dr
      pr = t
      const size = Math.abs(pr) + Math.abs(pi)
      if (size > 2 ** 300) {
        pr *= 2 ** -300
        pi *= 2 ** -300
        exponent += 300
      }
      else if (size < 2 ** -300) {
        pr *= 2 ** 300
        pi *= 2 ** 300
        exponent -= 300
      }
    }
    const unit = 2 ** Math.max(-1000, Math.min(900, out[2]! - exponent))
    const square = pr * pr + pi * pi
    this.wr[k] = (out[0]! * pr + out[1]! * pi) / square * unit
    this.wi[k] = (out[1]! * pr - out[0]! * pi) / square * unit
  }

  private step(k: number): [number, number] {
    const { re, reLow, im, imLow } = this.roots
    const { wr, wi } = this
    let ur = 1
    let ui = 0
    for (let j = 0; j < this.n; j++) {
      if (j === k) continue
      const dr = (re[k]! - re[j]!) + (reLow[k]! - reLow[j]!)
      const di = (im[k]! - im[j]!) + (imLow[k]! - imLow[j]!)
      const square = dr * dr + di * di
      if (square === 0) continue
      ur += (wr[j]! * dr + wi[j]! * di) / square
      ui += (wi[j]! * dr - wr[j]! * di) / square
    }
    const square = ur * ur + ui * ui
    const stepRe = (wr[k]! * ur + wi[k]! * ui) / square
    const stepIm = (wi[k]! * ur - wr[k]! * ui) / square
    return Number.isFinite(stepRe) && Number.isFinite(stepIm) ? [stepRe, stepIm] : [wr[k]!, wi[k]!]
  }

  private mirror(k: number, other: number): void {
    if (other === k) return
    const { re, reLow, im, imLow, correction } = this.roots
    re[other] = re[k]!
    reLow[other] = reLow[k]!
    im[other] = -im[k]!
    imLow[other] = -imLow[k]!
    this.wr[other] = this.wr[k]!
    this.wi[other] = -this.wi[k]!
    correction[other] = correction[k]!
    this.settled[other] = this.settled[k]!
  }
}

function move(high: Float64Array, low: Float64Array, k: number, step: number): void {
  const a = high[k]!
  const s = a - step
  const v = s - a
  const rest = (a - (s - v)) + (-step - v) + low[k]!
  high[k] = s + rest
  low[k] = rest - (high[k]! - s)
}

/** For each root the index of its conjugate; itself where it is real. */
function partners(re: Float64Array, im: Float64Array): Int32Array {
  const partner = new Int32Array(re.length).fill(-1)
  for (let k = 0; k < re.length; k++) {
    if (partner[k]! >= 0) continue
    partner[k] = k
    for (let j = k + 1; im[k] !== 0 && j < re.length; j++) {
      if (partner[j]! >= 0 || re[j] !== re[k] || im[j] !== -im[k]!) continue
      partner[k] = j
      partner[j] = k
      break
    }
  }
  return partner
}
