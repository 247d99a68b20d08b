import { Rational } from '../../numeric/extended/Rational'
import { AnalysisInputError } from '../AnalysisInputError'
import { expressionLimits } from '../expressions/expressionLimits'
import type { HoldBlock, LoopAlgebra } from './LoopAlgebra'
import type { LoopPart } from './LoopPart'
import { sameSampleTime } from './sameSampleTime'

/** A dead time counts as whole samples when it differs from them by no more than this part of a sample: rounding of T and of n T. */
const WHOLE_SAMPLES = 1e-9

/** A gain in one domain; neutral for what has none: numbers, and measured responses. */
export interface SettledGain<V> {
  domain: 'neutral' | 'continuous' | 'sampled'
  value: V
}

/**
 * Products, sums and quotients of the parts of one expression, by the rules of the domains (README.md): continuous factors belong to the hold of their
 * product, sampled ones stand beside it; a sum needs terms of one domain. Faults carry the position given with each step.
 */
export class PartArithmetic<V> {
  constructor(
    private readonly algebra: LoopAlgebra<V>,
    /** s, of the loop; undefined for a continuous one */
    private readonly sampleTime: number | undefined,
    /** over blocks the rules of the house are stricter than for a formula alone */
    private readonly overBlocks: boolean,
  ) {}

  number(value: Rational): LoopPart<V> | null {
    return value.sign === 0 ? null : { ...EMPTY, number: value }
  }

  continuous(value: V): LoopPart<V> {
    return { ...EMPTY, continuous: value }
  }

  sampled(value: V): LoopPart<V> {
    return { ...EMPTY, sampled: value }
  }

  deadTime(delay: Rational): LoopPart<V> {
    return { ...EMPTY, delay }
  }

  measured(value: V): LoopPart<V> {
    return { ...EMPTY, measured: value }
  }

  hold(hold: HoldBlock): LoopPart<V> {
    return { ...EMPTY, hold }
  }

  brackets(part: LoopPart<V> | null): LoopPart<V> | null {
    return part && part.hold && hasContinuous(part) ? { ...part, closed: true } : part
  }

  negate(part: LoopPart<V> | null): LoopPart<V> | null {
    return part && { ...part, number: part.number.negated() }
  }

  multiply(a: LoopPart<V> | null, b: LoopPart<V> | null, position: number): LoopPart<V> | null {
    if (!a || !b) return null
    if (a.hold && b.hold) {
      if (!(a.closed && b.closed)) {
        throw new AnalysisInputError(
          `Two holds, ${a.hold.name} and ${b.hold.name}, stand in one product: put each in brackets with the continuous part behind it, as in (${a.hold.name}*G1)*(${b.hold.name}*G2).`, 'expression', position)
      }
      return this.multiply(this.behindHold(a, position), this.behindHold(b, position), position)
    }
    return this.bounded(position, () => ({
      number: a.number.times(b.number),
      sampled: this.both(a.sampled, b.sampled),
      continuous: this.both(a.continuous, b.continuous),
      measured: this.both(a.measured, b.measured),
      delay: a.delay.plus(b.delay),
      hold: a.hold ?? b.hold,
      closed: (a.closed && !hasContinuous(b)) || (b.closed && !hasContinuous(a)),
      noFeedthrough: a.noFeedthrough || b.noFeedthrough,
    }))
  }

  invert(part: LoopPart<V> | null, position: number): LoopPart<V> {
    if (!part) {
      throw new AnalysisInputError(this.overBlocks
        ? 'Division by zero: what stands here is zero at every frequency, an algebraic loop without a solution.'
        : 'Division by zero.', 'expression', position)
    }
    if (part.noFeedthrough) {
      throw new AnalysisInputError('An algebraic loop without a solution: the direct feedthrough of the sum that is divided by is zero at infinite frequency. One of its parts needs a lag or a delay.', 'expression', position)
    }
    if (part.hold) {
      if (!hasContinuous(part)) throw new AnalysisInputError(`The hold ${part.hold.name} cannot be divided by.`, 'expression', position)
      return this.invert(this.behindHold(part, position), position)
    }
    const { algebra } = this
    return {
      ...part,
      number: part.number.toPower(-1),
      sampled: part.sampled && algebra.invert(part.sampled),
      continuous: part.continuous && algebra.invert(part.continuous),
      measured: part.measured && algebra.invert(part.measured),
      delay: part.delay.negated(),
    }
  }

  raise(part: LoopPart<V> | null, exponent: number, position: number): LoopPart<V> | null {
    if (exponent === 0) return this.number(Rational.one)
    if (exponent < 0) return this.raise(this.invert(part, position), -exponent, position)
    if (!part || exponent === 1) return part
    if (part.hold && !hasContinuous(part)) throw new AnalysisInputError(`The hold ${part.hold.name} can stand in a product only once.`, 'expression', position)
    const base = part.hold ? this.behindHold(part, position) : part
    return this.bounded(position, () => ({
      ...base,
      number: base.number.toPower(exponent),
      sampled: base.sampled && this.algebra.raise(base.sampled, exponent),
      continuous: base.continuous && this.algebra.raise(base.continuous, exponent),
      measured: base.measured && this.algebra.raise(base.measured, exponent),
      delay: base.delay.times(Rational.of(BigInt(exponent), 1n)),
    }))
  }

  add(a: LoopPart<V> | null, b: LoopPart<V> | null, position: number): LoopPart<V> | null {
    if (!a || !b) return a ?? b
    return this.bounded(position, () => {
      const held = this.heldSum(a, b)
      return held === undefined ? this.settledSum(a, b, position) : held
    })
  }

  /** The part as a gain in one domain. @throws AnalysisInputError where a continuous factor stands beside a sampled one without a hold */
  settle(part: LoopPart<V>, position: number): SettledGain<V> {
    const { algebra, sampleTime } = this
    const { sampled, continuous, delay } = part
    if (part.hold) return this.settle(this.behindHold(part, position), position)
    if (sampled && continuous) throw withoutHold('factor', position)
    if (continuous) return { domain: 'continuous', value: this.inSeconds(part) }
    if (delay.sign === 0) return { domain: sampled ? 'sampled' : 'neutral', value: this.timesRest(sampled, part) }
    const count = sampleTime === undefined ? null : wholeSamples(delay, sampleTime)
    if (count !== null) return { domain: 'sampled', value: this.timesRest(this.both(sampled, algebra.unitDelays(count)), part) }
    if (sampled) {
      throw new AnalysisInputError(
        `A dead time of ${delay.toNumber()} s is no whole number of samples (${sampleTime} s each): beside sampled parts it has no equivalent in z. Put it behind a hold, with the continuous part it belongs to.`, 'expression', position)
    }
    return { domain: 'continuous', value: this.inSeconds(part) }
  }

  /** A part without sampled factors and hold as one continuous gain. */
  private inSeconds(part: LoopPart<V>): V {
    const { algebra } = this
    return this.timesRest(algebra.delay(part.continuous ?? algebra.number(Rational.one), part.delay), part)
  }

  /** A gain times the measured response and the number of a part. */
  private timesRest(value: V | null, { measured, number }: LoopPart<V>): V {
    const product = this.both(value, measured)
    return product ? this.algebra.scale(product, number) : this.algebra.number(number)
  }

  /** Two terms behind one and the same hold are one continuous sum behind it; undefined where they are not. */
  private heldSum(a: LoopPart<V>, b: LoopPart<V>): LoopPart<V> | null | undefined {
    if (!a.hold || !b.hold || a.sampled || b.sampled || !sameHold(a.hold, b.hold)) return undefined
    const { algebra } = this
    const sum = algebra.add(this.inSeconds(a), this.inSeconds(b))
    if (sum === null) return null
    // different dead times have an equivalent each, but not as one sum
    return algebra.hasSeveralDelays(sum) ? undefined : { ...EMPTY, continuous: sum, hold: a.hold }
  }

  private settledSum(a: LoopPart<V>, b: LoopPart<V>, position: number): LoopPart<V> | null {
    const left = this.settle(a, position)
    const right = this.settle(b, position)
    const domains = [left.domain, right.domain]
    if (domains.includes('continuous') && domains.includes('sampled')) {
      // what is a mere delay can stay continuous beside a continuous term
      if (a.sampled || a.hold || b.sampled || b.hold) throw withoutHold('term', position)
      return this.sumOf(this.inSeconds(a), this.inSeconds(b), 'continuous')
    }
    if (left.domain === 'neutral' && right.domain === 'neutral' && !a.measured && !b.measured) return this.number(a.number.plus(b.number))
    return this.sumOf(left.value, right.value, domains.includes('sampled') ? 'sampled' : domains.includes('continuous') ? 'continuous' : 'measured')
  }

  private sumOf(left: V, right: V, domain: 'continuous' | 'sampled' | 'measured'): LoopPart<V> | null {
    const sum = this.algebra.add(left, right)
    if (sum === null) return null
    const [before, after] = [[left, right].map(value => this.algebra.excess(value)), this.algebra.excess(sum)]
    const noFeedthrough = this.overBlocks && after !== null && after < 0 && before.every(excess => excess === 0 || (excess !== null && excess < 0)) && before.includes(0)
    return { ...EMPTY, [domain]: sum, noFeedthrough }
  }

  private behindHold(part: LoopPart<V>, position: number): LoopPart<V> {
    const { algebra } = this
    const { hold, continuous, delay } = part
    if (!hold) return part
    const behind = algebra.delay(continuous ?? algebra.number(Rational.one), delay)
    if (algebra.hasSeveralDelays(behind)) {
      throw new AnalysisInputError(
        `Behind the hold ${hold.name} stands a continuous sum or feedback with a dead time inside: it has no finite equivalent in z. Put each term behind the hold by itself, as in ${hold.name}*G1 + ${hold.name}*G2, or close that inner loop in samples.`, 'expression', position)
    }
    const sampled = this.bounded(position, () => ({ ...EMPTY, sampled: this.both(part.sampled, algebra.behindHold(behind, hold)) })).sampled
    return { ...part, sampled, continuous: null, delay: Rational.zero, hold: null, closed: false }
  }

  private both(a: V | null, b: V | null): V | null {
    return a && b ? this.algebra.multiply(a, b) : a ?? b
  }

  /** Runs one step and refuses results beyond the limits, with the place. */
  private bounded<P extends LoopPart<V> | null>(position: number, step: () => P): P {
    try {
      const part = step()
      if (part && part.number.bits > expressionLimits.bits) throw new RangeError('its numbers have too many digits')
      return part
    }
    catch (error) {
      if (error instanceof RangeError) throw new AnalysisInputError(`This part is too large to be worked out exactly: ${error.message}.`, 'expression', position)
      if (error instanceof AnalysisInputError && error.path === 'expression' && error.position === undefined) throw new AnalysisInputError(error.message, 'expression', position)
      throw error
    }
  }
}

const EMPTY = { number: Rational.one, sampled: null, continuous: null, measured: null, delay: Rational.zero, hold: null, closed: false, noFeedthrough: false } as const

const hasContinuous = (part: LoopPart<unknown>) => part.continuous !== null || part.measured !== null || part.delay.sign !== 0

function sameHold(a: HoldBlock, b: HoldBlock): boolean {
  return a.name === b.name || (a.gain.hold === b.gain.hold && (a.gain.duty ?? 0.5) === (b.gain.duty ?? 0.5) && sameSampleTime(a.gain.sampleTime, b.gain.sampleTime))
}

function withoutHold(what: 'factor' | 'term', position: number): AnalysisInputError {
  return new AnalysisInputError(what === 'factor'
    ? 'A sampled part is multiplied by a continuous one without a hold between them: name the hold in the same product, as in C*H0*G.'
    : 'A sampled part and a continuous one stand in one sum: put the continuous one behind a hold, as in C + H0*G.', 'expression', position)
}

function wholeSamples(delay: Rational, sampleTime: number): number | null {
  const samples = delay.over(Rational.fromDouble(sampleTime)).toNumber()
  const count = Math.round(samples)
  return Math.abs(samples - count) <= WHOLE_SAMPLES ? count : null
}
