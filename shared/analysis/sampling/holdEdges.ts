import { Rational } from '../../numeric/extended/Rational'
import type { HoldGain } from '../../types/block'

/**
 * What the plant sees of one sample of the controller, delays included: `weight` at `whole - fraction` samples after the sample.
 * zeroOrder: a unit step there (its end a sample later is the factor 1 - 1/z); pwm: an impulse.
 */
export interface HoldEdge {
  weight: Rational
  /** samples, at least 0 */
  whole: number
  /** samples: in [0, 1) for zeroOrder, where a step is seen at once; in (0, 1] for pwm, where an impulse at a sampling instant comes just after the sample */
  fraction: Rational
}

const HALF = Rational.of(1n, 2n)

/** The edges of a hold whose plant has `delay` (s, at least 0) of dead time. */
export function holdEdges(hold: HoldGain, delay: Rational): HoldEdge[] {
  const samples = delay.over(Rational.fromDouble(hold.sampleTime))
  if (hold.hold === 'zeroOrder') {
    const lag = wholeWhereMeant(samples)
    const whole = ceiling(lag)
    return [{ weight: Rational.one, whole: Number(whole), fraction: Rational.of(whole, 1n).minus(lag) }]
  }
  return edgeInstants(hold).map((instant) => {
    const lag = wholeWhereMeant(samples.plus(instant))
    // the next sampling instant strictly after the edge
    const whole = -ceiling(lag.negated()) + 1n
    return { weight: HALF, whole: Number(whole), fraction: Rational.of(whole, 1n).minus(lag) }
  })
}

/** Instants of the two edges of a pwm hold in samples after the sample: (1 -+ D)/2 of one update a period, D and 1 - D of one an edge. */
function edgeInstants(hold: HoldGain): Rational[] {
  const duty = Rational.fromDouble(hold.duty ?? 0.5)
  const rest = Rational.one.minus(duty)
  return hold.hold === 'pwmSingleUpdate' ? [rest.times(HALF), Rational.one.plus(duty).times(HALF)] : [duty, rest]
}

function ceiling(value: Rational): bigint {
  const floor = value.numerator / value.denominator
  return value.numerator % value.denominator > 0n ? floor + 1n : floor
}

/** A number of samples, whole where the quotient of two decimal fractions misses that by rounding only (0.3/0.1), as for the dead time of a loop in z. */
function wholeWhereMeant(samples: Rational): Rational {
  const value = samples.toNumber()
  const whole = Math.round(value)
  return Math.abs(value - whole) <= 8 * Number.EPSILON * whole ? Rational.of(BigInt(whole), 1n) : samples
}
