import { describe, expect, it } from 'vitest'
import { polesInWords } from '#shared/formatting/polesInWords'

describe('poles in words', () => {
  it('are none of a constant', () => {
    expect(polesInWords({ re: [], im: [] }, 'Hz')).toEqual([])
  })

  it('are in order of frequency, one of a pair, and say what is not stable', () => {
    // |-3 + 4j| = 5 with damping 3/5, closed form
    expect(polesInWords({ re: [-40, -3, -3, 0, 0, 2, 0, 0], im: [0, 4, -4, 0, 0, 0, 7, -7] }, 'rad/s')).toEqual([
      'integrator, twice', '2.000 rad/s, real, unstable', '5.000 rad/s, damping 0.600', '7.000 rad/s, damping 0, on the stability boundary', '40.00 rad/s, real',
    ])
  })

  it('of a sampled gain are those of ln(z)/T: z = exp(-0.1) at 0.1 s is 1 rad/s', () => {
    expect(polesInWords({ re: [Math.exp(-0.1), 1, 0, -0.5], im: [0, 0, 0, 0] }, 'rad/s', 0.1)).toEqual([
      'integrator', '1.000 rad/s, real', '32.17 rad/s, at half the sample rate', 'z = 0 (a sample of delay)',
    ])
  })
})
