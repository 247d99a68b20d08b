import { SERIES_DEGREE } from './LogSeries'
import { CLEARANCE, RIGHT_ENDS, type SearchBox } from './SearchBox'
import { sortFinds, truncateFinds, type FindList } from './SearchFinds'

const N = SERIES_DEGREE
const TWO_PI = 2 * Math.PI
const MOST_TURNS = 20_000

/** A count of phase crossovers that are not listed, by the sign of their slope. */
export interface TurnCount { count: number }

/**
 * Phase crossovers of a box; arguments and result as of `findGains`. With `turns`, where the phase is monotone its crossings are only counted, by the sign of
 * their slope.
 */
export function findPhases(box: SearchBox, finds: FindList, from: number, right: number, last: boolean, forced: boolean, turns: TurnCount | null): number {
  const { log } = box
  const mark = finds.v.length
  const centre = log.im[0]!
  const spread = log.spreadIm
  let firstTurn = Math.ceil((centre - spread - Math.PI) / TWO_PI)
  let lastTurn = Math.floor((centre + spread - Math.PI) / TWO_PI)
  if (firstTurn > lastTurn) return right
  const yFrom = box.coordinate(from)
  let yTo = 1
  let end = right
  if (!last) {
    yTo = Number.NaN
    for (const y of RIGHT_ENDS) {
      const offset = box.horner(log.im, y) - Math.PI
      if (Math.abs(offset - TWO_PI * Math.round(offset / TWO_PI)) > CLEARANCE * box.boundAt(y, log.steady)) {
        yTo = y
        break
      }
    }
    if (Number.isNaN(yTo) || !(box.place(yTo) > from)) return box.giveUp(finds, mark, 'phase', from, right, forced)
    if (yTo < 1) {
      end = box.place(yTo)
      yTo = box.coordinate(end)
    }
  }
  box.series.coefficients = log.im
  box.series.steady = log.steady
  // Monotone over the whole box: each turn between the ends is met exactly once.
  let bend = log.steady[1]! * 2 + log.tail[1]!
  for (let n = 2; n <= N; n++) bend += n * Math.abs(log.im[n]!)
  if (Math.abs(log.im[1]!) > bend) {
    const atFrom = box.horner(log.im, yFrom)
    const atTo = box.horner(log.im, yTo)
    const low = Math.min(atFrom, atTo)
    const high = Math.max(atFrom, atTo)
    firstTurn = Math.ceil((low - Math.PI) / TWO_PI)
    lastTurn = Math.floor((high - Math.PI) / TWO_PI)
    const nearFrom = (atFrom - Math.PI) - TWO_PI * Math.round((atFrom - Math.PI) / TWO_PI)
    if (Math.abs(nearFrom) <= box.boundAt(yFrom, log.steady)) return box.giveUp(finds, mark, 'phase', from, end, forced)
    if (last) {
      const nearTo = (atTo - Math.PI) - TWO_PI * Math.round((atTo - Math.PI) / TWO_PI)
      if (Math.abs(nearTo) <= box.boundAt(yTo, log.steady)) return box.giveUp(finds, mark, 'phase', from, end, forced)
    }
    if (turns) {
      turns.count += (atTo > atFrom ? 1 : -1) * Math.max(0, lastTurn - firstTurn + 1)
      return end
    }
    return collectTurns(box, finds, firstTurn, lastTurn, yFrom, yTo, atTo > atFrom ? 1 : -1, from, end)
  }
  // So many turns in a box that is not monotone: the rounding of a very long dead time hides the phase altogether.
  if (lastTurn - firstTurn > MOST_TURNS) return box.giveUp(finds, mark, 'phase', from, end, true)
  for (let turn = firstTurn; turn <= lastTurn; turn++) {
    log.im[0] = centre - Math.PI - TWO_PI * turn
    const outcome = box.isolator.isolate(box.series, yFrom, yTo)
    log.im[0] = centre
    if (outcome !== 'complete') {
      return box.giveUp(finds, mark, 'phase', from, end, forced)
    }
    if (box.collect(finds, 'phase', end, forced) < 0) {
      truncateFinds(finds, mark)
      return -1
    }
  }
  if (lastTurn > firstTurn) sortFinds(finds, mark)
  return end
}

/** Every turn of a monotone phase, from the polynomial's own root of each. */
function collectTurns(box: SearchBox, finds: FindList, first: number, last: number, yFrom: number, yTo: number, direction: number, from: number, end: number): number {
  const { im } = box.log
  let y = yFrom
  for (let i = 0; i <= last - first; i++) {
    const turn = direction > 0 ? first + i : last - i
    const target = Math.PI + TWO_PI * turn
    let low = yFrom
    let high = yTo
    for (let step = 0; step < 60; step++) {
      let value = 0
      let slope = 0
      for (let n = N; n >= 0; n--) {
        slope = slope * y + value
        value = value * y + im[n]!
      }
      const rest = direction * (value - target)
      if (rest > 0) high = y
      else low = y
      let next = y - (value - target) / slope
      if (!(next >= low && next <= high)) next = 0.5 * (low + high)
      const size = Math.abs(next - y)
      y = next
      if (size < 1e-9) break
    }
    const bracketFrom = Math.max(from, box.place(clearOf(box, target, y, -1, yFrom)))
    const bracketTo = Math.min(end, box.place(clearOf(box, target, y, 1, yTo)))
    box.refine(finds, 'phase', Math.min(Math.max(box.place(y), bracketFrom), bracketTo), bracketFrom, bracketTo, direction)
  }
  return end
}

/**
 * The nearest place to one side of a turn of a monotone phase where the phase is clear of it by its bound: a bracket's end. Steps start at a tenth
 * of a turn at the most and double, so that it stays well short of the next turn.
 */
function clearOf(box: SearchBox, target: number, y: number, side: 1 | -1, limit: number): number {
  let step = 0.3 / Math.abs(box.log.im[1]!)
  for (let i = 0; i < 60; i++, step *= 2) {
    const place = y + side * step
    if (side * (limit - place) <= 0) return limit
    if (Math.abs(box.horner(box.log.im, place) - target) > 2 * box.boundAt(place, box.log.steady)) return place
  }
  return limit
}
