import { describe, expect, it } from 'vitest'
import { factorsFromRoots } from '#shared/analysis/factors/factorsFromRoots'
import { axisLoopFromFactors } from '#shared/analysis/search/axisLoopFromFactors'
import { LogSeries, SERIES_DEGREE } from '#shared/analysis/search/LogSeries'
import { StationarySeries } from '#shared/analysis/search/StationarySeries'
import type { ComplexPair } from '#shared/types/analysis'

/** Deterministic numbers in [0, 1): the mulberry32 generator (public domain). */
function generator(seed: number): () => number {
  let state = seed
  return () => {
    state = (state + 0x6D2B79F5) | 0
    let t = Math.imul(state ^ (state >>> 15), 1 | state)
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296
  }
}

function randomLoop(random: () => number) {
  const roots = (count: number): ComplexPair[] => Array.from({ length: count }, () => {
    const w = 10 ** (6 * random() - 3)
    const damping = 10 ** (-6 * random())
    return random() < 0.5
      ? [[-w, 0]] as ComplexPair[]
      : [[-damping * w, w], [-damping * w, -w]] as ComplexPair[]
  }).flat()
  const poles = [...roots(6), ...(random() < 0.5 ? [[0, 0] as ComplexPair] : [])]
  const zeros = roots(3).slice(0, poles.length - 1)
  if (zeros.filter(([, im]) => im !== 0).length % 2 === 1) zeros.pop()
  return axisLoopFromFactors(factorsFromRoots(zeros, poles, 10 ** (4 * random() - 2), { deadTime: random() < 0.5 ? random() : 0 }))
}

/** log(1 + qy) without cancellation. */
function log1p(re: number, im: number): [number, number] {
  return [0.5 * Math.log1p(2 * re + re * re + im * im), Math.atan2(im, 1 + re)]
}

describe('the series of log L on a box', () => {
  it('holds log L within its bounds at every place of the box, for 300 boxes', () => {
    const random = generator(7)
    const log = new LogSeries()
    let worst = 0
    for (let i = 0; i < 300; i++) {
      const axis = randomLoop(random)
      const centre = 10 ** (6 * random() - 3)
      let gap = axis.originWeight === 0 ? Number.POSITIVE_INFINITY : centre
      for (let k = 0; k < axis.count; k++) gap = Math.min(gap, Math.hypot(centre - axis.im[k]!, axis.re[k]!))
      const half = 0.5 * gap
      log.expand(axis, centre, half)
      for (const y of [-1, -0.99, -0.5, 0.1, 0.7, 1]) {
        // Truth from the roots one by one, closed form: sum of weight log(1 + q y), good to some units of each term.
        let re = 0
        let im = -half * y * axis.deadTime
        let terms = 0
        for (let k = 0; k <= axis.count; k++) {
          const origin = k === axis.count
          const weight = origin ? axis.originWeight : axis.weight[k]!
          const x = origin ? centre : centre - axis.im[k]!
          const a = origin ? 0 : axis.re[k]!
          const size = half / (x * x + a * a)
          const [dRe, dIm] = log1p(x * size * y, -a * size * y)
          re += weight * dRe
          im += weight * dIm
          terms += Math.abs(weight) * Math.hypot(dRe, dIm)
        }
        let seriesRe = 0
        let seriesIm = 0
        for (let n = SERIES_DEGREE; n >= 1; n--) {
          seriesRe = (seriesRe + log.re[n]!) * y
          seriesIm = (seriesIm + log.im[n]!) * y
        }
        const bound = log.steady[0]! + log.tail[0]! * Math.abs(y) ** (SERIES_DEGREE + 1)
        const error = Math.hypot(re - seriesRe, im - seriesIm)
        const ownError = 8 * 2 ** -53 * (terms + half * axis.deadTime)
        expect(error).toBeLessThanOrEqual(bound + ownError)
        if (bound > 1e-9) worst = Math.max(worst, error / bound)
      }
    }
    // The bound is no idle one: where truncation rules it is met to better than a factor of two somewhere.
    expect(worst).toBeGreaterThan(0.5)
    expect(worst).toBeLessThanOrEqual(1)
  })

  it('gives the slope of |1 + L|^2 within its bounds', () => {
    const random = generator(11)
    const log = new LogSeries()
    const stationary = new StationarySeries()
    for (let i = 0; i < 200; i++) {
      const axis = randomLoop(random)
      const centre = 10 ** (4 * random() - 2)
      let gap = centre
      for (let k = 0; k < axis.count; k++) gap = Math.min(gap, Math.hypot(centre - axis.im[k]!, axis.re[k]!))
      log.expand(axis, centre, 0.4 * gap)
      if (!stationary.build(log, 0.2, 0.3)) continue
      const at = (y: number) => {
        // Slope over y of |1 + L|^2, scaled alike, from log L by its own polynomial: closed form 2 Re(conj(1 + L) L g).
        let re = 0
        let im = 0
        let slopeRe = 0
        let slopeIm = 0
        for (let n = SERIES_DEGREE; n >= 0; n--) {
          slopeRe = slopeRe * y + re
          slopeIm = slopeIm * y + im
          re = re * y + log.re[n]!
          im = im * y + log.im[n]!
        }
        const size = Math.exp(re)
        return 2 * size * (slopeRe * (size + Math.cos(im)) - slopeIm * Math.sin(im))
      }
      let reAtMiddle = 0
      for (let n = SERIES_DEGREE; n >= 0; n--) reAtMiddle = reAtMiddle * 0.2 + log.re[n]!
      const scale = Math.exp(reAtMiddle) * Math.max(1, Math.exp(reAtMiddle))
      for (const x of [-1, -0.3, 0, 0.6, 1]) {
        let value = 0
        for (let n = stationary.degree; n >= 0; n--) value = value * x + stationary.coefficients[n]!
        const truth = 0.3 * at(0.2 + 0.3 * x) / scale
        const bound = stationary.steady[0]! + stationary.tail[0]! * Math.abs(x) ** stationary.tailOrder
        expect(Math.abs(value - truth)).toBeLessThanOrEqual(bound + 1e-13 * (Math.abs(truth) + 1))
      }
    }
  })
})
