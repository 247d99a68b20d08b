import type { EnclosedSeries } from '#shared/numeric/series/EnclosedSeries'
import { RootIsolator } from '#shared/numeric/series/RootIsolator'
import { powerOf } from '#shared/numeric/series/powerOf'
import type { AxisLoop } from './AxisLoop'
import { FindRefiner, type FindKind } from './FindRefiner'
import { LogSeries, SERIES_DEGREE } from './LogSeries'
import { emptyFinds, type FindList, type SearchException } from './SearchFinds'
import { StationarySeries } from './StationarySeries'

const N = SERIES_DEGREE
const TWO_PI = 2 * Math.PI
/** Half-length of a box over the distance from its centre to the nearest root. */
const THETA = 0.5
/** Right ends tried for a box, where the sign of a function must be clear: in y. */
const RIGHT_ENDS = [1, 0.93, 0.86, 0.79, 0.7]
/** How much clearer than its bound a sign must be where two boxes meet, so that the next box sees it too. */
const CLEARANCE = 4
/** A box is drawn in at most this often for one place: the truncation falls by 2^-11 each time, to below roundoff. */
const MAX_SHRINKS = 16
/** Half-length of a box times the dead time, at most: some 600 turns a box. */
const LONGEST_TURN = 2000

/** What is searched for on a stretch. */
export interface SearchTask {
  gain: boolean
  phase: boolean
  distance: boolean
  /** Peaks of the complementary sensitivity: minima of |1 + 1/L|. */
  inverseDistance: boolean
  /** ln of the least |L| that phase crossovers and minima of |1 + L| are listed for. */
  floorLog: number
  /** No phase crossovers and minima are searched beyond. */
  stopAt: number
  /** Finds of a kind after which phase crossovers are only counted where |L| > 1, and minima searched only about |L| = 1. */
  maxFinds: number
  /** Boxes and finds at most; then an exception says where it stopped. */
  maxEffort: number
}

/** A stretch not searched for minima of |1 + L|, and a bound that |1 + L| does not fall below there. */
export interface SkippedStretch { from: number, to: number, bound: number }

/**
 * Lays boxes from left to right over a stretch of the axis and finds everything on them. On each box the same
 * series of log L serves the gain (ln|L| = 0), the phase (arg L = an odd number of half turns) and, through the exponential, the
 * minima of |1 + L|; each of them keeps its own mark up to which it is settled, always a place where its sign is clear.
 */
export class AxisSearch {
  readonly gain = emptyFinds()
  readonly phase = emptyFinds()
  readonly distance = emptyFinds()
  readonly inverseDistance = emptyFinds()
  readonly exceptions: SearchException[] = []
  readonly skipped: SkippedStretch[] = []
  boxes = 0
  /** Phase crossovers with |L| > 1 that were counted, by the sign of their slope, but not listed: the list is full. */
  turnsAbove = 0
  /** The search stopped at this v for want of effort; Infinity: it went through. */
  stoppedAt = Number.POSITIVE_INFINITY
  /** The boxes laid, for a second search of a part of them: left and right ends, ln|L| at the centre and how far it strays. */
  readonly laid: { from: number[], to: number[], logGain: number[], spread: number[] } = { from: [], to: [], logGain: [], spread: [] }
  /** 1/max|T| over the boxes looked at so far, to pass over those that cannot hold the peak. */
  leastInverse = Number.POSITIVE_INFINITY

  private readonly log = new LogSeries()
  private readonly isolator = new RootIsolator()
  private readonly stationary = new StationarySeries()
  private readonly refiner: FindRefiner
  private readonly series: EnclosedSeries & { coefficients: Float64Array }

  constructor(private readonly axis: AxisLoop) {
    this.refiner = new FindRefiner(axis)
    this.series = {
      degree: N, coefficients: this.log.re, steady: this.log.steadyRe, tail: this.log.tail, tailOrder: N + 1,
    }
  }

  /** Searches from <= v <= to. Both ends must be places where each searched function has a clear sign. */
  search(from: number, to: number, task: SearchTask): void {
    let gainDone = task.gain ? from : to
    let phaseDone = task.phase ? from : to
    let distanceDone = task.distance ? from : to
    let inverseDone = task.inverseDistance ? from : to
    const maxEffort = Math.min(task.maxEffort, this.axis.extension?.maxBoxes ?? Number.POSITIVE_INFINITY)
    for (;;) {
      const left = Math.min(gainDone, phaseDone, distanceDone, inverseDone)
      if (left >= to) return
      // A long dead time bounds a box only where its turns are still searched one by one.
      const counting = this.phase.v.length > task.maxFinds && this.distance.v.length > task.maxFinds
      let half = this.boxHalf(left, !counting)
      for (let shrinks = 0; ; shrinks++) {
        if (++this.boxes + this.phase.v.length + this.distance.v.length > maxEffort) {
          this.stoppedAt = Math.min(this.stoppedAt, left)
          return
        }
        let right = left + 2 * half
        if (right > to || to - right < 1e-3 * half) {
          right = to
          half = 0.5 * (to - left)
        }
        const last = right === to
        const centre = left + half
        if (!(centre > left && right > centre)) {
          this.exceptions.push({ from: left, to: right, code: 'too narrow', reason: 'features lie closer together here than doubles can tell apart' })
          gainDone = phaseDone = distanceDone = inverseDone = Math.max(right, left * (1 + 4 * Number.EPSILON))
          break
        }
        // The differences are exact; the centre's rounding may count against a very short box.
        this.log.expand(this.axis, centre, Math.max(right - centre, centre - left) * (1 + 4e-16))
        const forced = shrinks >= MAX_SHRINKS
        const greatest = this.log.re[0]! + this.log.spreadRe
        const beyond = left >= task.stopAt || greatest < task.floorLog
        const least = this.log.re[0]! - this.log.spreadRe
        if (counting && greatest >= 0 && least <= 0 && half * this.axis.deadTime > 2 * LONGEST_TURN) {
          half = LONGEST_TURN / this.axis.deadTime
          continue
        }
        const phaseFull = this.phase.v.length > task.maxFinds
        const phaseLow = beyond || (phaseFull && greatest < 0)
        const low = beyond || (this.distance.v.length > task.maxFinds && (greatest < 0 || least > 0))
        let ok = true
        if (gainDone < right) {
          const done = this.searchGain(gainDone, right, last, forced)
          if (done < 0) ok = false
          else gainDone = done
        }
        if (ok && phaseDone < right) {
          const done = phaseLow ? right : this.searchPhase(phaseDone, right, last, forced, phaseFull && least > 0)
          if (done < 0) ok = false
          else phaseDone = done
        }
        if (ok && distanceDone < right) {
          if (low) {
            this.skip(distanceDone, right, greatest < 0 ? -Math.expm1(greatest) : Math.max(0, Math.expm1(least)))
            distanceDone = right
          }
          else {
            const done = this.searchDistance(this.distance, 'distance', distanceDone, right, last, forced)
            if (done < 0) ok = false
            else distanceDone = done
          }
        }
        if (ok && inverseDone < right) {
          const done = this.cannotPeak() ? right : this.searchDistance(this.inverseDistance, 'inverseDistance', inverseDone, right, last, forced)
          if (done < 0) ok = false
          else inverseDone = done
        }
        if (ok || forced) {
          this.laid.from.push(left)
          this.laid.to.push(right)
          this.laid.logGain.push(this.log.re[0]!)
          this.laid.spread.push(this.log.spreadRe)
          break
        }
        half *= 0.5
      }
    }
  }

  /** The half-length h of a box that starts at `left`, with h = THETA times the distance from its centre to the nearest root. */
  private boxHalf(left: number, bounded: boolean): number {
    const { re, im, count, originWeight } = this.axis
    const t2 = THETA * THETA
    let half = originWeight === 0 ? Number.POSITIVE_INFINITY : THETA * left / (1 - THETA)
    for (let k = 0; k < count; k++) {
      const x = left - im[k]!
      const a = re[k]!
      // (1 - t^2) h^2 - 2 t^2 x h - t^2 (x^2 + a^2) = 0
      const b = t2 * x
      const h = (b + Math.sqrt(b * b + (1 - t2) * t2 * (x * x + a * a))) / (1 - t2)
      if (h < half) half = h
    }
    if (bounded && this.axis.deadTime > 0) half = Math.min(half, LONGEST_TURN / this.axis.deadTime)
    if (this.axis.extension) half = Math.min(half, this.axis.extension.boxHalf(left))
    return Math.min(half, 1e6 * left)
  }

  private place(y: number): number {
    return this.log.centre + this.log.half * y
  }

  private coordinate(v: number): number {
    return Math.min(1, Math.max(-1, (v - this.log.centre) / this.log.half))
  }

  private skip(from: number, to: number, bound: number): void {
    const lastStretch = this.skipped[this.skipped.length - 1]
    if (lastStretch && lastStretch.to === from && Math.abs(bound - lastStretch.bound) <= 0.1 * (1 - bound)) {
      lastStretch.to = to
      lastStretch.bound = Math.min(lastStretch.bound, bound)
    }
    else this.skipped.push({ from, to, bound })
  }

  private horner(coefficients: Float64Array, y: number): number {
    let value = 0
    for (let n = N; n >= 0; n--) value = value * y + coefficients[n]!
    return value
  }

  private boundAt(y: number, steady: Float64Array): number {
    return steady[0]! * 2 + this.log.tail[0]! * powerOf(Math.abs(y), N + 1)
  }

  /** Returns the v up to which the gain is settled, or -1 where a smaller box is needed. */
  private searchGain(from: number, right: number, last: boolean, forced: boolean): number {
    const { log } = this
    if (Math.abs(log.re[0]!) > log.spreadRe) return right
    const yFrom = this.coordinate(from)
    let yTo = 1
    let end = right
    if (!last) {
      yTo = Number.NaN
      for (const y of RIGHT_ENDS) {
        if (Math.abs(this.horner(log.re, y)) > CLEARANCE * this.boundAt(y, log.steadyRe)) {
          yTo = y
          break
        }
      }
      if (Number.isNaN(yTo) || !(this.place(yTo) > from)) return this.giveUp('gain', from, right, forced)
      if (yTo < 1) {
        end = this.place(yTo)
        yTo = this.coordinate(end)
      }
    }
    this.series.coefficients = log.re
    this.series.steady = log.steadyRe
    const outcome = this.isolator.isolate(this.series, yFrom, yTo)
    if (outcome !== 'complete') return this.giveUp('gain', from, end, forced)
    return this.collect(this.gain, 'gain', end, forced)
  }

  private searchPhase(from: number, right: number, last: boolean, forced: boolean, countOnly: boolean): number {
    const { log } = this
    const centre = log.im[0]!
    const spread = log.spreadIm
    let firstTurn = Math.ceil((centre - spread - Math.PI) / TWO_PI)
    let lastTurn = Math.floor((centre + spread - Math.PI) / TWO_PI)
    if (firstTurn > lastTurn) return right
    const yFrom = this.coordinate(from)
    let yTo = 1
    let end = right
    if (!last) {
      yTo = Number.NaN
      for (const y of RIGHT_ENDS) {
        const offset = this.horner(log.im, y) - Math.PI
        if (Math.abs(offset - TWO_PI * Math.round(offset / TWO_PI)) > CLEARANCE * this.boundAt(y, log.steady)) {
          yTo = y
          break
        }
      }
      if (Number.isNaN(yTo) || !(this.place(yTo) > from)) return this.giveUp('phase', from, right, forced)
      if (yTo < 1) {
        end = this.place(yTo)
        yTo = this.coordinate(end)
      }
    }
    this.series.coefficients = log.im
    this.series.steady = log.steady
    // Monotone over the whole box: each turn between the ends is met exactly once.
    let bend = log.steady[1]! * 2 + log.tail[1]!
    for (let n = 2; n <= N; n++) bend += n * Math.abs(log.im[n]!)
    if (Math.abs(log.im[1]!) > bend) {
      const atFrom = this.horner(log.im, yFrom)
      const atTo = this.horner(log.im, yTo)
      const low = Math.min(atFrom, atTo)
      const high = Math.max(atFrom, atTo)
      firstTurn = Math.ceil((low - Math.PI) / TWO_PI)
      lastTurn = Math.floor((high - Math.PI) / TWO_PI)
      const nearFrom = (atFrom - Math.PI) - TWO_PI * Math.round((atFrom - Math.PI) / TWO_PI)
      if (Math.abs(nearFrom) <= this.boundAt(yFrom, log.steady)) return this.giveUp('phase', from, end, forced)
      if (last) {
        const nearTo = (atTo - Math.PI) - TWO_PI * Math.round((atTo - Math.PI) / TWO_PI)
        if (Math.abs(nearTo) <= this.boundAt(yTo, log.steady)) return this.giveUp('phase', from, end, forced)
      }
      if (countOnly) {
        this.turnsAbove += (atTo > atFrom ? 1 : -1) * Math.max(0, lastTurn - firstTurn + 1)
        return end
      }
      return this.collectTurns(firstTurn, lastTurn, yFrom, yTo, atTo > atFrom ? 1 : -1, from, end)
    }
    const mark = this.phase.v.length
    for (let turn = firstTurn; turn <= lastTurn; turn++) {
      log.im[0] = centre - Math.PI - TWO_PI * turn
      const outcome = this.isolator.isolate(this.series, yFrom, yTo)
      log.im[0] = centre
      if (outcome !== 'complete') {
        this.truncate(this.phase, mark)
        return this.giveUp('phase', from, end, forced)
      }
      if (this.collect(this.phase, 'phase', end, forced) < 0) {
        this.truncate(this.phase, mark)
        return -1
      }
    }
    if (lastTurn > firstTurn) this.sortFrom(this.phase, mark)
    return end
  }

  /** Every turn of a monotone phase, from the polynomial's own root of each. */
  private collectTurns(first: number, last: number, yFrom: number, yTo: number, direction: number, from: number, end: number): number {
    const { im } = this.log
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
      const bracketFrom = Math.max(from, this.place(this.clearOf(target, y, -1, yFrom)))
      const bracketTo = Math.min(end, this.place(this.clearOf(target, y, 1, yTo)))
      this.refine(this.phase, 'phase', Math.min(Math.max(this.place(y), bracketFrom), bracketTo), bracketFrom, bracketTo, direction)
    }
    return end
  }

  /**
   * The nearest place to one side of a turn of a monotone phase where the phase is clear of it by its bound: a bracket's end. Steps start at a tenth
   * of a turn at the most and double, so that it stays well short of the next turn.
   */
  private clearOf(target: number, y: number, side: 1 | -1, limit: number): number {
    let step = 0.3 / Math.abs(this.log.im[1]!)
    for (let i = 0; i < 60; i++, step *= 2) {
      const place = y + side * step
      if (side * (limit - place) <= 0) return limit
      if (Math.abs(this.horner(this.log.im, place) - target) > 2 * this.boundAt(place, this.log.steady)) return place
    }
    return limit
  }

  /** Minima (and maxima, passed over) of |1 + L| or |1 + 1/L| from `from` to the box's right end. */
  private searchDistance(finds: FindList, kind: FindKind, from: number, right: number, last: boolean, forced: boolean): number {
    const sign = kind === 'distance' ? 1 : -1
    const log = this.log
    if (this.gainRules(sign)) return right
    const mark = finds.v.length
    let yFrom = this.coordinate(from)
    let left = from
    let yTo = 1
    for (let tries = 0; yFrom < 1; tries++) {
      if (tries > 4000) return this.giveUp(kind, left, right, forced, finds, mark)
      const middle = 0.5 * (yFrom + yTo)
      const half = 0.5 * (yTo - yFrom)
      if (!this.stationary.build(log, middle, half, sign)) {
        yTo = yFrom + Math.max(2 * half * Math.min(0.75, 2.2 / this.stationary.spread), 1e-9)
        continue
      }
      const atEnd = last && yTo >= 1
      let xTo = 1
      let stop = yTo >= 1 ? right : this.place(yTo)
      if (this.excludesZero()) {
        yFrom = yTo
        left = stop
        yTo = Math.min(1, yTo + 2.4 * half)
        continue
      }
      if (!atEnd) {
        xTo = this.clearEnd()
        if (Number.isNaN(xTo)) {
          if (half < 1e-5) return this.giveUp(kind, left, right, forced, finds, mark)
          yTo = yFrom + half
          continue
        }
        if (xTo < 1) {
          stop = this.place(middle + half * xTo)
          xTo = Math.min(1, (this.coordinate(stop) - middle) / half)
        }
      }
      const outcome = this.isolator.isolate(this.stationary, -1, xTo)
      if (outcome !== 'complete') {
        if (half < 1e-5 || (outcome === 'unclearFrom' && tries > 60)) return this.giveUp(kind, left, right, forced, finds, mark)
        yTo = yFrom + half
        continue
      }
      if (this.collect(finds, kind, stop, forced, middle, half) < 0) {
        this.truncate(finds, mark)
        return -1
      }
      if (yTo >= 1 && xTo === 1) return right
      // At a box's right end a place just short of it will do: the next box goes on from there.
      if (yTo >= 1 && !last) return stop
      yFrom = this.coordinate(stop)
      left = stop
      yTo = Math.min(1, yFrom + 2.4 * half)
    }
    return right
  }

  /** Where |L| > 1 and |m'|(|L| - 1) > |phi'| over the whole box, |1 + L| has no stationary point. */
  private gainRules(sign: number): boolean {
    const { re, im, steady, steadyRe, tail, spreadRe } = this.log
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

  /** |T| <= 1/|1 - 1/|L|| over the box stays below the peak found so far. */
  private cannotPeak(): boolean {
    const least = Math.abs(this.log.re[0]!) - this.log.spreadRe
    if (least <= 0) return false
    const bound = this.log.re[0]! > 0 ? -Math.expm1(-least) : Math.expm1(least)
    return bound > this.leastInverse
  }

  private excludesZero(): boolean {
    const { coefficients, steady, tail } = this.stationary
    let spread = 0
    for (let n = 1; n < N; n++) spread += Math.abs(coefficients[n]!)
    const rounding = 4 * N * 2 ** -53 * (spread + Math.abs(coefficients[0]!))
    return Math.abs(coefficients[0]!) > spread + steady[0]! + tail[0]! + rounding
  }

  private clearEnd(): number {
    const { coefficients, steady, tail } = this.stationary
    for (const x of RIGHT_ENDS) {
      let value = 0
      for (let n = N - 1; n >= 0; n--) value = value * x + coefficients[n]!
      if (Math.abs(value) > CLEARANCE * (steady[0]! * 2 + tail[0]! * powerOf(x, N))) return x
    }
    return Number.NaN
  }

  /** Refines what the isolator found (in y = middle + half x) and notes the stretches it could not decide. */
  private collect(finds: FindList, kind: FindKind, end: number, forced: boolean, middle = 0, half = 1): number {
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

  /** A touch within bounds that the truncation still widens is worth a smaller box. */
  private tailMatters(kind: FindKind): boolean {
    // The isolator blames the tail from half of its own, larger, rounding on.
    const { tail, steady, steadyRe } = this.log
    if (tail[0]! > 0.25 * steady[0]!) return true
    if (kind === 'gain' || kind === 'phase') return false
    return tail[1]! > 0.25 * steadyRe[1]! || this.stationary.tail[0]! > 0.25 * this.stationary.steady[0]!
  }

  private refine(finds: FindList, kind: FindKind, start: number, from: number, to: number, direction: number): void {
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
    if (kind === 'inverseDistance') {
      const inverse = Math.exp(-refiner.logGain)
      const distance = Math.hypot(1 + inverse * Math.cos(refiner.phase), inverse * Math.sin(refiner.phase))
      if (distance < this.leastInverse) this.leastInverse = distance
    }
  }

  /** Asks for a smaller box, or where that no longer helps tells the stretch as an exception and goes on behind it. */
  private giveUp(kind: FindKind, from: number, to: number, forced: boolean, finds?: FindList, mark?: number): number {
    if (finds) this.truncate(finds, mark!)
    if (!forced && this.tailMatters(kind)) return -1
    const lastOne = this.exceptions[this.exceptions.length - 1]
    const code = `${kind} undecided`
    if (lastOne && lastOne.code === code && lastOne.to >= from) lastOne.to = to
    else this.exceptions.push({ from, to, code, reason: UNDECIDED_REASONS[kind] })
    return to
  }

  private truncate(finds: FindList, length: number): void {
    finds.v.length = finds.direction.length = finds.from.length = finds.to.length = length
    finds.logGain.length = finds.phase.length = length
  }

  private sortFrom(finds: FindList, mark: number): void {
    const order = finds.v.slice(mark).map((_, i) => i + mark).sort((a, b) => finds.v[a]! - finds.v[b]!)
    for (const key of ['v', 'direction', 'from', 'to', 'logGain', 'phase'] as const) {
      const values = order.map(i => finds[key][i]!)
      for (let i = 0; i < values.length; i++) finds[key][mark + i] = values[i]!
    }
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
