import type { EnclosedSeries } from '#shared/numeric/series/EnclosedSeries'
import { RootIsolator } from '#shared/numeric/series/RootIsolator'
import { powerOf } from '#shared/numeric/series/powerOf'
import type { AxisLoop } from './AxisLoop'
import { FindRefiner, type FindKind } from './FindRefiner'
import { LogSeries, SERIES_DEGREE } from './LogSeries'
import { truncateFinds, type FindList, type SearchException } from './SearchFinds'
import { StationarySeries } from './StationarySeries'

const N = SERIES_DEGREE

/** Right ends tried for a box, where the sign of a function must be clear: in y. */
export const RIGHT_ENDS = [1, 0.93, 0.86, 0.79, 0.7]
/** How much clearer than its bound a sign must be where two boxes meet, so that the next box sees it too. */
export const CLEARANCE = 4

/**
 * One box of the search, v = centre + half y, with the series of log L on it and what the finders of gain, phase and distance share: places,
 * bounds, the refinement of what was isolated, and the telling of what was not. Laid again and again by `AxisSearch`.
 */
export class SearchBox {
  readonly log = new LogSeries()
  readonly isolator = new RootIsolator()
  readonly stationary = new StationarySeries()
  readonly exceptions: SearchException[] = []
  /** The series the isolator works on: of the gain or the phase. */
  readonly series: EnclosedSeries

  private readonly refiner: FindRefiner

  constructor(axis: AxisLoop) {
    this.refiner = new FindRefiner(axis)
    this.series = {
      degree: N, coefficients: this.log.re, steady: this.log.steadyRe, tail: this.log.tail, tailOrder: N + 1,
    }
  }

  place(y: number): number {
    return this.log.centre + this.log.half * y
  }

  coordinate(v: number): number {
    return Math.min(1, Math.max(-1, (v - this.log.centre) / this.log.half))
  }

  horner(coefficients: Float64Array, y: number): number {
    let value = 0
    for (let n = N; n >= 0; n--) value = value * y + coefficients[n]!
    return value
  }

  boundAt(y: number, steady: Float64Array): number {
    return steady[0]! * 2 + this.log.tail[0]! * powerOf(Math.abs(y), N + 1)
  }

  /** Refines what the isolator found (in y = middle + half x) and notes the stretches it could not decide. */
  collect(finds: FindList, kind: FindKind, end: number, forced: boolean, middle = 0, half = 1): number {
    const { isolator } = this
    if (isolator.undecided.from.length > 0 && !forced && this.tailMatters(kind)) return -1
    for (let i = 0; i < isolator.undecided.from.length; i++) {
      this.exceptions.push({
        from: this.place(middle + half * isolator.undecided.from[i]!),
        to: this.place(middle + half * isolator.undecided.to[i]!),
        code: `${kind} touch`,
        reason: TOUCH_REASONS[kind],
      })
    }
    const minima = kind === 'distance' || kind === 'inverseDistance'
    for (let i = 0; i < isolator.from.length; i++) {
      const direction = isolator.direction[i]!
      if (minima && direction < 0) continue
      const from = this.place(middle + half * isolator.from[i]!)
      const to = this.place(middle + half * isolator.to[i]!)
      this.refine(finds, kind, this.place(middle + half * isolator.estimate[i]!), from, to, direction)
    }
    return end
  }

  refine(finds: FindList, kind: FindKind, start: number, from: number, to: number, direction: number): void {
    const { refiner } = this
    if (!refiner.refine(kind, start, from, to, direction)) {
      this.exceptions.push({ from, to, code: 'refinement', reason: `a ${WORDS[kind]} lies here, but its place could not be refined` })
    }
    finds.v.push(refiner.v)
    finds.direction.push(direction)
    finds.from.push(from)
    finds.to.push(to)
    finds.logGain.push(refiner.logGain)
    finds.phase.push(refiner.phase)
  }

  /**
   * Asks for a smaller box by -1, or where that no longer helps tells the stretch as an exception and goes on behind it. Finds of this box
   * from `mark` on are dropped only for the smaller box, which finds them again.
   */
  giveUp(finds: FindList, mark: number, kind: FindKind, from: number, to: number, forced: boolean): number {
    if (!forced && this.tailMatters(kind)) {
      truncateFinds(finds, mark)
      return -1
    }
    const lastOne = this.exceptions[this.exceptions.length - 1]
    const code = `${kind} undecided`
    if (lastOne && lastOne.code === code && lastOne.to >= from) lastOne.to = to
    else this.exceptions.push({ from, to, code, reason: UNDECIDED_REASONS[kind] })
    return to
  }

  /** A touch within bounds that the truncation still widens is worth a smaller box. */
  private tailMatters(kind: FindKind): boolean {
    // The isolator blames the tail from half of its own, larger, rounding on.
    const { tail, steady, steadyRe } = this.log
    if (tail[0]! > 0.25 * steady[0]!) return true
    if (kind === 'gain' || kind === 'phase') return false
    return tail[1]! > 0.25 * steadyRe[1]! || this.stationary.tail[0]! > 0.25 * this.stationary.steady[0]!
  }
}

const WORDS: Record<FindKind, string> = {
  gain: 'gain crossover',
  phase: 'phase crossover',
  distance: 'closest approach',
  inverseDistance: 'peak of the complementary sensitivity',
}

const TOUCH_REASONS: Record<FindKind, string> = {
  gain: 'tangency: |L| comes so near to 1 here that rounding hides whether it crosses twice, touches or stays clear',
  phase: 'tangency: the phase comes so near to 180 deg here that rounding hides whether it crosses twice, touches or stays clear',
  distance: '|1 + L| is so flat here that rounding hides whether it has a minimum',
  inverseDistance: '|T| is so flat here that rounding hides whether it has a peak',
}

const UNDECIDED_REASONS: Record<FindKind, string> = {
  gain: '|L| is 1 to within rounding over this stretch',
  phase: 'L is real to within rounding over this stretch',
  distance: '|1 + L| is constant to within rounding over this stretch',
  inverseDistance: '|T| is constant to within rounding over this stretch',
}
