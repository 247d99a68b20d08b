import { interval, type Interval } from './interval'
import type { LoopTree } from './LoopTree'

const { add, subtract, multiply, square, reciprocalOfPositive, cosine } = interval

export interface ComplexInterval { re: Interval, im: Interval }
/** Value, first and second derivative by w. */
export type Jet = readonly [ComplexInterval, ComplexInterval, ComplexInterval]

const point = (x: number): Interval => [x, x]
const ZERO: ComplexInterval = { re: point(0), im: point(0) }

const plus = (a: ComplexInterval, b: ComplexInterval): ComplexInterval => ({ re: add(a.re, b.re), im: add(a.im, b.im) })
const minus = (a: ComplexInterval, b: ComplexInterval): ComplexInterval => ({ re: subtract(a.re, b.re), im: subtract(a.im, b.im) })
const times = (a: ComplexInterval, b: ComplexInterval): ComplexInterval =>
  ({ re: subtract(multiply(a.re, b.re), multiply(a.im, b.im)), im: add(multiply(a.re, b.im), multiply(a.im, b.re)) })
const twice = (a: ComplexInterval): ComplexInterval => plus(a, a)

function inverse(b: ComplexInterval): ComplexInterval {
  const scale = reciprocalOfPositive(add(square(b.re), square(b.im)))
  return { re: multiply(b.re, scale), im: multiply([-b.im[1], -b.im[0]], scale) }
}

/** L(jw) and its first two derivatives over an interval of w, enclosed by interval arithmetic on the tree. */
export function encloseTree(tree: LoopTree, w: Interval): Jet {
  switch (tree.kind) {
    case 'constant': return [{ re: point(tree.value), im: point(0) }, ZERO, ZERO]
    case 's': return [{ re: point(0), im: w }, { re: point(0), im: point(1) }, ZERO]
    case 'delay': {
      const t = point(tree.seconds)
      const angle = multiply(w, t)
      const sine = cosine(subtract(angle, [Math.PI / 2 - 1e-15, Math.PI / 2 + 1e-15]))
      const value: ComplexInterval = { re: cosine(angle), im: [-sine[1], -sine[0]] }
      const turn: ComplexInterval = { re: point(0), im: [-tree.seconds, -tree.seconds] }
      const first = times(value, turn)
      return [value, first, times(first, turn)]
    }
  }
  const a = encloseTree(tree.left, w)
  const b = encloseTree(tree.right, w)
  switch (tree.kind) {
    case 'sum': return [plus(a[0], b[0]), plus(a[1], b[1]), plus(a[2], b[2])]
    case 'difference': return [minus(a[0], b[0]), minus(a[1], b[1]), minus(a[2], b[2])]
    case 'product': return [
      times(a[0], b[0]),
      plus(times(a[1], b[0]), times(a[0], b[1])),
      plus(plus(times(a[2], b[0]), twice(times(a[1], b[1]))), times(a[0], b[2])),
    ]
    case 'quotient': {
      const over = inverse(b[0])
      const value = times(a[0], over)
      const first = times(minus(a[1], times(value, b[1])), over)
      return [value, first, times(minus(minus(a[2], twice(times(first, b[1]))), times(value, b[2])), over)]
    }
  }
}
