import { angleOf, dyadicProduct, dyadicRatio, dyadicValue, logOfDyadicRatio } from './axisValue'
import { dyadicToNumber, type Dyadic } from './dyadic'
import { exactLoop, onAxis, squaredMagnitude, type ExactLoop, type OracleCoefficients, type OracleRoots } from './ExactLoop'
import { integerPolynomial, type IntegerPolynomial } from './integerPolynomial'
import { isolatePositiveRoots } from './isolatePositiveRoots'
import type { PositiveRoot } from './PositiveRoot'
import { rightHalfPlaneCount } from './rightHalfPlaneCount'

const { add, subtract, multiply, raise, scale, derivative, gcd, exactQuotient, primitivePart } = integerPolynomial

export type OracleFrequency = number | 'infinity'

/**
 * How far (relative) a frequency moves when ln L changes by a few units in the last place, as it must where the given doubles are rounded: no
 * answer can be held to more.
 */
interface Conditioned { uncertainty?: number }
export interface ExactGainCrossover extends Conditioned { frequency: number, phaseMargin: number, delayMargin: number, slope: 'falling' | 'rising' }
export interface ExactPhaseCrossover extends Conditioned { frequency: OracleFrequency, gainMargin: number, slope: 'falling' | 'rising' }
export interface ExactApproach extends Conditioned {
  frequency: number
  distance: number
  gainChange: number
  phaseChange: number
  /** |d ln L / d ln w|: what one unit in the last place of the frequency is worth, beside a pole on the axis */
  steepness?: number
}

/** What must be true of a loop, from exact arithmetic on its doubles. */
export interface ExactAnswer {
  gainCrossovers: ExactGainCrossover[]
  phaseCrossovers: ExactPhaseCrossover[]
  closestApproaches: ExactApproach[]
  vectorMargin: { distance: number, frequency: OracleFrequency }
  complementarySensitivityPeak: number
  /** 1 / max |S - 1/2| */
  diskMargin: number
  /** null where a root stands on the axis or symmetric to another */
  openLoopUnstablePoles: number | null
  closedLoopUnstablePoles: number | null
  /** Touching without crossing and other ties: where there is one, the lists are no target. */
  ties: string[]
}

const DEGREES = 180 / Math.PI
/** 20 log10 e: dB of a nepers */
const DECIBELS = 20 / Math.LN10
/** Bits to which the exact values are taken at a root: far beyond what a damping of 1e-6 costs. */
const BITS = 120
const MEETS = 'L meets -1'
/** An end gain this near to 1 (nepers) is a tie to within rounding of the factors. */
const ROUNDING = 1e-13
/** Change of ln L (nepers, rad) that the rounding of the input's own doubles may stand for. */
const UNCERTAIN = 1e-14

function isExact(input: OracleRoots | OracleCoefficients | ExactLoop): input is ExactLoop {
  return 'numerator' in input && typeof input.numerator[0] === 'bigint'
}

export function wrapDegrees(angle: number): number {
  const turned = angle % 360
  return turned > 180 ? turned - 360 : turned <= -180 ? turned + 360 : turned
}

/** a'b - ab': its sign is that of the slope of a / b. */
function slopeOfRatio(a: IntegerPolynomial, b: IntegerPolynomial): IntegerPolynomial {
  return subtract(multiply(derivative(a), b), multiply(a, derivative(b)))
}

/** Even and odd part without the common factor that holds the roots on the axis. */
export function withoutAxisRoots(p: IntegerPolynomial): { even: IntegerPolynomial, odd: IntegerPolynomial, common: IntegerPolynomial } {
  const { even, odd } = onAxis(p)
  if (even.length === 0 || odd.length === 0) {
    const whole = even.length === 0 ? odd : even
    const common = primitivePart(whole)
    const unit = [whole[whole.length - 1]! / common[common.length - 1]!]
    return even.length === 0 ? { even: [], odd: unit, common } : { even: unit, odd: [], common }
  }
  const common = gcd(even, odd)
  if (common.length <= 1) return { even, odd, common: [1n] }
  // both parts over the same integer keep their ratio: multiply first so that both divisions are exact
  const lead = common[common.length - 1]! < 0n ? -common[common.length - 1]! : common[common.length - 1]!
  const factor = lead ** BigInt(Math.max(even.length, odd.length))
  const divide = (q: IntegerPolynomial) => {
    const scaled = scale(q, factor)
    const quotient = exactQuotient(scaled, common)
    // exactQuotient may return a multiple: bring it back to scaled / common
    const want = scaled[scaled.length - 1]! / common[common.length - 1]!
    return quotient[quotient.length - 1] === want ? quotient : quotient.map(c => c * want / quotient[quotient.length - 1]!)
  }
  return { even: divide(even), odd: divide(odd), common }
}

/**
 * Everything the contract asks of a rational loop without dead time, continuous or sampled, from exact arithmetic.
 *
 * Method: in x = w^2 (sampled: x = tan^2(wT/2), by the exact bilinear map) the sets are positive roots of integer polynomials with sign conditions:
 * gain crossovers |N|^2 - |D|^2 = 0; phase crossovers Im(N conj D) = 0 with Re(N conj D) < 0; minima of |1+L| roots of the slope of
 * |N+D|^2/|D|^2 that turn from minus to plus; the floor as a sign condition at each root. Roots are isolated by Descartes' rule in big
 * integers and narrowed without end, so nothing is missed, doubled or invented.
 *
 * Assumes: the doubles of the input are meant exactly; the gain floor is a multiple of 10 dB; no dead time.
 * @throws RangeError where there is dead time or the floor is no multiple of 10 dB
 */
export function exactAnswer(input: OracleRoots | OracleCoefficients | ExactLoop, gainFloor = -60): ExactAnswer {
  const loop = isExact(input) ? input : exactLoop(input)
  if (loop.deadTime !== 0) throw new RangeError('dead time is not for this oracle')
  if (gainFloor % 10 !== 0 || gainFloor > 0) throw new RangeError('the floor must be a multiple of 10 dB, at most 0')
  let { numerator, denominator } = loop
  while (numerator[0] === 0n && denominator[0] === 0n) {
    numerator = numerator.slice(1)
    denominator = denominator.slice(1)
  }
  const period = loop.sampleTime
  const ties: string[] = []

  const sum = add(numerator, denominator)
  const loopSquared = squaredMagnitude(numerator)
  const unitSquared = squaredMagnitude(denominator)
  const distanceSquared = squaredMagnitude(sum)
  const top = withoutAxisRoots(numerator)
  const bottom = withoutAxisRoots(denominator)
  // L = (real + jw imaginary) * common / positive
  const real = add(multiply(top.even, bottom.even), raise(multiply(top.odd, bottom.odd), 1))
  const imaginary = subtract(multiply(top.odd, bottom.even), multiply(top.even, bottom.odd))
  const common = multiply(top.common, bottom.common)
  const floorPower = 10n ** BigInt(-gainFloor / 10)
  const aboveFloor = subtract(scale(loopSquared, floorPower), unitSquared)

  const frequencyOf = (root: PositiveRoot): number => {
    const { mantissa, exponent } = root.squareRoot(80)
    const t = dyadicToNumber(mantissa, exponent)
    return period === undefined ? t : 2 / period * Math.atan(t)
  }
  const valuesAt = (root: PositiveRoot) => {
    const x = root.approximation(BITS)
    const w = root.squareRoot(BITS)
    const turn = dyadicValue(common, x)
    const re = dyadicProduct(dyadicValue(real, x), turn)
    const im = dyadicProduct(dyadicProduct(dyadicValue(imaginary, x), w), turn)
    const unit = dyadicValue(unitSquared, x)
    return {
      angle: angleOf(im, re),
      logGain: logOfDyadicRatio(dyadicValue(loopSquared, x), unit) / 2,
      distance: Math.sqrt(dyadicRatio(dyadicValue(distanceSquared, x), unit)),
    }
  }
  /** -1 where the polynomial falls through zero at the root, +1 where it rises, 0 (a tie) where it touches. */
  const passage = (root: PositiveRoot, p: IntegerPolynomial, what: string): -1 | 0 | 1 => {
    const sign = root.signOf(derivative(p))
    if (sign === 0) ties.push(`${what} touches near ${frequencyOf(root)}`)
    return sign
  }
  const startValue: Dyadic[] | null = denominator[0] !== 0n ? [{ mantissa: numerator[0] ?? 0n, exponent: 0 }, { mantissa: denominator[0]!, exponent: 0 }] : null
  const degreeDifference = denominator.length - numerator.length
  const endValue: Dyadic[] | null = degreeDifference < 0
    ? null
    : [{ mantissa: degreeDifference === 0 ? numerator[numerator.length - 1]! : 0n, exponent: 0 }, { mantissa: denominator[denominator.length - 1]!, exponent: 0 }]
  const endFrequency: OracleFrequency = period === undefined ? 'infinity' : Math.PI / period

  const gainAt = (value: Dyadic[]) => Math.log(Math.abs(dyadicRatio(value[0]!, value[1]!)))
  const gainDifference = subtract(loopSquared, unitSquared)
  if (gainDifference.length === 0) ties.push('|L| = 1 everywhere')
  const unityTo = (value: Dyadic[] | null) => value !== null && value[0]!.mantissa !== 0n && Math.abs(gainAt(value)) < ROUNDING
  if (unityTo(startValue)) ties.push('|L| = 1 to rounding at w = 0')
  if (unityTo(endValue)) ties.push('|L| = 1 to rounding at the upper end')
  const gainSlope = slopeOfRatio(loopSquared, unitSquared)
  const gainCrossovers = isolatePositiveRoots(gainDifference).flatMap((root) => {
    const sign = passage(root, gainDifference, '|L| = 1')
    if (sign === 0) return []
    const frequency = frequencyOf(root)
    const x = root.approximation(BITS)
    // d ln|L| / d ln x
    const steepness = Math.abs(dyadicRatio(dyadicProduct(x, dyadicValue(gainSlope, x)), dyadicProduct(dyadicValue(loopSquared, x), dyadicValue(unitSquared, x)))) / 2
    const phaseMargin = wrapDegrees(180 + valuesAt(root).angle * DEGREES)
    return [{
      frequency, phaseMargin, delayMargin: (phaseMargin < 0 ? phaseMargin + 360 : phaseMargin) / DEGREES / frequency,
      slope: sign < 0 ? 'falling' as const : 'rising' as const, uncertainty: UNCERTAIN / steepness,
    }]
  })

  const endCrosses = (value: Dyadic[] | null): value is Dyadic[] => value !== null && value[0]!.mantissa * value[1]!.mantissa < 0n
    && value[0]!.mantissa ** 2n * floorPower >= value[1]!.mantissa ** 2n
  if (imaginary.length === 0) ties.push('L is real everywhere')
  const turned = multiply(imaginary, common)
  const phaseCrossovers: ExactPhaseCrossover[] = isolatePositiveRoots(imaginary).flatMap((root) => {
    if (root.signOf(real) * root.signOf(common) >= 0 || root.signOf(aboveFloor) < 0) return []
    // with Re L < 0 the phase rises where Im L falls
    const sign = passage(root, turned, 'the negative real axis')
    if (sign === 0) return []
    const x = root.approximation(BITS)
    // d arg L / d ln x where Im = 0: w x Im' / Re
    const steepness = Math.abs(dyadicRatio(dyadicProduct(dyadicProduct(x, root.squareRoot(BITS)), dyadicValue(derivative(imaginary), x)), dyadicValue(real, x)))
    return [{ frequency: frequencyOf(root), gainMargin: -DECIBELS * valuesAt(root).logGain, slope: sign < 0 ? 'rising' as const : 'falling' as const, uncertainty: UNCERTAIN / steepness }]
  })
  if (endCrosses(startValue)) {
    const first = turned.find(c => c !== 0n) ?? 0n
    phaseCrossovers.unshift({ frequency: 0, gainMargin: -DECIBELS * gainAt(startValue), slope: first < 0n ? 'rising' : 'falling' })
  }
  if (endCrosses(endValue)) {
    const last = turned[turned.length - 1] ?? 0n
    phaseCrossovers.push({ frequency: endFrequency, gainMargin: -DECIBELS * gainAt(endValue), slope: last > 0n ? 'rising' : 'falling' })
  }

  const slopeOfDistance = slopeOfRatio(distanceSquared, unitSquared)
  if (slopeOfDistance.length === 0) ties.push('|1 + L| is constant')
  const bend = derivative(slopeOfDistance)
  const minima = isolatePositiveRoots(bottom.common.length > 1 ? exactQuotient(slopeOfDistance, bottom.common) : slopeOfDistance)
    .filter(root => root.signOf(bottom.common) !== 0 && passage(root, slopeOfDistance, 'the slope of |1 + L|') > 0)
    .filter((root) => {
      const clear = root.signOf(distanceSquared) !== 0
      if (!clear) ties.push(MEETS)
      return clear
    })
    .map((root) => {
      const x = root.approximation(BITS)
      const values = valuesAt(root)
      // second derivative of ln |1 + L| by ln x, against the rounding of its first, which ln L enters by |L / (1 + L)|
      const bending = dyadicRatio(dyadicProduct(dyadicProduct(x, x), dyadicValue(bend, x)), dyadicProduct(dyadicValue(distanceSquared, x), dyadicValue(unitSquared, x))) / 2
      const steepness = 2 * Math.abs(dyadicRatio(dyadicProduct(x, dyadicValue(gainSlope, x)), dyadicProduct(dyadicValue(loopSquared, x), dyadicValue(unitSquared, x))))
      return { root, frequency: frequencyOf(root), ...values, steepness, uncertainty: UNCERTAIN * Math.exp(values.logGain) / values.distance / bending }
    })
  const closestApproaches = minima.filter(({ root }) => root.signOf(aboveFloor) >= 0).map(({ frequency, distance, logGain, angle, uncertainty, steepness }) =>
    ({ frequency, uncertainty, steepness, distance, gainChange: -DECIBELS * logGain, phaseChange: -wrapDegrees(180 + angle * DEGREES) }))
  const vectorMargin = { distance: Number.POSITIVE_INFINITY, frequency: 0 as OracleFrequency }
  const consider = (distance: number, frequency: OracleFrequency) => {
    if (distance < vectorMargin.distance) Object.assign(vectorMargin, { distance, frequency })
  }
  const distanceOf = ([a, b]: Dyadic[]) => Math.abs(dyadicRatio({ mantissa: a!.mantissa + b!.mantissa, exponent: 0 }, b!))
  for (const { distance, frequency } of minima) consider(distance, frequency)
  if (startValue) consider(distanceOf(startValue), 0)
  if (endValue) consider(distanceOf(endValue), endFrequency)
  if (vectorMargin.distance < ROUNDING && !ties.includes(MEETS)) ties.push(MEETS)

  /** sqrt of the greatest value of p / |N + D|^2 over the axis, ends included. */
  const peakOver = (p: IntegerPolynomial, factor: IntegerPolynomial): number => {
    const slope = slopeOfRatio(p, distanceSquared)
    const inside = slope.length === 0 ? [] : isolatePositiveRoots(factor.length > 1 ? exactQuotient(slope, factor) : slope)
    const values = inside.map((root) => {
      const x = root.approximation(BITS)
      return dyadicRatio(dyadicValue(p, x), dyadicValue(distanceSquared, x))
    })
    const whole = (q: IntegerPolynomial, i: number) => ({ mantissa: q[i] ?? 0n, exponent: 0 })
    values.push(dyadicRatio(whole(p, 0), whole(distanceSquared, 0)))
    values.push(dyadicRatio(whole(p, distanceSquared.length - 1), whole(distanceSquared, distanceSquared.length - 1)))
    return Math.sqrt(Math.max(...values))
  }
  const marginal = ties.includes(MEETS) || distanceSquared[0] === 0n
  const unstable = (p: IntegerPolynomial) => rightHalfPlaneCount(p)
  return {
    gainCrossovers,
    phaseCrossovers,
    closestApproaches,
    vectorMargin,
    complementarySensitivityPeak: marginal ? Number.POSITIVE_INFINITY : peakOver(loopSquared, top.common),
    diskMargin: marginal ? 0 : 2 / peakOver(squaredMagnitude(subtract(denominator, numerator)), [1n]),
    openLoopUnstablePoles: unstable(denominator),
    closedLoopUnstablePoles: unstable(sum),
    ties,
  }
}
