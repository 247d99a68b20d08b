import { describe, expect, it } from 'vitest'
import { analyseMeasured } from '#shared/analysis/measured/analyseMeasured'
import { logSpaced, rational, sampleResponse, type SampleOptions } from './sampleResponse'

const sweep = logSpaced(0.01, 200, 500)
const stabilityOf = (numerator: number[], denominator: number[], options: SampleOptions, frequencies = sweep) => {
  const { stability, summary } = analyseMeasured(sampleResponse(rational(numerator, denominator), frequencies, options))
  return { ...stability, hasMargins: summary !== null }
}
/** Stable in closed loop: 2 / (s (s + 1)). Unstable: 4 / (s (s + 1)^2), whose limit is a gain of 2 (Routh). */
const stable: [number[], number[]] = [[2], [1, 1, 0]]
const unstable: [number[], number[]] = [[4], [1, 2, 1, 0]]
const known = { openLoopUnstablePoles: 0, openLoopOriginPoles: 1 }

describe('the verdict where the loop was seen to stay stable', () => {
  it('is stable, observed and counted, when the count agrees', () => {
    expect(stabilityOf(...stable, { ...known, stayedStable: true })).toMatchObject({ verdict: 'stable', basis: 'observed and counted', encirclements: 0, closedLoopUnstablePoles: 0, hasMargins: true })
  })

  it('is stable, observed, when the count is open, and says why it is', () => {
    const verdict = stabilityOf(...stable, { stayedStable: true })
    expect(verdict).toMatchObject({ verdict: 'stable', basis: 'observed', encirclements: null, hasMargins: true })
    expect(verdict.reason).toMatch(/^Not counted: the phase at the first sample/)
  })

  it('is stable, observed, when only the number of open-loop unstable poles is missing', () => {
    expect(stabilityOf(...stable, { openLoopOriginPoles: 1, stayedStable: true }))
      .toMatchObject({ verdict: 'stable', basis: 'observed', encirclements: 0, closedLoopUnstablePoles: null, reason: expect.stringContaining('number of open-loop unstable poles is not given') })
  })

  it('is undetermined when the count contradicts it, with what to suspect', () => {
    const verdict = stabilityOf(...unstable, { ...known, stayedStable: true })
    expect(verdict).toMatchObject({ verdict: 'undetermined', basis: 'observed and counted', encirclements: -2, closedLoopUnstablePoles: 2, hasMargins: false })
    expect(verdict.reason).toMatch(/2 clockwise encirclements/)
    expect(verdict.reason).toMatch(/break point/)
    expect(verdict.reason).toMatch(/number of open-loop unstable poles/)
    expect(verdict.reason).toMatch(/sign/)
  })

  it('suspects the sign first when the opposite sign would agree', () => {
    // The response of 2 / (s (s + 1)) stored with the wrong sign.
    expect(stabilityOf([-2], [1, 1, 0], { ...known, stayedStable: true }).reason).toMatch(/With the opposite sign both agree: suspect the sign of the response first/)
  })

  it('suspects the pole count where the plant is unstable and that is not said', () => {
    // (s + 2) / (s^2 - 1): one open-loop unstable pole, one encirclement.
    expect(stabilityOf([1, 2], [1, 0, -1], { openLoopUnstablePoles: 0, openLoopOriginPoles: 0, stayedStable: true }))
      .toMatchObject({ verdict: 'undetermined', encirclements: 1, closedLoopUnstablePoles: -1, reason: expect.stringContaining('number of open-loop unstable poles') })
  })

  it('is contradicted by clockwise encirclements even when the pole count is open', () => {
    expect(stabilityOf(...unstable, { openLoopOriginPoles: 1, stayedStable: true })).toMatchObject({ verdict: 'undetermined', encirclements: -2 })
  })

  it('stays observed when a gap beside -1 leaves the count open', () => {
    const coarse = logSpaced(0.01, 200, 12)
    const verdict = stabilityOf([2], [1, 1, 0], { ...known, stayedStable: true }, coarse)
    expect(verdict).toMatchObject({ verdict: 'stable', basis: 'observed', encirclements: null })
    expect(verdict.reason).toMatch(/between the samples at [\d.]+ and [\d.]+ rad\/s the locus may pass -1 on either side/)
  })
})

describe('the verdict where the loop was seen not to stay stable', () => {
  it('is unstable, with and without a count', () => {
    expect(stabilityOf(...unstable, { ...known, stayedStable: false })).toMatchObject({ verdict: 'unstable', basis: 'observed and counted', hasMargins: false })
    expect(stabilityOf(...unstable, { stayedStable: false })).toMatchObject({ verdict: 'unstable', basis: 'observed' })
  })

  it('is undetermined when the count says stable', () => {
    expect(stabilityOf(...stable, { ...known, stayedStable: false })).toMatchObject({ verdict: 'undetermined', basis: 'observed and counted', hasMargins: false })
  })
})

describe('the verdict where nothing was observed', () => {
  it('is that of the count', () => {
    expect(stabilityOf(...stable, known)).toMatchObject({ verdict: 'stable', basis: 'counted' })
    expect(stabilityOf(...unstable, known)).toMatchObject({ verdict: 'unstable', basis: 'counted', closedLoopUnstablePoles: 2 })
  })

  it('is unstable on clockwise encirclements whatever the pole count', () => {
    expect(stabilityOf(...unstable, { openLoopOriginPoles: 1 })).toMatchObject({ verdict: 'unstable', closedLoopUnstablePoles: null })
  })

  it('is undetermined without the number of open-loop unstable poles, and asks for it', () => {
    expect(stabilityOf(...stable, { openLoopOriginPoles: 1 })).toMatchObject({ verdict: 'undetermined', reason: expect.stringContaining('state the number of open-loop unstable poles') })
  })

  it('is undetermined when there are more counter-clockwise encirclements than unstable poles', () => {
    expect(stabilityOf([1, 2], [1, 0, -1], { openLoopUnstablePoles: 0, openLoopOriginPoles: 0 })).toMatchObject({ verdict: 'undetermined', closedLoopUnstablePoles: -1 })
  })

  it.each<[string, number[], SampleOptions, RegExp]>([
    ['the data end while the loop gain is not small', logSpaced(0.01, 1.5, 200), known, /still 0\.74/],
    ['the data start too high for the stated integrator', logSpaced(0.9, 200, 200), known, /too small/],
    ['the phase at the start is not that of the stated integrators', sweep, { openLoopUnstablePoles: 0, openLoopOriginPoles: 2 }, /not near that of the 2 stated poles/],
    ['integrators are not stated and the phase at the start is not real', sweep, { openLoopUnstablePoles: 0 }, /not near 0 or 180 deg/],
  ])('is undetermined when %s', (_, frequencies, options, reason) => {
    const verdict = stabilityOf(...stable, options, frequencies)
    expect(verdict).toMatchObject({ verdict: 'undetermined', encirclements: null })
    expect(verdict.reason).toMatch(reason)
  })
})

describe('the count closes the low end of the data', () => {
  it.each<[string, number[], number[], SampleOptions, number]>([
    // Each verdict is that of the closed-loop polynomial denominator + numerator (Routh).
    ['a double integrator with lead: s^2 + s + 1 is stable', [1, 1], [1, 0, 0], { openLoopOriginPoles: 2 }, 0],
    ['a double integrator with lag: s^3 + s^2 + 0.5 s + 1 has two roots beyond the axis', [0.5, 1], [1, 1, 0, 0], { openLoopOriginPoles: 2 }, -2],
    ['a triple integrator: s^3 + 3 s^2 + 3 s + 1 is stable', [3, 3, 1], [1, 0, 0, 0], { openLoopOriginPoles: 3 }, 0],
    ['a negative gain over 1 at frequency 0: s - 1 has one root beyond', [-2], [1, 1], { openLoopOriginPoles: 0 }, -1],
    ['a negative gain under 1 at frequency 0: s + 0.5 is stable', [-0.5], [1, 1], { openLoopOriginPoles: 0 }, 0],
    ['an integrator of negative sign: s^2 + s - 2 has one root beyond', [-2], [1, 1, 0], { openLoopOriginPoles: 1 }, -1],
    ['a loop gain that vanishes at frequency 0: s^2 + 3 s + 1 is stable', [2, 0], [1, 1, 1], {}, 0],
    ['an unstable pole outweighed: s + 1 is stable, N = P = 1', [2], [1, -1], { openLoopOriginPoles: 0 }, 1],
  ])('%s', (_, numerator, denominator, options, encirclements) => {
    expect(stabilityOf(numerator, denominator, options, logSpaced(0.001, 500, 800)).encirclements).toBe(encirclements)
  })
})
