import { describe, expect, it } from 'vitest'
import { rationalPart } from '#shared/analysis/expressions/rationalPart'
import type { FactoredLoop } from '#shared/analysis/FactoredLoop'
import { stateSpaceLeaf } from '#shared/analysis/stateSpace/stateSpaceLeaf'
import type { StateSpaceGain } from '#shared/types/block'
import { companion, mode, parallel, rotated, skewed, stateSpace } from './coordinates'

function factorsOf(gain: StateSpaceGain, output = 0, input = 0): FactoredLoop {
  return rationalPart(stateSpaceLeaf(gain, output, input).loop!, gain.sampleTime)
}

type Complex = [number, number]
const times = ([a, b]: Complex, [c, d]: Complex): Complex => [a * c - b * d, a * d + b * c]
const over = ([a, b]: Complex, [c, d]: Complex): Complex => [(a * c + b * d) / (c * c + d * d), (b * c - a * d) / (c * c + d * d)]

/** The product of the factors at a point. */
function valueOf({ gain, zeros, poles }: FactoredLoop, re: number, im: number): Complex {
  let value: Complex = [gain, 0]
  for (let k = 0; k < poles.re.length; k++) {
    if (k < zeros.re.length) value = times(value, [re - zeros.re[k]!, im - zeros.im[k]!])
    value = over(value, [re - poles.re[k]!, im - poles.im[k]!])
  }
  return value
}

/** A polynomial, lowest power first, at a point. */
const polynomial = (coefficients: number[], s: Complex) => coefficients.reduceRight<Complex>((sum, value) => {
  const [re, im] = times(sum, s)
  return [re + value, im]
}, [0, 0])

function expectResponse(loop: FactoredLoop, expected: (s: Complex) => Complex, points: number[], tolerance = 1e-12): void {
  for (const w of points) {
    const s: Complex = loop.sampleTime === undefined ? [0, w] : [Math.cos(w), Math.sin(w)]
    const value = valueOf(loop, ...s)
    const wanted = expected(s)
    expect(Math.hypot(value[0] - wanted[0], value[1] - wanted[1]) / Math.hypot(...wanted)).toBeLessThan(tolerance)
  }
}

const sorted = (values: Float64Array) => Array.from(values).sort((a, b) => a - b)

describe('one channel of a state space', () => {
  it('without states is its direct gain', () => {
    const loop = factorsOf(stateSpace([], [], [[]], [[-2.5]]))
    expect([loop.gain, loop.poles.re.length, loop.zeros.re.length]).toEqual([-2.5, 0, 0])
  })

  it('of one state is a lag, and with direct gain a lead: 0.5 + 3/(s + 2) = 0.5 (s + 8)/(s + 2)', () => {
    const lag = factorsOf(stateSpace([[-2]], [[3]], [[1]]))
    expect([lag.gain, Array.from(lag.poles.re), lag.zeros.re.length]).toEqual([3, [-2], 0])
    const lead = factorsOf(stateSpace([[-2]], [[3]], [[1]], [[0.5]]))
    expect(lead.gain).toBe(0.5)
    expect(Array.from(lead.poles.re)).toEqual([-2])
    expect(lead.zeros.re[0]).toBeCloseTo(-8, 14)
  })

  it('that no path joins is zero, and one whose input or output is zero', () => {
    const diagonal = stateSpace([[-1, 0], [0, -2]], [[1, 0], [0, 1]], [[1, 0], [0, 1]])
    expect(stateSpaceLeaf(diagonal, 0, 1).loop).toBeNull()
    expect(stateSpaceLeaf(diagonal, 0, 0).loop).not.toBeNull()
    expect(stateSpaceLeaf(stateSpace([[-1]], [[0]], [[1]]), 0, 0).loop).toBeNull()
    expect(stateSpaceLeaf(stateSpace([[-1]], [[1]], [[0]]), 0, 0).loop).toBeNull()
  })

  it('that no path joined before its states were mixed is zero too', () => {
    expect(stateSpaceLeaf(rotated(stateSpace([[-1, 0, 0], [0, -2, 1], [0, 0, -3]], [[1, 0], [0, 1], [0, 1]], [[1, 0, 0], [0, 1, 0]]), 5), 0, 1).loop).toBeNull()
  })

  it('has its whole gain at 0 where all its states are out of reach: 2 with every mode hidden', () => {
    const { loop, notes } = stateSpaceLeaf(stateSpace([[-1, 1], [0, 3]], [[0], [0]], [[1, 1]], [[2]]), 0, 0)
    expect(notes.map(note => note.code)).toEqual(['unreachable'])
    const factors = rationalPart(loop!, undefined)
    expect(factors.gain).toBe(2)
    expect(sorted(factors.poles.re)).toEqual([-1, 3])
    expect(sorted(factors.zeros.re)).toEqual([-1, 3])
  })
})

describe('integrators', () => {
  const double = companion([4], [0, 0, 1])

  it('in companion form lie at 0 exactly', () => {
    const { poles, gain } = factorsOf(double)
    expect([gain, Array.from(poles.re), Array.from(poles.im), Array.from(poles.onBoundary)]).toEqual([4, [0, 0], [0, 0], [1, 1]])
  })

  it.each([1, 2, 3, 4])('keep their place in coordinates in which rounding moves them by 1e-8 (%i)', (seed) => {
    for (const gain of [rotated(double, seed), skewed(double, seed, 2), skewed(parallel(double, mode(3, 0.01), companion([1], [0.02, 1])), seed, 1)]) {
      const { poles } = factorsOf(gain)
      const there = Array.from(poles.re).filter((re, k) => re === 0 && poles.im[k] === 0 && poles.onBoundary[k] === 1)
      expect(there).toHaveLength(2)
    }
  })

  it('three in a row and mixed are three', () => {
    expect(sorted(factorsOf(rotated(companion([1], [0, 0, 0, 1]), 3)).poles.re)).toEqual([0, 0, 0])
  })

  it('seen by their rate alone leave one hidden at 0, in any coordinates', () => {
    const rate = companion([0, 1], [0, 0, 1])
    for (const gain of [rate, rotated(rate, 4)]) {
      const { poles, zeros } = factorsOf(gain)
      expect([Array.from(poles.re), Array.from(zeros.re), Array.from(zeros.im)]).toEqual([[0, 0], [0], [0]])
    }
  })

  it('are not made of slow poles: -1e-7, -2e-7 stay', () => {
    const slow = parallel(companion([1], [1e-7, 1]), companion([1], [2e-7, 1]), companion([1], [50, 1]))
    for (const gain of [slow, rotated(parallel(companion([1], [1e-3, 1]), companion([1], [2e-3, 1]), companion([1], [50, 1])), 8)]) {
      expect(Array.from(factorsOf(gain).poles.onBoundary)).toEqual([0, 0, 0])
    }
  })

  it('of a sampled system lie at z = 1 exactly, mixed or not', () => {
    // T^2/2 (z + 1)/(z - 1)^2 with T = 0.1: the double integrator behind a zero-order hold; closed form
    const held = stateSpace([[1, 0.1], [0, 1]], [[0.005], [0.1]], [[1, 0]], undefined, 0.1)
    for (const gain of [held, rotated(held, 2)]) {
      const { poles, zeros, gain: lead } = factorsOf(gain)
      expect([Array.from(poles.re), Array.from(poles.im)]).toEqual([[1, 1], [0, 0]])
      expect(zeros.re).toHaveLength(1)
      expect(zeros.re[0]).toBeCloseTo(-1, 12)
      expect(lead).toBeCloseTo(0.005, 14)
    }
  })
})

describe('poles and zeros', () => {
  it('of a Jordan block of three agree with 1/(s + 1)^3', () => {
    const jordan = stateSpace([[-1, 1, 0], [0, -1, 1], [0, 0, -1]], [[0], [0], [1]], [[1, 0, 0]])
    expectResponse(factorsOf(jordan), s => over([1, 0], polynomial([1, 3, 3, 1], s)), [0.1, 1, 10])
    // mixed and rounded, the pole moves by the cube root of rounding, the response by rounding
    expectResponse(factorsOf(rotated(jordan, 3)), s => over([1, 0], polynomial([1, 3, 3, 1], s)), [0.1, 1, 10], 1e-13)
  })

  it('of entries from 1e-8 to 1e8: the companion form of a filter at 1e4 rad/s', () => {
    // (s + 1e3)/((s + 1e4)(s^2 + 1e2 s + 1e8)) over powers of ten exact in doubles
    const denominator = [1e12, 1e8 + 1e6, 1e4 + 1e2, 1]
    expectResponse(factorsOf(companion([1e3, 1], denominator)), s => over(polynomial([1e3, 1], s), polynomial(denominator, s)), [1, 1e3, 1e4, 1e6])
    const scaled = companion([1e3, 1], denominator)
    for (const [i, size] of [1e8, 1, 1e-8].entries()) {
      scaled.b[i]![0]! *= size
      scaled.c[0]![i]! /= size
      scaled.a[i] = scaled.a[i]!.map(value => value * size)
      for (const row of scaled.a) row[i]! /= size
    }
    expectResponse(factorsOf(scaled), s => over(polynomial([1e3, 1], s), polynomial(denominator, s)), [1, 1e3, 1e4, 1e6], 1e-11)
  })

  it('of two modes a part in 1e9 apart are both there, with the zero between', () => {
    const { poles, zeros } = factorsOf(parallel(mode(10, 1e-3), mode(10 * (1 + 1e-9), 1e-3)))
    const heights = sorted(poles.im).slice(2)
    expect(heights[1]! - heights[0]!).toBeGreaterThan(0.9e-8)
    expect(zeros.im.some(im => im > heights[0]! && im < heights[1]!)).toBe(true)
  })

  it('of two equal modes: one is seen, the other cannot be reached', () => {
    for (const gain of [parallel(mode(10, 1e-3), mode(10, 1e-3)), rotated(parallel(mode(10, 1e-3), mode(10, 1e-3)), 6)]) {
      const { loop, notes } = stateSpaceLeaf(gain, 0, 0)
      expect(notes).toHaveLength(1)
      expectResponse(rationalPart(loop!, undefined), s => over([2, 0], polynomial([100, 0.02, 1], s)), [1, 9.99, 10.01, 100], 1e-10)
    }
  })

  it.each([1, 2, 3, 4, 5, 6])('of a chain of %i lags: all zeros at infinity, mixed or not', (count) => {
    // 1/(s + 1)...(s + count)
    const chain = stateSpace(
      Array.from({ length: count }, (_, i) => Array.from({ length: count }, (_, j) => i === j ? -(i + 1) : i === j + 1 ? 1 : 0)),
      Array.from({ length: count }, (_, i) => [i === 0 ? 1 : 0]), [Array.from({ length: count }, (_, j) => j === count - 1 ? 1 : 0)])
    for (const gain of [chain, rotated(chain, count)]) {
      const loop = factorsOf(gain)
      expect(loop.zeros.re).toHaveLength(0)
      expect(loop.gain).toBeCloseTo(1, 10)
    }
  })

  it('of twenty masses between springs and dampers, 19 zeros on one point that double-double does not tell apart: an answer that says how far it can be trusted', () => {
    const count = 20
    const size = 2 * count
    const a = Array.from({ length: size }, () => new Array<number>(size).fill(0))
    for (let i = 0; i < count; i++) {
      a[2 * i]![2 * i + 1] = 1
      for (const j of [i - 1, i + 1].filter(place => place >= 0 && place < count)) {
        a[2 * i + 1]![2 * i]! -= 100
        a[2 * i + 1]![2 * j]! += 100
        a[2 * i + 1]![2 * i + 1]! -= 0.02
        a[2 * i + 1]![2 * j + 1]! += 0.02
      }
    }
    const pick = (place: number) => Array.from({ length: size }, (_, k) => k === place ? 1 : 0)
    const chain = stateSpace(a, pick(1).map(value => [value]), [pick(2 * count - 2)])
    for (const gain of [chain, rotated(chain, 5)]) {
      const { loop, accuracy } = stateSpaceLeaf(gain, 0, 0)
      // 1/(20 s^2) in the end: the whole moves as one body
      expect(loop!.denominator.get('0,1')!.power).toBe(2)
      const [re] = valueOf(rationalPart(loop!, undefined), 0, 1e-3)
      const { relative } = accuracy()
      expect(Math.abs(re * -20 * 1e-6 - 1)).toBeLessThan(1e-6 + 2 * relative)
      expect(relative).toBeLessThan(0.1)
      if (gain === chain) expect(relative).toBeGreaterThan(1e-9)
    }
  })

  it('in the right half plane: (1 - s)(s + 4)/((s + 1)(s + 2)(s + 3)) of its partial fractions', () => {
    // residues 3, -6, 2... by hand: at -1: 2*3/(1*2) = 3; at -2: 3*2/(-1*1) = -6; at -3: 4*1/(-2*-1) = 2
    const gain = stateSpace([[-1, 0, 0], [0, -2, 0], [0, 0, -3]], [[1], [1], [1]], [[3, -6, 2]])
    for (const form of [gain, rotated(gain, 2), skewed(gain, 2, 2)]) {
      const { zeros, gain: lead } = factorsOf(form)
      expect(lead).toBeCloseTo(-1, 9)
      expect(sorted(zeros.re)[0]).toBeCloseTo(-4, 8)
      expect(sorted(zeros.re)[1]).toBeCloseTo(1, 8)
    }
  })

  it('of three inputs and three outputs agree with the sums of their modes, over one denominator', () => {
    const modes = [[3, 0.01], [7, 0.002], [20, 0.005]] as const
    const gainsIn = [[1, 0.5, -2], [0.3, 1, 1], [2, -1, 0.25]]
    const gainsOut = [[1, 2, 3], [-1, 0.5, 2], [0.75, 1, -1]]
    const single = parallel(...modes.map(([w, damping]) => mode(w, damping)))
    const gain = stateSpace(single.a,
      modes.flatMap((_, k) => [[0, 0, 0], gainsIn[k]!]),
      [0, 1, 2].map(output => modes.flatMap(([w], k) => [gainsOut[k]![output]! / w, 0])))
    const mixed = rotated(gain, 12)
    const denominators = new Set<string>()
    for (let output = 0; output < 3; output++) {
      for (let input = 0; input < 3; input++) {
        const { loop, accuracy } = stateSpaceLeaf(mixed, output, input)
        denominators.add([...loop!.denominator.keys()].join(';'))
        expect(accuracy().relative).toBeLessThan(1e-12)
        expectResponse(rationalPart(loop!, undefined), (s) => {
          let sum: Complex = [0, 0]
          modes.forEach(([w, damping], k) => {
            const [re, im] = over([gainsIn[k]![input]! * gainsOut[k]![output]!, 0], polynomial([w * w, 2 * damping * w, 1], s))
            sum = [sum[0] + re, sum[1] + im]
          })
          return sum
        }, [0.5, 2.99, 7.01, 19.9, 300], 1e-10)
      }
    }
    expect(denominators.size).toBe(1)
  })

  it('of badly conditioned coordinates are those of the rounded matrices, to the accuracy stated', () => {
    const accuracyIn = (digits: number) => stateSpaceLeaf(skewed(parallel(mode(1, 0.01), mode(5, 0.003), mode(30, 0.002)), 9, digits), 0, 0)
    for (const digits of [1, 2, 3]) {
      expect(accuracyIn(digits).loop).not.toBeNull()
      expect(accuracyIn(digits).accuracy().relative).toBeLessThan(1e-11)
    }
    // of condition 1e8 and entries of 1e8: not one digit of the damping is left, and it is told
    expect(accuracyIn(4).accuracy().relative).toBeGreaterThan(1e-9)
  })

  it('of a sampled system: 0.5 z/(z^2 - 1.6 z + 0.8), its poles well inside the circle', () => {
    const gain = { ...companion([0, 0.5], [0.8, -1.6, 1]), sampleTime: 0.01 }
    for (const form of [gain, { ...rotated(gain, 3), sampleTime: 0.01 }]) {
      expectResponse(factorsOf(form), z => over(polynomial([0, 0.5], z), polynomial([0.8, -1.6, 1], z)), [0.1, 0.46, 1, 3], 1e-12)
    }
  })
})

describe('modes that a channel does not show', () => {
  // states: a mode reached and seen, one not reached, one not seen
  const hidden = (pole: number) => stateSpace([[-1, 0, 0], [0, pole, 0], [0, 0, 2 * pole]], [[1], [0], [1]], [[1, 1, 0]])

  it.each([['plain', hidden(-5)], ['mixed', rotated(hidden(-5), 7)]])('are told by how they hide and stay in pole and zero: %s', (_, gain) => {
    const { loop, notes } = stateSpaceLeaf({ ...gain, inputs: ['torque'], outputs: ['rate'] }, 0, 0)
    expect(notes.map(note => note.code).sort()).toEqual(['unobservable', 'unreachable'])
    expect(notes.find(note => note.code === 'unreachable')!.message).toContain('s = -5')
    expect(notes.find(note => note.code === 'unreachable')!.message).toContain('reached from input torque')
    expect(notes.find(note => note.code === 'unobservable')!.message).toContain('s = -10')
    expect(notes.find(note => note.code === 'unobservable')!.message).toContain('seen at output rate')
    const { poles, zeros } = rationalPart(loop!, undefined)
    expect(poles.re).toHaveLength(3)
    for (const zero of zeros.re) expect(Array.from(poles.re)).toContain(zero)
  })

  it('for a second input only are told there', () => {
    const gain = rotated(stateSpace([[-1, 0], [0, -3]], [[1, 1], [1, 0]], [[1, 1]]), 2)
    expect(stateSpaceLeaf(gain, 0, 0).notes).toEqual([])
    const { notes, loop } = stateSpaceLeaf(gain, 0, 1)
    expect(notes.map(note => note.code)).toEqual(['unreachable'])
    expect([...loop!.denominator.keys()]).toEqual([...stateSpaceLeaf(gain, 0, 0).loop!.denominator.keys()])
  })
})
