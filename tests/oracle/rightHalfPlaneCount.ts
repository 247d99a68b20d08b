import { onAxis } from './ExactLoop'
import { integerPolynomial, type IntegerPolynomial } from './integerPolynomial'
import { isolatePositiveRoots } from './isolatePositiveRoots'
import type { PositiveRoot } from './PositiveRoot'

const sign = (c: bigint) => c > 0n ? 1 : c < 0n ? -1 : 0

/**
 * Number of roots with positive real part, exactly: a real polynomial of degree n turns along the upper half of the axis by (n - 2Z) 90 degrees
 * (L. Cremer 1947, A. V. Mikhailov 1938; the Hermite-Biehler theorem is the case Z = 0). The turn is told by the places where the image meets the
 * real axis, roots of the odd part, and the side and sense in which it does.
 * Roots at 0 are taken out first and not counted. Null where even and odd part have a common root: a root on the axis, or roots symmetric to the origin.
 */
export function rightHalfPlaneCount(polynomial: IntegerPolynomial): number | null {
  let p = integerPolynomial.trimmed(polynomial)
  while (p.length > 0 && p[0] === 0n) p = p.slice(1)
  const degree = p.length - 1
  if (degree <= 0) return 0
  const { even, odd } = onAxis(p)
  if (even.length === 0 || odd.length === 0 || integerPolynomial.gcd(even, odd).length > 1) return null
  const slopes = [integerPolynomial.derivative(odd)]
  while (slopes.at(-1)!.length > 1) slopes.push(integerPolynomial.derivative(slopes.at(-1)!))
  /** Sense in which the odd part passes zero: by its first derivative that is not zero there, 0 where it only touches. */
  const passage = (root: PositiveRoot) => {
    const order = slopes.findIndex(p => root.signOf(p) !== 0)
    return order % 2 === 0 ? root.signOf(slopes[order]!) : 0
  }
  // +1 where the image passes the real axis counter-clockwise; each passage stands for 90 degrees before and after it
  let quarters = sign(even[0]!) * sign(odd.find(c => c !== 0n)!)
  for (const root of isolatePositiveRoots(odd)) quarters += 2 * root.signOf(even) * passage(root)
  if (degree % 2 === 0) quarters -= sign(even[even.length - 1]!) * sign(odd[odd.length - 1]!)
  return (degree - quarters) / 2
}
