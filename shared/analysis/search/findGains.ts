import { CLEARANCE, RIGHT_ENDS, type SearchBox } from './SearchBox'
import type { FindList } from './SearchFinds'

/**
 * Gain crossovers of a box from `from` to `right`, its right end (the end of the search where `last`). Returns the v up to which the gain is settled, a place
 * where its sign is clear, or -1 where a smaller box is needed; `forced`: a smaller one is not to be had.
 */
export function findGains(box: SearchBox, finds: FindList, from: number, right: number, last: boolean, forced: boolean): number {
  const { log } = box
  if (Math.abs(log.re[0]!) > log.spreadRe) return right
  const yFrom = box.coordinate(from)
  let yTo = 1
  let end = right
  if (!last) {
    yTo = Number.NaN
    for (const y of RIGHT_ENDS) {
      if (Math.abs(box.horner(log.re, y)) > CLEARANCE * box.boundAt(y, log.steadyRe)) {
        yTo = y
        break
      }
    }
    if (Number.isNaN(yTo) || !(box.place(yTo) > from)) return box.giveUp(finds, finds.v.length, 'gain', from, right, forced)
    if (yTo < 1) {
      end = box.place(yTo)
      yTo = box.coordinate(end)
    }
  }
  box.series.coefficients = log.re
  box.series.steady = log.steadyRe
  const outcome = box.isolator.isolate(box.series, yFrom, yTo)
  if (outcome !== 'complete') return box.giveUp(finds, finds.v.length, 'gain', from, end, forced)
  return box.collect(finds, 'gain', end, forced)
}
