import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import type { ExpressionInput } from '#shared/types/analysis'
import type { BlockGain } from '#shared/types/block'

/**
 * 20 modes a few per cent apart, as the sum of its fractions (the definition of a modal table) in doubles. Their common numerator has coefficients
 * that doubles cannot hold to the digits its roots need: rounded to doubles its roots would be other ones.
 */
const modes = Array.from({ length: 20 }, (_, k) => ({ name: `mode ${k + 1}`, frequency: 300 * 1.04 ** k, damping: 0.002 + 0.0001 * k, gainIn: [1 + 0.3 * Math.sin(k)], gainOut: [Math.cos(1.7 * k)] }))
const table: BlockGain = { kind: 'modal', frequencyUnit: 'rad/s', derivative: 0, modes, rigid: [{ power: -2, gainIn: [1], gainOut: [1] }], inputs: [], outputs: [] }

function sumOfModes(w: number): { re: number, im: number } {
  let re = -1 / (w * w)
  let im = 0
  for (const { frequency, damping, gainIn, gainOut } of modes) {
    const a = frequency * frequency - w * w
    const b = 2 * damping * frequency * w
    const gain = gainIn[0]! * gainOut[0]! / (a * a + b * b)
    re += gain * a
    im -= gain * b
  }
  return { re, im }
}

/** The aliasing sum of a zero-order hold on the table: sum over n of (1 - e^-jw'T)/(j w' T) G(jw'), w' = w + 2 pi n/T. Its terms fall as n^-3. */
function aliasingSum(w: number, sampleTime: number): { re: number, im: number } {
  const sum = { re: 0, im: 0 }
  const c = 1 - Math.cos(w * sampleTime)
  const s = Math.sin(w * sampleTime)
  for (let n = -4000; n <= 4000; n++) {
    const v = w + 2 * Math.PI * n / sampleTime
    const g = sumOfModes(v)
    // (c + j s)/(j v T) = (s - j c)/(v T)
    const [hr, hi] = [s / (v * sampleTime), -c / (v * sampleTime)]
    sum.re += hr * g.re - hi * g.im
    sum.im += hr * g.im + hi * g.re
  }
  return sum
}

const relativeError = (input: ExpressionInput, w: number, meant: { re: number, im: number }) => {
  const out = new Float64Array(2)
  prepareLoopGain(input).evaluate(w, out)
  return Math.hypot(out[0]! - meant.re, out[1]! - meant.im) / Math.hypot(meant.re, meant.im)
}

describe('polynomials worked out from modes', () => {
  const input: ExpressionInput = { expression: 'G', blocks: { G: table } }

  it('have no root moved to the stability boundary, however near rounded coefficients would let it lie', () => {
    for (const w of [40, 299, 306, 311.5, 400, 433.3, 520, 631, 640, 900]) expect(relativeError(input, w, sumOfModes(w))).toBeLessThan(1e-11)
  })

  it('are the same for modes typed as a sum', () => {
    const expression = ['1/s^2', ...modes.map(({ frequency, damping, gainIn, gainOut }) => `(${gainIn[0]! * gainOut[0]!})/(s^2+${2 * damping * frequency}*s+${frequency * frequency})`)].join('+')
    for (const w of [40, 299, 306, 433.3, 631, 900]) expect(relativeError({ expression }, w, sumOfModes(w))).toBeLessThan(1e-10)
  })

  it('give a discrete equivalent that hides no pole at z = 1 behind zeros that only lie close to it', () => {
    const sampled: ExpressionInput = { expression: 'H*G', blocks: { G: table, H: { kind: 'hold', hold: 'zeroOrder', sampleTime: 2e-4 } } }
    expect(analyseLoop(sampled).structure?.notes).toEqual([])
    for (const w of [40, 306, 433.3, 640, 5000]) expect(relativeError(sampled, w, aliasingSum(w, 2e-4))).toBeLessThan(1e-8)
  })

  it('have roots that are found of order 150 too, where doubles see nothing of how they crowd about z = 1', () => {
    const many = Array.from({ length: 75 }, (_, k) => ({ name: `mode ${k + 1}`, frequency: 20 * Math.PI * 1.04 ** k, damping: 0.01, gainIn: [1], gainOut: [Math.cos(k)] }))
    const input: ExpressionInput = { expression: 'K*H*G', blocks: {
      K: { kind: 'expression', expression: '1000/(z-0.2)', sampleTime: 5e-4 }, H: { kind: 'hold', hold: 'zeroOrder', sampleTime: 5e-4 },
      G: { kind: 'modal', frequencyUnit: 'rad/s', derivative: 0, modes: many, rigid: [], inputs: [], outputs: [] },
    } }
    const { coverage, structure } = analyseLoop(input)
    expect(coverage.proven).toBe(true)
    expect(structure?.accuracy?.relative).toBeLessThan(1e-11)
  })
})
