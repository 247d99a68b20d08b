import type { AxisLoop } from './AxisLoop'
import { findDistances } from './findDistances'
import { findGains } from './findGains'
import { findPhases, type TurnCount } from './findPhases'
import { SearchBox } from './SearchBox'
import { emptyFinds, type SearchException } from './SearchFinds'

/** Half-length of a box over the distance from its centre to the nearest root. */
const THETA = 0.5
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
  readonly exceptions: SearchException[]
  readonly skipped: SkippedStretch[] = []
  boxes = 0
  /** Phase crossovers with |L| > 1 that were counted, but not listed: the list is full. */
  readonly turnsAbove: TurnCount = { count: 0 }
  /** The search stopped at this v for want of effort; Infinity: it went through. */
  stoppedAt = Number.POSITIVE_INFINITY
  /** The boxes laid, for a second search of a part of them: left and right ends, ln|L| at the centre and how far it strays. */
  readonly laid: { from: number[], to: number[], logGain: number[], spread: number[] } = { from: [], to: [], logGain: [], spread: [] }
  /** 1/max|T| over the boxes looked at so far, to pass over those that cannot hold the peak. */
  leastInverse = Number.POSITIVE_INFINITY

  private readonly box: SearchBox

  constructor(private readonly axis: AxisLoop) {
    this.box = new SearchBox(axis)
    this.exceptions = this.box.exceptions
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
        this.box.log.expand(this.axis, centre, Math.max(right - centre, centre - left) * (1 + 4e-16))
        const forced = shrinks >= MAX_SHRINKS
        const greatest = this.box.log.re[0]! + this.box.log.spreadRe
        const beyond = left >= task.stopAt || greatest < task.floorLog
        const least = this.box.log.re[0]! - this.box.log.spreadRe
        if (counting && greatest >= 0 && least <= 0 && half * this.axis.deadTime > 2 * LONGEST_TURN) {
          half = LONGEST_TURN / this.axis.deadTime
          continue
        }
        const phaseFull = this.phase.v.length > task.maxFinds
        const phaseLow = beyond || (phaseFull && greatest < 0)
        const low = beyond || (this.distance.v.length > task.maxFinds && (greatest < 0 || least > 0))
        let ok = true
        if (gainDone < right) {
          const done = findGains(this.box, this.gain, gainDone, right, last, forced)
          if (done < 0) ok = false
          else gainDone = done
        }
        if (ok && phaseDone < right) {
          const done = phaseLow ? right : findPhases(this.box, this.phase, phaseDone, right, last, forced, phaseFull && least > 0 ? this.turnsAbove : null)
          if (done < 0) ok = false
          else phaseDone = done
        }
        if (ok && distanceDone < right) {
          if (low) {
            this.skip(distanceDone, right, greatest < 0 ? -Math.expm1(greatest) : Math.max(0, Math.expm1(least)))
            distanceDone = right
          }
          else {
            const done = findDistances(this.box, this.distance, 'distance', distanceDone, right, last, forced)
            if (done < 0) ok = false
            else distanceDone = done
          }
        }
        if (ok && inverseDone < right) {
          const mark = this.inverseDistance.v.length
          const done = this.cannotPeak() ? right : findDistances(this.box, this.inverseDistance, 'inverseDistance', inverseDone, right, last, forced)
          this.noteInverse(mark)
          if (done < 0) ok = false
          else inverseDone = done
        }
        if (ok || forced) {
          this.laid.from.push(left)
          this.laid.to.push(right)
          this.laid.logGain.push(this.box.log.re[0]!)
          this.laid.spread.push(this.box.log.spreadRe)
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

  private skip(from: number, to: number, bound: number): void {
    const lastStretch = this.skipped[this.skipped.length - 1]
    if (lastStretch && lastStretch.to === from && Math.abs(bound - lastStretch.bound) <= 0.1 * (1 - bound)) {
      lastStretch.to = to
      lastStretch.bound = Math.min(lastStretch.bound, bound)
    }
    else this.skipped.push({ from, to, bound })
  }

  /** |T| <= 1/|1 - 1/|L|| over the box stays below the peak found so far. */
  private cannotPeak(): boolean {
    const least = Math.abs(this.box.log.re[0]!) - this.box.log.spreadRe
    if (least <= 0) return false
    const bound = this.box.log.re[0]! > 0 ? -Math.expm1(-least) : Math.expm1(least)
    return bound > this.leastInverse
  }

  /** Notes the least |1 + 1/L| of the finds from `mark` on. */
  private noteInverse(mark: number): void {
    const { v, logGain, phase } = this.inverseDistance
    for (let i = mark; i < v.length; i++) {
      const inverse = Math.exp(-logGain[i]!)
      this.leastInverse = Math.min(this.leastInverse, Math.hypot(1 + inverse * Math.cos(phase[i]!), inverse * Math.sin(phase[i]!)))
    }
  }
}
