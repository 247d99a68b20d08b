import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { BlockScope } from '#shared/analysis/blocks/BlockScope'
import { responseLeafSource } from '#shared/analysis/blocks/responseLeafSource'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { sampleTimeOfInput } from '#shared/analysis/sampleTimeOfInput'
import type { ExpressionInput } from '#shared/types/analysis'
import type { BlockGain } from '#shared/types/block'

/** Two decimals, so that nothing is nearly but not quite cancelled. */
const value = fc.integer({ min: -300, max: 300 }).map(n => n / 100)
const size = fc.integer({ min: 1, max: 500 }).map(n => n / 100)
const rootIn = (sampled: boolean) => sampled ? fc.integer({ min: -95, max: 95 }).map(n => n / 100) : size.map(n => -n)

/** A proper block of each rational kind, its poles inside the boundary so that it has a value everywhere on it. */
function rationalBlock(sampleTime?: number): fc.Arbitrary<BlockGain> {
  const sampled = sampleTime !== undefined
  const timing = sampled ? { sampleTime } : {}
  const roots = (most: number) => fc.array(rootIn(sampled), { minLength: most, maxLength: most })
  const zerosPoles = fc.tuple(roots(1), roots(2), size).map(([zeros, poles, gain]): BlockGain => ({ kind: 'zerosPoles', zeros: zeros.map(re => [re, 0]), poles: poles.map(re => [re, 0]), gain, ...timing }))
  const coefficients = fc.tuple(value, size, rootIn(sampled)).map(([a, b, pole]): BlockGain => ({ kind: 'coefficients', numerator: [a, b], denominator: [1, -pole], ...timing }))
  const expression = fc.tuple(size, rootIn(sampled)).map(([gain, pole]): BlockGain => ({ kind: 'expression', expression: `${gain}/(${sampled ? 'z' : 's'} - (${pole}))`, ...timing }))
  const others = sampled
    ? fc.tuple(value, size, rootIn(true)).map(([b1, b0, pole]): BlockGain => ({ kind: 'sections', sections: [[b0, b1, 0.5, 1, -pole, 0]], gain: 0.5, sampleTime: sampleTime! }))
    : fc.tuple(size, size).map(([frequency, gain]): BlockGain => ({ kind: 'modal', frequencyUnit: 'rad/s', derivative: 1, modes: [{ name: '', frequency, damping: 0.2, gainIn: [gain], gainOut: [1] }, { name: '', frequency: 2 * frequency, damping: 0.1, gainIn: [-0.5], gainOut: [1] }], rigid: [{ power: 0, gainIn: [0.1], gainOut: [1] }], inputs: [], outputs: [] }))
  return fc.oneof(zerosPoles, coefficients, expression, others)
}

/** Products, sums, quotients and feedbacks over A, B, C and a dead time D. */
const form = fc.constantFrom(
  'A*B*C*D', 'A*B/(1 + 0.3*C)', 'D*A/(1 + 0.2*B*C) + 0.1*C', '(A + B)*(A - 0.5*C)*D', 'A/(1 + 0.3*A*B)*C/(1 + 0.1*C)', 'A*(1 + D)*B', '-(A*B)^2*C/4', 'Q*A + D*B', 'A*B*Q/(1 + 0.2*Q)',
)

function loops(sampleTime?: number): fc.Arbitrary<ExpressionInput> {
  const block = rationalBlock(sampleTime)
  return fc.tuple(form, block, block, block, fc.integer({ min: 1, max: 3 })).map(([expression, A, B, C, count]): ExpressionInput => ({
    expression,
    blocks: { A, B, C, D: sampleTime === undefined ? { kind: 'deadTime', deadTime: count / 10, unit: 's' } : { kind: 'deadTime', deadTime: count, unit: 'samples' }, Q: { kind: 'expression', expression: 'A*C/(1 + 0.1*B)' } },
  }))
}

/** The loop gain exactly built, then evaluated; and evaluated block by block. Null for a loop that is refused (zero, say). */
function both(input: ExpressionInput, w: number): { exact: [number, number], byBlocks: [number, number], size: number } | null {
  const out = new Float64Array(2)
  try {
    if (!prepareLoopGain(input).evaluate(w, out)) return null
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return null
    throw error
  }
  const scope = new BlockScope(input, responseLeafSource(sampleTimeOfInput(input), new Map()))
  const { re, im } = scope.arithmetic.settle(scope.evaluate()!, 0).value(w)
  return { exact: [out[0]!, out[1]!], byBlocks: [re, im], size: Math.hypot(re, im) }
}

describe('a loop over random blocks', () => {
  for (const [kind, sampleTime, frequencies] of [['continuous', undefined, [0.02, 0.7, 3.1, 40]], ['sampled', 0.05, [0.02, 0.7, 12, 60]]] as const) {
    it(`that is ${kind} has the same value exactly built and evaluated block by block`, () => {
      let compared = 0
      fc.assert(fc.property(loops(sampleTime), (input) => {
        for (const w of frequencies) {
          const values = both(input, w)
          if (!values) continue
          compared++
          const { exact, byBlocks, size } = values
          // an absolute part: sums of terms of size 1 to 1e3 lose what cancels
          expect(Math.hypot(exact[0] - byBlocks[0], exact[1] - byBlocks[1])).toBeLessThan(1e-10 * size + 1e-12)
        }
      }), { numRuns: 150, seed: 20261201 })
      expect(compared).toBeGreaterThan(400)
    })
  }
})
