import { dyadicValue, logOfDyadicRatio } from './axisValue'
import { exactLoop, squaredMagnitude, type OracleRoots } from './ExactLoop'
import { integerPolynomial } from './integerPolynomial'
import { isolatePositiveRoots } from './isolatePositiveRoots'

const { subtract, multiply, derivative } = integerPolynomial

/** ln |L| at every frequency inside the axis where |L| is stationary, from exact arithmetic; dead time does not enter. */
export function exactStationaryGains(input: OracleRoots): number[] {
  const { numerator, denominator } = exactLoop({ ...input, deadTime: 0 })
  const top = squaredMagnitude(numerator)
  const bottom = squaredMagnitude(denominator)
  const slope = subtract(multiply(derivative(top), bottom), multiply(top, derivative(bottom)))
  if (slope.length === 0) return []
  return isolatePositiveRoots(slope).flatMap((root) => {
    const x = root.approximation(120)
    const [a, b] = [dyadicValue(top, x), dyadicValue(bottom, x)]
    return a.mantissa === 0n || b.mantissa === 0n || root.signOf(top) === 0 || root.signOf(bottom) === 0 ? [] : [logOfDyadicRatio(a, b) / 2]
  })
}
