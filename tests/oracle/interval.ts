/** A closed interval of reals, [least, greatest], widened outwards at every operation so that rounding is inside. */
export type Interval = readonly [number, number]

const U = 2 ** -52
const TINY = 1e-300

function outwards(low: number, high: number): Interval {
  return [low - Math.abs(low) * U - TINY, high + Math.abs(high) * U + TINY]
}

function add(a: Interval, b: Interval): Interval {
  return outwards(a[0] + b[0], a[1] + b[1])
}

function subtract(a: Interval, b: Interval): Interval {
  return outwards(a[0] - b[1], a[1] - b[0])
}

function multiply(a: Interval, b: Interval): Interval {
  const p = a[0] * b[0]
  const q = a[0] * b[1]
  const r = a[1] * b[0]
  const s = a[1] * b[1]
  return outwards(Math.min(p, q, r, s), Math.max(p, q, r, s))
}

function square(a: Interval): Interval {
  const p = a[0] * a[0]
  const q = a[1] * a[1]
  const [low, high] = outwards(a[0] <= 0 && a[1] >= 0 ? 0 : Math.min(p, q), Math.max(p, q))
  return [Math.max(0, low), high]
}

/** 1/a of an interval above zero; unbounded where it reaches zero. */
function reciprocalOfPositive(a: Interval): Interval {
  return outwards(1 / a[1], a[0] > 0 ? 1 / a[0] : Number.POSITIVE_INFINITY)
}

/** cos over an angle's interval; the runtime's cos is taken to err by less than 1e-15, the angle by its own rounding. */
function cosine(a: Interval): Interval {
  const width = a[1] - a[0]
  if (!(width < 2 * Math.PI)) return [-1, 1]
  const slack = 1e-15 + 4 * U * Math.max(Math.abs(a[0]), Math.abs(a[1]))
  const holds = (offset: number) => Math.floor((a[1] + slack - offset) / (2 * Math.PI)) > Math.floor((a[0] - slack - offset) / (2 * Math.PI))
  const ends = [Math.cos(a[0]), Math.cos(a[1])] as const
  return [holds(Math.PI) ? -1 : Math.min(...ends) - slack, holds(0) ? 1 : Math.max(...ends) + slack]
}

export const interval = { add, subtract, multiply, square, reciprocalOfPositive, cosine }
