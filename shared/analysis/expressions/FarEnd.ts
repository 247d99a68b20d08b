import type { AxisLoop } from '../search/AxisLoop'
import type { EndDemands, SettledEnd } from '../search/settleEnd'
import type { GeneralLoop, GeneralSum, GeneralTerm } from './GeneralLoop'

const STEP = 1.5
const MAX_STEPS = 400
/** Turns of the longest dead time that are still searched where the end itself is open. */
const TURNS = 200

/** |roots| of a product, each as often as it counts; the sum of their real parts, sign and dead time of the product. */
interface Sizes { logGain: number, roots: number[], sum: number, negative: boolean, deadTime: number }

/** A sum as its term of highest degree times 1 + e, |e| at most the sum of the others over it. */
interface Dominated { power: number, others: Other[] }

/** A term over the dominating one: sizes of roots above and below, ln and sign of the leading coefficient, and the further dead time. */
interface Other { logRatio: number, negative: boolean, deadTime: number, up: number[], down: number[] }

/**
 * The far end of the axis of a loop gain with different dead times: no series in 1/v serves there, but |L| has a bound that falls
 * with v. With |jv - r| between v - |r| and v + |r|, and each sum P_0 exp(..)(1 + e), |e| <= sum |P_t/P_0|.
 */
export class FarEnd {
  private readonly ups: number[] = []
  private readonly downs: number[] = []
  private readonly logGain: number
  private readonly sums: Dominated[]
  private readonly largest: number
  /** Of the dominating product: sum of the real parts of its zeros less those of its poles, whether it is negative, its dead time. */
  private sum = 0
  private negative: boolean
  private deadTime: number

  /** `rational` is the part of L without its sums, on the axis. */
  constructor(rational: AxisLoop, loop: GeneralLoop, private readonly degree: number, private readonly longestDelay: number) {
    let logGain = Math.log(Math.abs(rational.gain))
    this.negative = rational.gain < 0
    this.deadTime = rational.deadTime
    for (let k = 0; k < rational.count; k++) {
      this.sum += rational.weight[k]! * rational.re[k]!
      const sizes = rational.weight[k]! > 0 ? this.ups : this.downs
      sizes.push(Math.hypot(rational.re[k]!, rational.im[k]!))
    }
    for (let k = 0; k < Math.abs(rational.originWeight); k++) (rational.originWeight > 0 ? this.ups : this.downs).push(0)
    this.sums = loop.sums.map((sum) => {
      const sizes = sum.terms.map(term => sizesOf(loop, term))
      const main = mainTerm(sum, sizes)
      logGain += sum.power * main.logGain
      this.sum += sum.power * main.sum
      this.deadTime += sum.power * main.deadTime
      if (main.negative && sum.power % 2 !== 0) this.negative = !this.negative
      for (let repeat = 0; repeat < Math.abs(sum.power); repeat++) (sum.power > 0 ? this.ups : this.downs).push(...main.roots)
      return {
        power: sum.power,
        others: sizes.filter(other => other !== main).map(other => ({
          logRatio: other.logGain - main.logGain,
          negative: other.negative !== main.negative,
          deadTime: other.deadTime - main.deadTime,
          up: other.roots,
          down: main.roots,
        })),
      }
    })
    this.logGain = logGain
    const all = [...this.ups, ...this.downs, ...this.sums.flatMap(sum => sum.others.flatMap(other => other.up))]
    this.largest = Math.max(1e-300, ...all, 1 / longestDelay)
  }

  settle(demands: EndDemands): SettledEnd {
    const floor = Math.min(0, demands.floorLog)
    let edge = 2 * this.largest
    for (let i = 0; i < MAX_STEPS && this.degree < 0 && edge < 1e290; i++, edge *= STEP) {
      const bound = this.bound(edge)
      if (bound < floor) return this.describe(edge, bound)
    }
    edge = Math.max(10 * this.largest, TURNS / this.longestDelay)
    return {
      ...this.describe(edge, this.bound(edge)),
      skippedBelow: Infinity,
      value: Number.NaN, re: Number.NaN, im: Number.NaN,
      logGain: this.bound(edge),
      open: 'with several dead times L has no limit it nears in one way: it turns or waves endlessly, and what lies here is not shown',
    }
  }

  /**
   * True when |1 + L| >= 1 from v on, as it is towards infinity for many a loop whose dominating product has no dead time: with x = 1/v its angle is
   * a whole number of quarter turns and d, |d - x sum Re r| <= sum (|r| x)^2/(2 - 2|r| x) + what the others add. Then Re L >= -|L|^2/2 is shown
   * with quantities over x that only get better as x falls.
   */
  staysClear(v: number): boolean {
    if (this.deadTime > 0 || this.degree >= 0 || !(v > 2 * this.largest)) return false
    const x = 1 / v
    let angle = 0
    let logLeast = this.logGain
    for (const size of [...this.ups, ...this.downs]) angle += (size * x) ** 2 / (2 - 2 * size * x)
    for (const size of this.ups) logLeast += Math.log(v - size)
    for (const size of this.downs) logLeast -= Math.log(v + size)
    for (const { power, others } of this.sums) {
      const e = largestRatio(others, v)
      if (!(e < 0.5) || others.some(({ up, down }) => up.length >= down.length)) return false
      // log(1 + e) differs from e by less than e^2/(2 - 2e); of e what falls as x is added up below, with its sign
      angle += Math.abs(power) * (e * e / (2 - 2 * e) + restRatio(others, v))
      logLeast += power > 0 ? power * Math.log1p(-e) : power * Math.log1p(e)
    }
    angle += leadingRatio(this.sums) * x
    const total = Math.abs(this.sum) * x + angle
    if (!(total < 0.5)) return false
    const quarter = (((this.negative ? 2 : 0) + this.degree) % 4 + 4) % 4
    if (quarter === 0) return true
    if (quarter === 2) return false
    const side = quarter === 3 ? 1 : -1
    // |L|/x tends to a constant from below for one pole in excess, to zero for more
    const size = this.degree === -1 ? Math.exp(logLeast) / x : 0
    return 2 * (side * this.sum - angle / x - total ** 3 / 6 / x) + size > 0
  }

  private describe(edge: number, bound: number): SettledEnd {
    return {
      edge, logGain: -Infinity, quarterTurns: Number.NaN, value: 0, re: 0, im: 0, phaseOffset: 0, unity: false, flat: [], skippedBelow: bound,
    }
  }

  /** Greatest ln|L| from v to infinity; Infinity where a sum that is divided by may vanish there. */
  private bound(v: number): number {
    let log = this.logGain
    for (const size of this.ups) log += Math.log(v + size)
    for (const size of this.downs) log -= Math.log(v - size)
    for (const { power, others } of this.sums) {
      const e = largestRatio(others, v)
      if (power > 0) log += power * Math.log1p(e)
      else log += e < 1 ? power * Math.log1p(-e) : Infinity
    }
    return log + 1e-9
  }
}

/** Greatest sum of |P_t/P_0| from v to infinity. */
function largestRatio(others: Other[], v: number): number {
  let sum = 0
  for (const { logRatio, up, down } of others) {
    let ratio = logRatio
    for (const size of up) ratio += Math.log(v + size)
    for (const size of down) ratio -= Math.log(v - size)
    sum += Math.exp(ratio)
  }
  return sum
}

/** Sum over the dead times of |sum of power P_t/P_0 (s) s| for s -> infinity: what the terms of one degree less add to log L, over x. */
function leadingRatio(sums: Dominated[]): number {
  const leads = new Map<number, number>()
  for (const { power, others } of sums) {
    for (const { logRatio, negative, deadTime, up, down } of others) {
      if (down.length - up.length !== 1) continue
      leads.set(deadTime, (leads.get(deadTime) ?? 0) + power * (negative ? -1 : 1) * Math.exp(logRatio))
    }
  }
  let sum = 0
  for (const lead of leads.values()) sum += Math.abs(lead) * (1 + 1e-12) + 1e-300
  return sum
}

/** The same ratios at v and beyond without those leading parts. */
function restRatio(others: Other[], v: number): number {
  let sum = 0
  for (const other of others) {
    const size = largestRatio([other], v)
    sum += other.down.length - other.up.length === 1 ? Math.max(0, size - Math.exp(other.logRatio) / v) + 1e-15 * size : size
  }
  return sum
}

function sizesOf(loop: GeneralLoop, term: GeneralTerm): Sizes {
  const roots: number[] = []
  let sum = 0
  for (const { polynomial, power } of term.factors) {
    const list = loop.polynomials[polynomial]!
    for (let repeat = 0; repeat < power; repeat++) {
      for (let k = 0; k < list.re.length; k++) {
        roots.push(Math.hypot(list.re[k]!, list.im[k]!))
        sum += list.re[k]!
      }
    }
  }
  return { logGain: Math.log(Math.abs(term.gain)), roots, sum, negative: term.gain < 0, deadTime: term.deadTime }
}

/** The undelayed term of a sum that is divided by (its degree is highest), else the term of highest degree and gain. */
function mainTerm(sum: GeneralSum, sizes: Sizes[]): Sizes {
  let main = sizes[0]!
  if (sum.power < 0) return main
  for (const other of sizes) {
    const higher = other.roots.length - main.roots.length
    if (higher > 0 || (higher === 0 && other.logGain > main.logGain)) main = other
  }
  return main
}
