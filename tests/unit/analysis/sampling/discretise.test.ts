import { describe, expect, it } from 'vitest'
import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { rationalPart } from '#shared/analysis/expressions/rationalPart'
import type { FactoredLoop } from '#shared/analysis/FactoredLoop'
import { discretise } from '#shared/analysis/sampling/discretise'
import type { HoldGain } from '#shared/types/block'
import { exactOf } from './exactOf'

const zeroOrder = (sampleTime: number): HoldGain => ({ kind: 'hold', hold: 'zeroOrder', sampleTime })
const singleUpdate = (sampleTime: number, duty: number): HoldGain => ({ kind: 'hold', hold: 'pwmSingleUpdate', sampleTime, duty })
const doubleUpdate = (sampleTime: number, duty = 0.5): HoldGain => ({ kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime, duty })

function equivalentOf(text: string, hold: HoldGain): FactoredLoop {
  return rationalPart(discretise(exactOf(text), hold).loop, hold.sampleTime)
}

/** Numerator and monic denominator in doubles, highest power first. */
function coefficientsOf({ gain, zeros, poles }: FactoredLoop): { numerator: number[], denominator: number[] } {
  const expand = (re: Float64Array, im: Float64Array, lead: number) => {
    let list = [[lead, 0]]
    re.forEach((x, k) => {
      const y = im[k] as number
      const next = Array.from({ length: list.length + 1 }, (_, j) => {
        const [a, b] = list[j] ?? [0, 0]
        const [c, d] = list[j - 1] ?? [0, 0]
        return [(a as number) - (x * (c as number) - y * (d as number)), (b as number) - (x * (d as number) + y * (c as number))]
      })
      list = next
    })
    return list.map(([value]) => value as number)
  }
  return { numerator: expand(zeros.re, zeros.im, gain), denominator: expand(poles.re, poles.im, 1) }
}

function expectCoefficients(found: number[], expected: number[]) {
  expect(found).toHaveLength(expected.length)
  const size = Math.max(...expected.map(Math.abs))
  found.forEach((value, k) => expect(Math.abs(value - (expected[k] as number))).toBeLessThan(1e-14 * size))
}

function expectEquivalent(text: string, hold: HoldGain, numerator: number[], denominator: number[]) {
  const found = coefficientsOf(equivalentOf(text, hold))
  expectCoefficients(found.numerator, numerator)
  expectCoefficients(found.denominator, denominator)
}

function refusalOf(text: string, hold: HoldGain): string {
  try {
    discretise(exactOf(text), hold)
  }
  catch (error) {
    expect(error).toBeInstanceOf(AnalysisInputError)
    return (error as AnalysisInputError).message
  }
  throw new Error('was not refused')
}

describe('what has no discrete equivalent is refused with the reason', () => {
  it('an improper plant', () => {
    expect(refusalOf('s^2/(s+1)', zeroOrder(0.1))).toMatch(/^Improper: what is behind the zero-order hold/)
  })

  it('impulses of a modulator on a direct feedthrough', () => {
    expect(refusalOf('(s+2)/(s+1)', doubleUpdate(0.1))).toMatch(/^The pulse-width modulator \(double update\).*direct feedthrough.*Add the pole/)
    expect(refusalOf('5', singleUpdate(0.1, 0.4))).toMatch(/direct feedthrough/)
  })

  it('a dead time inside a sum', () => {
    expect(refusalOf('(1+exp(-0.1*s))/(s+1)', zeroOrder(0.1))).toMatch(/sum or a feedback behind the zero-order hold has no finite discrete equivalent/)
  })

  it('a mode that grows beyond use within one sample', () => {
    for (const rate of [35, 1e6]) expect(refusalOf(`1/(s-${rate})`, zeroOrder(1))).toMatch(/cannot be worked out: a mode grows more than 1e15-fold within one sample/)
    expectEquivalent('1/(s-34)', zeroOrder(1), [Math.expm1(34) / 34], [1, -Math.exp(34)])
  })
})

describe('the zero-order hold, closed forms', () => {
  it('a gain is itself, late by the delay rounded up to whole samples', () => {
    expectEquivalent('5', zeroOrder(0.1), [5], [1])
    expectEquivalent('5*exp(-0.25*s)', zeroOrder(0.1), [5], [1, 0, 0, 0])
  })

  it('1/s: the step t sampled is Tz/(z-1)^2, times (z-1)/z: T/(z-1)', () => {
    expectEquivalent('1/s', zeroOrder(0.2), [0.2], [1, -1])
  })

  it('1/s with a fractional delay of 0.3: ((1-tau) z + tau)/(z (z-1)) for T = 1 (K. J. Astrom, B. Wittenmark, Computer-Controlled Systems, section 3.2, form from memory)', () => {
    expectEquivalent('exp(-0.3*s)/s', zeroOrder(1), [0.7, 0.3], [1, -1, 0])
  })

  it('1/s with 2.3 samples of delay is that with two more poles at z = 0', () => {
    expectEquivalent('exp(-2.3*s)/s', zeroOrder(1), [0.7, 0.3], [1, -1, 0, 0, 0])
  })

  it('1/s^2: T^2/2 (z+1)/(z-1)^2; both integrators exactly on z = 1', () => {
    expectEquivalent('1/s^2', zeroOrder(0.4), [0.08, 0.08], [1, -2, 1])
    const { poles } = equivalentOf('1/s^2', zeroOrder(0.4))
    expect([...poles.re, ...poles.im, ...poles.onBoundary]).toEqual([1, 1, 0, 0, 1, 1])
  })

  it('1/s^2 with 0.3 of a sample of delay: samples of (t - 0.3)^2/2 less those a sample earlier', () => {
    // h1 = 0.7^2/2, h2 = 1.7^2/2 - 0.7^2/2, h3 = (2.7^2 - 1.7^2)/2; numerator b0 = h1, b1 = h2 - 2 h1, b2 = h3 - 2 h2 + h1
    expectEquivalent('exp(-0.3*s)/s^2', zeroOrder(1), [0.245, 1.2 - 0.49, 2.2 - 2.4 + 0.245], [1, -2, 1, 0])
  })

  it('1/s^3: T^3/6 (z^2 + 4z + 1)/(z-1)^3, three integrators on z = 1', () => {
    expectEquivalent('1/s^3', zeroOrder(0.1), [1e-3 / 6, 4e-3 / 6, 1e-3 / 6], [1, -3, 3, -1])
    expect([...equivalentOf('1/s^3', zeroOrder(0.1)).poles.onBoundary]).toEqual([1, 1, 1])
  })

  it('a/(s+a): (1 - q)/(z - q), q = e^(-aT), for slow and fast sampling', () => {
    for (const aT of [1e-7, 0.3, 40]) expectEquivalent(`${aT}/(s+${aT})`, zeroOrder(1), [-Math.expm1(-aT)], [1, -Math.exp(-aT)])
  })

  it('a/(s+a) with a fractional delay m before the sample: (1 - q^m) z + (q^m - q) over z (z - q)', () => {
    const q = Math.exp(-0.5)
    const m = 0.75
    expectEquivalent('0.5*exp(-0.25*s)/(s+0.5)', zeroOrder(1), [1 - q ** m, q ** m - q], [1, -q, 0])
  })

  it('a direct feedthrough is seen at once: (s+2)/(s+1) is (z - q + (1 - q))/(z - q)', () => {
    const q = Math.exp(-1)
    expectEquivalent('(s+2)/(s+1)', zeroOrder(1), [1, 1 - 2 * q], [1, -q])
  })

  it('a feedthrough with a delay of exactly a sample comes a sample later', () => {
    const q = Math.exp(-1)
    expectEquivalent('exp(-s)*(s+2)/(s+1)', zeroOrder(1), [1, 1 - 2 * q], [1, -q, 0])
  })

  it('a plant that blocks constants has its zero exactly on z = 1', () => {
    const found = equivalentOf('s/(s+1)', zeroOrder(1))
    expectCoefficients(coefficientsOf(found).numerator, [1, -1])
    expect([...found.zeros.re, ...found.zeros.onBoundary]).toEqual([1, 1])
  })

  it('1/(s^2+1): (1 - cos T)(z + 1)/(z^2 - 2 cos T z + 1), undamped poles on the circle, aliased ones too', () => {
    for (const T of [0.1, 1, 40]) {
      const { numerator, denominator } = coefficientsOf(equivalentOf('1/(s^2+1)', zeroOrder(T)))
      expectCoefficients(numerator, [2 * Math.sin(T / 2) ** 2, 2 * Math.sin(T / 2) ** 2])
      expectCoefficients(denominator, [1, -2 * Math.cos(T), 1])
      expect([...equivalentOf('1/(s^2+1)', zeroOrder(T)).poles.onBoundary]).toEqual([1, 1])
    }
  })

  it('a double real pole: 1/(s+1)^2 has the step 1 - (1 + t) e^-t', () => {
    const q = Math.exp(-0.5)
    const y1 = 1 - 1.5 * q
    const y2 = 1 - 2 * q * q
    // b1 = y1, b2 = y2 - y1 - 2 q y1
    expectEquivalent('1/(s+1)^2', zeroOrder(0.5), [y1, y2 - y1 - 2 * q * y1], [1, -2 * q, q * q])
  })

  it('a stiff pole that dies within the sample leaves its settled value and a pole at 0', () => {
    const q = Math.exp(-1e-3)
    const { poles, zeros, gain } = equivalentOf('1e6/((s+1)*(s+1e6))', zeroOrder(1e-3))
    expect([...poles.re].sort()).toEqual([0, q])
    // y1 = 1 - p q/(p - 1), settled; the zero from the gain at constant input, 1
    expect(Math.abs(gain / (1 - q * 1e6 / (1e6 - 1)) - 1)).toBeLessThan(1e-12)
    expect(Math.abs(gain * (1 - (zeros.re[0] as number)) / (1 - q) - 1)).toBeLessThan(1e-12)
  })

  it('a delay that is whole samples but for rounding (0.3 of 0.1) counts as whole', () => {
    expect(equivalentOf('exp(-0.3*s)/s', zeroOrder(0.1)).zeros.re).toHaveLength(0)
  })

  it('a pole beyond the boundary that a zero hides is hidden in z too', () => {
    const { zeros, poles } = equivalentOf('(s-1)/((s-1)*(s+2))', zeroOrder(0.1))
    expect([...zeros.re]).toEqual([Math.exp(0.1)])
    expect([...poles.re]).toContain(Math.exp(0.1))
  })
})

describe('pulse-width modulators, closed forms', () => {
  it('1/s, one update an edge at D = 0.5: a pulse of half the sample in the middle of it is T/(z-1)', () => {
    expectEquivalent('1/s', doubleUpdate(0.1), [0.1], [1, -1])
  })

  it('1/s, one update a period at D: both edges lie inside the period, T/(z-1) for every D below 1', () => {
    for (const duty of [0, 0.2, 0.99]) expectEquivalent('1/s', singleUpdate(0.1, duty), [0.1], [1, -1])
  })

  it('an edge exactly at the sampling instant comes just after it: at D = 1 the edges lie at 0 and T, seen one and two samples later', () => {
    expectEquivalent('1/s', doubleUpdate(0.1, 1), [0.05, 0.05], [1, -1, 0])
    expectEquivalent('1/s', singleUpdate(0.1, 1), [0.05, 0.05], [1, -1, 0])
  })

  it('1/(s+a) at D = 0.5: T e^(-a T/2)/(z - e^(-aT))', () => {
    expectEquivalent('1/(s+3)', doubleUpdate(0.1), [0.1 * Math.exp(-0.15)], [1, -Math.exp(-0.3)])
  })

  it('1/(s+a), one update a period at D = 0.4: T/2 (e^(-0.7aT) + e^(-0.3aT))/(z - e^(-aT))', () => {
    expectEquivalent('1/(s+3)', singleUpdate(0.1, 0.4), [0.05 * (Math.exp(-0.21) + Math.exp(-0.09))], [1, -Math.exp(-0.3)])
  })

  it('1/s with a delay of one sample is T/(z (z-1)), with half a sample the edge comes to the next instant and is seen after it', () => {
    expectEquivalent('exp(-0.1*s)/s', doubleUpdate(0.1), [0.1], [1, -1, 0])
    expectEquivalent('exp(-0.05*s)/s', doubleUpdate(0.1), [0.1], [1, -1, 0])
  })

  it('tells that one update an edge away from D = 0.5 is the mean of two that alternate', () => {
    expect(discretise(exactOf('1/s'), doubleUpdate(0.1, 0.3)).averaged).toMatch(/duty ratio of 0.3 .*alternates between 0.3 and 0.7 of a sample/)
    expect(discretise(exactOf('1/s'), doubleUpdate(0.1)).averaged).toBeNull()
    expect(discretise(exactOf('1/s'), singleUpdate(0.1, 0.3)).averaged).toBeNull()
  })
})

describe('what is said of the accuracy', () => {
  it('a bound far below that of doubles, and how it was found', () => {
    const { accuracy } = discretise(exactOf('exp(-0.013*s)*(s+2)/((s+1)*(s^2+0.02*s+100))'), zeroOrder(0.01))
    expect(accuracy.relative).toBeLessThan(1e-20)
    expect(accuracy.basis).toMatch(/^discrete equivalent behind the zero-order hold by partial fractions of \d+ bits$/)
  })
})
