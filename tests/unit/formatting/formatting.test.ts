import { describe, expect, it } from 'vitest'
import { formatDecibels } from '#shared/formatting/formatDecibels'
import { formatDegrees } from '#shared/formatting/formatDegrees'
import { formatDelay } from '#shared/formatting/formatDelay'
import { formatDistance } from '#shared/formatting/formatDistance'
import { formatFrequency } from '#shared/formatting/formatFrequency'
import { formatGainChange } from '#shared/formatting/formatGainChange'
import { formatGainMargin } from '#shared/formatting/formatGainMargin'
import { formatPhaseChange } from '#shared/formatting/formatPhaseChange'
import { formatPhaseMargin } from '#shared/formatting/formatPhaseMargin'
import { significantDigits } from '#shared/formatting/significantDigits'

describe('numbers as printed', () => {
  it.each([
    [0, '0'], [-0, '0'], [Number.NaN, 'not a number'], [Infinity, 'infinite'], [-Infinity, 'minus infinite'],
    [9.99996, '10.00'], [0.00099999, '0.001000'], [0.0009, '9.000e-4'], [1e-15, '1.000e-15'], [999999, '1.000e6'], [123456, '123500'],
    [-1.23456, '-1.235'], [12, '12.00'], [1000, '1000'], [3.141592653589793, '3.142'], [1e300, '1.000e300'], [5e-324, '4.941e-324'],
  ])('four significant digits of %d are %s', (value, printed) => {
    expect(significantDigits(value)).toBe(printed)
  })

  it('a frequency carries its unit, or leaves it to the head of the column', () => {
    expect([formatFrequency('infinity', 'Hz'), formatFrequency(0, 'Hz'), formatFrequency(12.3, 'rad/s'), formatFrequency(12.3)])
      .toEqual(['infinity', '0 Hz', '12.30 rad/s', '12.30'])
  })

  it('a delay takes the unit that suits it', () => {
    expect([0, -0, 2.141592653589793, 0.9999e-3, 0.032, 4.8e-4, 3e-9, 2e-12].map(formatDelay))
      .toEqual(['0 s', '0 s', '2.14 s', '1.00 ms', '32.0 ms', '480 us', '3.00 ns', '0.00200 ns'])
  })

  it('a distance to the critical point has three decimals', () => {
    expect([0.270928908223, 1, 12.345, 0.0004, 0].map(formatDistance)).toEqual(['0.271', '1.000', '12.35', '4.000e-4', '0'])
  })
})

describe('signs are words', () => {
  it('gain margins', () => {
    expect([12.4, -6.1, 0, -0, 8.519374645, 0.04, -266].map(formatGainMargin)).toEqual([
      'gain may rise 12.4 dB', 'gain may fall 6.1 dB', 'no gain margin', 'no gain margin', 'gain may rise 8.5 dB', 'gain may rise 0.04 dB', 'gain may fall 266 dB'])
  })

  it('phase margins', () => {
    expect([32.3, -20, 0, -0, 41.69032613, -0.04].map(formatPhaseMargin)).toEqual([
      'lag 32.3 deg', 'lead 20.0 deg', 'no phase margin', 'no phase margin', 'lag 41.7 deg', 'lead 0.0400 deg'])
  })

  it('the two parts of a simultaneous change', () => {
    expect([3.2, -0.4, -0.001].map(formatGainChange)).toEqual(['gain rises 3.2 dB', 'gain falls 0.40 dB', 'gain as it is'])
    expect([-14, 3.2, -0].map(formatPhaseChange)).toEqual(['lag 14.0 deg', 'lead 3.20 deg', 'phase as it is'])
  })

  it('no text holds a minus sign', () => {
    for (const value of [-1e5, -123.4, -1, -1e-3, -1e-12, -0]) {
      expect([formatDecibels(value), formatDegrees(value), formatGainMargin(value), formatPhaseMargin(value), formatGainChange(value), formatPhaseChange(value)].join().replace(/e-/g, 'e'))
        .not.toContain('-')
    }
  })
})
