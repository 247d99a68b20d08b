import { polynomialRoots } from '../../numeric/extended/polynomialRoots'
import type { FactoredLoop } from '../FactoredLoop'
import { BOUNDARY_DISTANCE } from './BoundaryRule'
import { closedLoopRoots } from './closedLoopRoots'
import { exactClosedLoopPolynomial } from './exactClosedLoopPolynomial'
import { ReturnDifferenceNumerator } from './ReturnDifferenceNumerator'
import { wholeSamples } from './wholeSamples'

export interface ClosedLoopCount {
  /** Closed-loop poles beyond the stability boundary: Re s > 0, or |z| > 1. */
  count: number
  /** Closed-loop poles within 1e-9 (relative) of the boundary, or not shown to lie on either side. */
  boundary: number
  /** True when every pole is shown to lie where it is counted. */
  certain: boolean
  /** Closed-loop poles, rad/s or plain numbers in z. */
  poles: { re: Float64Array, im: Float64Array }
}

/**
 * Closed-loop poles as roots of denominator + numerator of the loop gain and their number beyond the stability boundary:
 * a check of the counted encirclements by other means. Each root lies in a disc of radius n |W_k| about the value listed (W_k the Weierstrass
 * correction, with the error of its evaluation and of the factors), so a count whose discs are clear of the boundary is certain.
 * Null where dead time leaves no polynomial (in z a whole number of samples is no obstacle), and where the degree of the sum drops.
 */
export function closedLoopUnstableCount(loop: FactoredLoop): ClosedLoopCount | null {
  const delaySamples = wholeSamples(loop)
  if (delaySamples === null) return null
  if (loop.zeros.re.length === loop.poles.re.length && delaySamples === 0 && Math.abs(1 + loop.gain) <= 1e-12) return null
  const sum = new ReturnDifferenceNumerator(loop, delaySamples)
  const quick = closedLoopRoots(sum)
  if (quick) {
    const counted = countRoots(quick.re, quick.im, quick.radius, loop.sampleTime !== undefined)
    if (counted.certain) return counted
  }
  let exact
  try {
    exact = polynomialRoots(exactClosedLoopPolynomial(loop, delaySamples), loop.sampleTime !== undefined)
  }
  catch (error) {
    if (error instanceof RangeError) return null
    throw error
  }
  const n = exact.re.length
  const radius = new Float64Array(n)
  for (let k = 0; k < n; k++) {
    radius[k] = n * ((exact.correction[k] as number) + sum.modelError(exact.re, exact.im, k))
  }
  return countRoots(exact.re, exact.im, radius, loop.sampleTime !== undefined)
}

function countRoots(re: Float64Array, im: Float64Array, radius: Float64Array, sampled: boolean): ClosedLoopCount {
  let count = 0
  let boundary = 0
  let certain = true
  for (let k = 0; k < re.length; k++) {
    const x = re[k] as number
    const y = im[k] as number
    const modulus = Math.hypot(x, y)
    // signed distance beyond the boundary; in z as (|z|^2 - 1) / (|z| + 1)
    const beyond = sampled ? ((Math.abs(x) - 1) * (Math.abs(x) + 1) + y * y) / (modulus + 1) : x
    const near = BOUNDARY_DISTANCE * (sampled ? 1 : modulus)
    const reach = radius[k] as number
    if (!(reach < Infinity)) certain = false
    if (Math.abs(beyond) <= near) boundary++
    else if (Math.abs(beyond) <= reach) {
      boundary++
      certain = false
    }
    else if (beyond > 0) count++
  }
  return { count, boundary, certain, poles: { re, im } }
}
