import { closedLoopCountWithDelay } from './closedLoopCountWithDelay'
import { constant, delay, difference, polynomial, product, quotient, sum, type LoopTree } from './LoopTree'
import { rightHalfPlaneCount } from './rightHalfPlaneCount'
import { exactLoop } from './ExactLoop'
import { integerPolynomial } from './integerPolynomial'
import { seededRandom } from './seededRandom'

export const TREE_FAMILIES = ['two paths', 'predictor', 'three dead times', 'inner loop with dead time'] as const
export type TreeFamily = typeof TREE_FAMILIES[number]

export interface GeneratedTree {
  tree: LoopTree
  band: [number, number]
  gainFloor: number
  /** closed-loop poles beyond the boundary, where they follow from a loop with one dead time; null: not known here */
  closedLoopUnstablePoles: number | null
}

const times = (p: number[], q: number[]) => {
  const r = new Array<number>(p.length + q.length - 1).fill(0)
  p.forEach((a, i) => q.forEach((b, j) => {
    r[i + j]! += a * b
  }))
  return r
}
const plus = (p: number[], q: number[]) => {
  const length = Math.max(p.length, q.length)
  return Array.from({ length }, (_, i) => (p[i - length + p.length] ?? 0) + (q[i - length + q.length] ?? 0))
}
const fraction = (numerator: number[], denominator: number[]) => quotient(polynomial(numerator), polynomial(denominator))

/** The seed-th loop gain of a family with several dead times. Closed forms of the count: the characteristic function of each has one dead time only. */
export function generateTree(family: TreeFamily, seed: number): GeneratedTree {
  const random = seededRandom(seed * 31 + TREE_FAMILIES.indexOf(family) * 7 + 3)
  const log = (low: number, high: number) => Number(Math.exp(Math.log(low) + Math.log(high / low) * random()).toPrecision(6))
  const mode = (): number[] => {
    const w = log(0.3, 20)
    return [1, Number((2 * log(0.01, 0.7) * w).toPrecision(6)), Number((w * w).toPrecision(6))]
  }
  const lag = () => [1, log(0.1, 10)]
  const band: [number, number] = [1e-2, 1e3]
  const gainFloor = -40
  switch (family) {
    case 'two paths': {
      const [n1, d1, n2, d2] = [[log(0.2, 20)], times(lag(), mode()), [log(0.1, 10)], random() < 0.5 ? mode() : times(lag(), lag())]
      const tau = log(0.01, 1)
      const tree = sum(fraction(n1, d1), product(fraction(n2, d2), delay(tau)))
      // d1 d2 + n1 d2 + n2 d1 exp(-tau s)
      const closedLoopUnstablePoles = closedLoopCountWithDelay({ numerator: times(n2, d1), denominator: plus(times(d1, d2), times(n1, d2)) }, tau)
      return { tree, band, gainFloor, closedLoopUnstablePoles }
    }
    case 'predictor': {
      const [numerator, denominator] = [[log(0.5, 5), log(0.5, 5)], times([1, 0], random() < 0.5 ? times(lag(), lag()) : mode())]
      const tau = log(0.05, 1)
      const model = fraction(numerator, denominator)
      const tree = quotient(product(model, delay(tau)), sum(constant(1), product(model, difference(constant(1), delay(tau)))))
      const { numerator: top, denominator: bottom } = exactLoop({ numerator, denominator })
      return { tree, band, gainFloor, closedLoopUnstablePoles: rightHalfPlaneCount(integerPolynomial.add(top, bottom)) }
    }
    case 'three dead times': {
      const path = (seconds: number) => product(fraction([log(0.1, 5)], random() < 0.7 ? mode() : lag()), delay(seconds))
      const paths = sum(sum(path(log(0.005, 0.1)), path(log(0.005, 0.3))), path(log(0.02, 0.5)))
      return { tree: product(fraction([log(0.2, 5)], lag()), paths), band, gainFloor, closedLoopUnstablePoles: null }
    }
    case 'inner loop with dead time': {
      const [g, a, k, c, tau] = [log(0.5, 10), log(0.5, 10), log(0.05, 1), log(0.2, 5), log(0.005, 0.3)]
      const inner = product(fraction([g], [1, a]), delay(tau))
      const tree = product(fraction([c], [1, 0]), quotient(inner, sum(constant(1), product(constant(k), inner))))
      // s (s + a) + (k s + c) g exp(-tau s)
      return { tree, band, gainFloor, closedLoopUnstablePoles: closedLoopCountWithDelay({ numerator: [k * g, c * g], denominator: [1, a, 0] }, tau) }
    }
  }
}
