import { describe, expect, it } from 'vitest'
import { rationalPart } from '#shared/analysis/expressions/rationalPart'
import { discretise } from '#shared/analysis/sampling/discretise'
import type { HoldGain } from '#shared/types/block'
import { exactOf } from './exactOf'
import { exponential, over, plus, times, type Complex } from './complexPairs'
import { equivalentAt, expectClose, zeroOrderKernel } from './expectEquivalent'

/*
 * The discrete equivalent against other routes to the same values on the unit circle: the aliasing sum, sums over modes in closed form, responses integrated step by step.
 */

/** sum over k of hold(w + k 2 pi/T) G(w + k 2 pi/T) e^(-j(w + k 2 pi/T) delay) */
function aliasingSum(plant: (s: Complex) => Complex, kernel: (w: number) => Complex, sampleTime: number, w: number, terms: number): Complex {
  const at = (k: number): Complex => {
    const v = w + k * 2 * Math.PI / sampleTime
    return times(kernel(v), plant([0, v]))
  }
  let sum: Complex = [0, 0]
  for (let k = terms; k > 0; k--) sum = plus(sum, plus(at(k), at(-k)))
  return plus(sum, at(0))
}

const edgesKernel = (...instants: number[]) => (v: number): Complex =>
  instants.reduce<Complex>((sum, t) => plus(sum, times([1 / instants.length, 0], exponential([0, -v * t]))), [0, 0])
const late = (kernel: (v: number) => Complex, delay: number) => (v: number): Complex => times(kernel(v), exponential([0, -v * delay]))

describe('the discrete equivalent against the aliasing sum', () => {
  // relative degree 5: the tail falls with k^-5 and faster
  const text = '3*(s+2)/((s+1)^2*(s^2+0.4*s+25)*(s+30)^2)'
  const plant = (s: Complex) => over(
    times([3, 0], plus(s, [2, 0])),
    times(times(times(plus(s, [1, 0]), plus(s, [1, 0])), plus(times(s, s), plus(times([0.4, 0], s), [25, 0]))), times(plus(s, [30, 0]), plus(s, [30, 0]))))
  const T = 0.15
  const cases: [string, number, HoldGain, (v: number) => Complex][] = [
    ['zero order', 0, { kind: 'hold', hold: 'zeroOrder', sampleTime: T }, zeroOrderKernel(T)],
    ['zero order, 0.37 of a sample late', 0.37 * T, { kind: 'hold', hold: 'zeroOrder', sampleTime: T }, late(zeroOrderKernel(T), 0.37 * T)],
    ['zero order, 2.9 samples late', 2.9 * T, { kind: 'hold', hold: 'zeroOrder', sampleTime: T }, late(zeroOrderKernel(T), 2.9 * T)],
    ['one update a period at D = 0.3', 0, { kind: 'hold', hold: 'pwmSingleUpdate', sampleTime: T, duty: 0.3 }, edgesKernel(0.35 * T, 0.65 * T)],
    ['one update an edge at D = 0.2, 1.4 samples late', 1.4 * T, { kind: 'hold', hold: 'pwmDoubleUpdate', sampleTime: T, duty: 0.2 }, late(edgesKernel(0.2 * T, 0.8 * T), 1.4 * T)],
  ]
  for (const [name, delay, hold, kernel] of cases) {
    it(`${name}: the same at every frequency up to half the sampling frequency, through the resonance too`, () => {
      const found = equivalentAt(delay === 0 ? text : `${text}*exp(-${delay}*s)`, hold)
      for (const w of [0.01, 0.5, 3, 5, 9, 15, 20.9]) expectClose(found(w), aliasingSum(plant, kernel, T, w, 4000), 2e-12)
    })
  }

  it('slow sampling, the mode at twelve times half the sampling frequency', () => {
    const found = equivalentAt(text, { kind: 'hold', hold: 'zeroOrder', sampleTime: 7.5 })
    for (const w of [0.01, 0.1, 0.3, 0.41]) expectClose(found(w), aliasingSum(plant, zeroOrderKernel(7.5), 7.5, w, 20_000), 2e-12)
  })
})

describe('responses integrated step by step', () => {
  /** The response at the sampling instants to one pulse of a sample, `delay` late, by Taylor steps of y''' = u - 3 y'' - 3 y' - y, each far below a sample and none across an edge. */
  function pulseSamples(T: number, delay: number, count: number): number[] {
    let [y, v, a] = [0, 0, 0]
    const parts = 400
    const samples = [0]
    const advance = (from: number, to: number) => {
      const edges = [from, ...[delay, delay + T].filter(t => t > from + 1e-14 && t < to - 1e-14), to]
      for (let e = 0; e + 1 < edges.length; e++) {
        const [start, end] = [edges[e] as number, edges[e + 1] as number]
        const u = 0.5 * (start + end) > delay && 0.5 * (start + end) < delay + T ? 1 : 0
        const h = (end - start) / parts
        for (let k = 0; k < parts; k++) {
          // derivatives of y from the third on
          const d = [y, v, a]
          for (let n = 3; n < 9; n++) d.push((n === 3 ? u : 0) - 3 * (d[n - 1] as number) - 3 * (d[n - 2] as number) - (d[n - 3] as number))
          const series = (first: number) => {
            let [sum, factor] = [0, 1]
            for (let n = first; n < d.length; n++) {
              sum += (d[n] as number) * factor
              factor *= h / (n - first + 1)
            }
            return sum
          }
          ;[y, v, a] = [series(0), series(1), series(2)]
        }
      }
    }
    for (let k = 0; k < count; k++) {
      advance(k * T, (k + 1) * T)
      samples.push(y)
    }
    return samples
  }

  for (const lag of [0, 0.4, 1.7]) {
    it(`1/(s+1)^3, ${lag} samples late: long division of H(z) gives the samples of the response to one pulse`, () => {
      const T = 0.5
      const plant = lag === 0 ? '1/(s+1)^3' : `exp(-${lag * T}*s)/(s+1)^3`
      const { gain, zeros, poles } = rationalPart(discretise(exactOf(plant), { kind: 'hold', hold: 'zeroOrder', sampleTime: T }).loop, T)
      const expand = (roots: Float64Array) => Array.from(roots).reduce((list, root) => [...list, 0].map((value, k) => value - root * (k > 0 ? list[k - 1] as number : 0)), [1])
      const bottom = expand(poles.re)
      const top = [...new Array<number>(poles.re.length - zeros.re.length).fill(0), ...expand(zeros.re).map(value => gain * value)]
      const found: number[] = []
      for (let k = 0; k <= 12; k++) {
        let value = top[k] ?? 0
        for (let j = 1; j < bottom.length && j <= k; j++) value -= (bottom[j] as number) * (found[k - j] as number)
        found.push(value)
      }
      pulseSamples(T, lag * T, 12).forEach((sample, k) => expect(Math.abs((found[k] as number) - sample)).toBeLessThan(2e-13))
    })
  }
})
