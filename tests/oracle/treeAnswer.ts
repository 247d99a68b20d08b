import { encloseTree, type Jet } from './encloseTree'
import { wrapDegrees, type ExactApproach, type ExactGainCrossover, type ExactPhaseCrossover } from './exactAnswer'
import { interval, type Interval } from './interval'
import type { LoopTree } from './LoopTree'

const { add, subtract, multiply, square } = interval

export interface TreeAnswer {
  gainCrossovers: ExactGainCrossover[]
  phaseCrossovers: ExactPhaseCrossover[]
  closestApproaches: ExactApproach[]
  /** what stayed undecided */
  open: string[]
}

const DEGREES = 180 / Math.PI
const DECIBELS = 20 / Math.LN10
const NARROWEST = 1e-12

interface Sought {
  name: string
  /** a function of w whose roots are sought, and its derivative */
  value: (jet: Jet) => Interval
  slope: (jet: Jet) => Interval
  /** false where no root of it may count; a bound that is not a number (an unbounded box) rules nothing out */
  possible: (jet: Jet) => boolean
  roots: number[]
}

/** Roots are rejected beyond this by the point value, so that "possible" may be decided loosely on a box. */
const middleOf = (a: Interval) => (a[0] + a[1]) / 2

/**
 * All gain crossovers, phase crossovers and minima of |1 + L| of a tree inside a band, rigorously: interval arithmetic with derivatives; a box is done where a
 * mean-value enclosure keeps clear of zero, or where the derivative does and the signs at its ends tell. No Taylor models, no factors, no series:
 * nothing shared with the engine. What cannot be decided at a relative width of 1e-12 stands in `open`.
 */
export function treeAnswer(tree: LoopTree, band: [number, number], gainFloor: number): TreeAnswer {
  const floorSquared = 10 ** (gainFloor / 10)
  const size = ([{ re, im }]: Jet) => add(square(re), square(im))
  const one: Interval = [1, 1]
  const sought: Sought[] = [
    {
      name: '|L| = 1', roots: [],
      value: jet => subtract(size(jet), one),
      slope: ([l, d]) => multiply([2, 2], add(multiply(l.re, d.re), multiply(l.im, d.im))),
      possible: () => true,
    },
    {
      name: 'the negative real axis', roots: [],
      value: ([l]) => l.im,
      slope: ([, d]) => d.im,
      possible: jet => !(jet[0].re[0] > 0) && !(size(jet)[1] < floorSquared),
    },
    {
      name: 'the slope of |1 + L|', roots: [],
      value: ([l, d]) => add(multiply(add(l.re, one), d.re), multiply(l.im, d.im)),
      slope: ([l, d, e]) => add(add(square(d.re), square(d.im)), add(multiply(add(l.re, one), e.re), multiply(l.im, e.im))),
      possible: jet => !(size(jet)[1] < floorSquared),
    },
  ]
  const open: string[] = []
  const at = (w: number) => encloseTree(tree, [w, w])
  const signAt = (f: Sought, w: number) => {
    const [low, high] = f.value(at(w))
    return low > 0 ? 1 : high < 0 ? -1 : 0
  }
  const bisect = (f: Sought, a: number, b: number) => {
    let low = a
    let high = b
    const rising = signAt(f, b) > 0
    while (high - low > 2 ** -51 * high) {
      const middle = (low + high) / 2
      if ((middleOf(f.value(at(middle))) < 0) === rising) low = middle
      else high = middle
    }
    return (low + high) / 2
  }
  const stack: { a: number, b: number, wanted: Sought[] }[] = [{ a: band[0], b: band[1], wanted: sought }]
  while (stack.length > 0) {
    const { a, b, wanted } = stack.pop()!
    const c = b / a > 1.5 ? Math.sqrt(a * b) : a + (b - a) * 0.4923
    const jet = encloseTree(tree, [a, b])
    const centre = at(c)
    const offset: Interval = [a - c, b - c]
    const left = wanted.filter((f) => {
      if (!f.possible(jet)) return false
      const over = f.value(jet)
      if (over[0] > 0 || over[1] < 0) return false
      const slope = f.slope(jet)
      const mean = add(f.value(centre), multiply(slope, offset))
      if (mean[0] > 0 || mean[1] < 0) return false
      if (slope[0] > 0 || slope[1] < 0) {
        const [start, end] = [signAt(f, a), signAt(f, b)]
        if (start !== 0 && end !== 0) {
          if (start !== end) f.roots.push(bisect(f, a, b))
          return false
        }
      }
      if (b - a < NARROWEST * b) {
        open.push(`${f.name} near ${c}`)
        return false
      }
      return true
    })
    if (left.length > 0) stack.push({ a: c, b, wanted: left }, { a, b: c, wanted: left })
  }
  const describe = (w: number) => {
    const jet = at(w)
    const [re, im] = [middleOf(jet[0].re), middleOf(jet[0].im)]
    return { re, im, logGain: Math.log(Math.hypot(re, im)), margin: wrapDegrees(180 + Math.atan2(im, re) * DEGREES), jet }
  }
  const [gain, phase, distance] = sought as [Sought, Sought, Sought]
  for (const f of sought) f.roots.sort((p, q) => p - q)
  return {
    open,
    gainCrossovers: gain.roots.map((w) => {
      const { margin, jet } = describe(w)
      return { frequency: w, phaseMargin: margin, delayMargin: (margin < 0 ? margin + 360 : margin) / DEGREES / w, slope: middleOf(gain.slope(jet)) < 0 ? 'falling' as const : 'rising' as const }
    }),
    phaseCrossovers: phase.roots.filter(w => describe(w).re < 0 && describe(w).logGain >= gainFloor / DECIBELS).map((w) => {
      const { logGain, jet } = describe(w)
      return { frequency: w, gainMargin: -DECIBELS * logGain, slope: middleOf(phase.slope(jet)) < 0 ? 'rising' as const : 'falling' as const }
    }),
    closestApproaches: distance.roots.filter(w => middleOf(distance.slope(at(w))) > 0 && describe(w).logGain >= gainFloor / DECIBELS).map((w) => {
      const { re, im, logGain, margin } = describe(w)
      return { frequency: w, distance: Math.hypot(1 + re, im), gainChange: -DECIBELS * logGain, phaseChange: -margin }
    }),
  }
}
