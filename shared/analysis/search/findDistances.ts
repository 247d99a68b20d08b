import { powerOf } from '#shared/numeric/series/powerOf'
import { SERIES_DEGREE } from './LogSeries'
import { CLEARANCE, RIGHT_ENDS, type SearchBox } from './SearchBox'
import { truncateFinds, type FindList } from './SearchFinds'
import type { StationarySeries } from './StationarySeries'

const N = SERIES_DEGREE

/**
 * Minima (maxima are passed over) of |1 + L|, or of |1 + 1/L|, in a box; arguments and result as of `findGains`. The stretches it goes by are as long as the
 * exponential of the series allows.
 */
export function findDistances(box: SearchBox, finds: FindList, kind: 'distance' | 'inverseDistance', from: number, right: number, last: boolean, forced: boolean): number {
  const sign = kind === 'distance' ? 1 : -1
  const { log, stationary, isolator } = box
  if (gainRules(box, sign)) return right
  const mark = finds.v.length
  const told = box.exceptions.length
  // What was told of a box that turns out too large is told again by the smaller one.
  const settle = (done: number) => {
    if (done < 0) box.exceptions.length = told
    return done
  }
  let yFrom = box.coordinate(from)
  let left = from
  let yTo = 1
  for (let tries = 0; yFrom < 1; tries++) {
    if (tries > 4000) return settle(box.giveUp(finds, mark, kind, left, right, forced))
    const middle = 0.5 * (yFrom + yTo)
    const half = 0.5 * (yTo - yFrom)
    if (!stationary.build(log, middle, half, sign)) {
      yTo = yFrom + Math.max(2 * half * Math.min(0.75, 2.2 / stationary.spread), 1e-9)
      continue
    }
    const atEnd = last && yTo >= 1
    let xTo = 1
    let stop = yTo >= 1 ? right : box.place(yTo)
    if (excludesZero(stationary)) {
      yFrom = yTo
      left = stop
      yTo = Math.min(1, yTo + 2.4 * half)
      continue
    }
    if (!atEnd) {
      xTo = clearEnd(stationary)
      if (Number.isNaN(xTo)) {
        if (half < 1e-5) return settle(box.giveUp(finds, mark, kind, left, right, forced))
        yTo = yFrom + half
        continue
      }
      if (xTo < 1) {
        stop = box.place(middle + half * xTo)
        xTo = Math.min(1, (box.coordinate(stop) - middle) / half)
      }
    }
    const outcome = isolator.isolate(stationary, -1, xTo)
    if (outcome !== 'complete') {
      if (half < 1e-5 || (outcome === 'unclearFrom' && tries > 60)) return settle(box.giveUp(finds, mark, kind, left, right, forced))
      yTo = yFrom + half
      continue
    }
    if (box.collect(finds, kind, stop, forced, middle, half) < 0) {
      truncateFinds(finds, mark)
      return settle(-1)
    }
    if (yTo >= 1 && xTo === 1) return right
    // At a box's right end a place just short of it will do: the next box goes on from there.
    if (yTo >= 1 && !last) return stop
    yFrom = box.coordinate(stop)
    left = stop
    yTo = Math.min(1, yFrom + 2.4 * half)
  }
  return right
}

/** Where |L| > 1 and |m'|(|L| - 1) > |phi'| over the whole box, |1 + L| has no stationary point. */
function gainRules(box: SearchBox, sign: number): boolean {
  const { re, im, steady, steadyRe, tail, spreadRe } = box.log
  const least = sign * re[0]! - spreadRe
  if (least <= 0) return false
  let slope = Math.abs(re[1]!) - 2 * steadyRe[1]! - tail[1]!
  let turn = Math.abs(im[1]!) + 2 * steady[1]! + tail[1]!
  for (let n = 2; n <= N; n++) {
    slope -= n * Math.abs(re[n]!)
    turn += n * Math.abs(im[n]!)
  }
  return slope > 0 && slope * Math.expm1(least) > turn
}

/** The slope stays clear of zero over the whole stretch. */
function excludesZero({ coefficients, steady, tail }: StationarySeries): boolean {
  let spread = 0
  for (let n = 1; n < N; n++) spread += Math.abs(coefficients[n]!)
  const rounding = 4 * N * 2 ** -53 * (spread + Math.abs(coefficients[0]!))
  return Math.abs(coefficients[0]!) > spread + steady[0]! + tail[0]! + rounding
}

/** The rightmost place tried, in x, where the sign of the slope is clear; NaN: none. */
function clearEnd({ coefficients, steady, tail }: StationarySeries): number {
  for (const x of RIGHT_ENDS) {
    let value = 0
    for (let n = N - 1; n >= 0; n--) value = value * x + coefficients[n]!
    if (Math.abs(value) > CLEARANCE * (steady[0]! * 2 + tail[0]! * powerOf(x, N))) return x
  }
  return Number.NaN
}
