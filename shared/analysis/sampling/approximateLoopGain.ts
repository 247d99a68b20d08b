import type { ExpressionInput } from '../../types/analysis'
import { BlockScope } from '../blocks/BlockScope'
import { commonSampleTime } from '../blocks/commonSampleTime'
import { orderBlocks } from '../blocks/orderBlocks'
import type { Response } from '../blocks/responseAlgebra'
import { responseLeafSource } from '../blocks/responseLeafSource'
import type { LoopGain } from '../LoopGain'
import { prepareLoopGain } from '../prepareLoopGain'

/**
 * The continuous approximation of a loop with a sampled controller and a continuous plant, ready to be evaluated: C(e^(jwT)) times the frequency responses of hold, dead time and
 * plant, where the exact loop gain also has what the sampler brings down from above half the sampling frequency. Null where the loop has no hold, or a measured block
 * (it is then taken point by point anyway).
 *
 * @throws AnalysisInputError where the exact loop gain cannot be built either
 */
export function approximateLoopGain(input: ExpressionInput): LoopGain | null {
  const approximation = approximateResponse(input)
  if (!approximation) return null
  const { axisEnd, features, deadTime } = prepareLoopGain(input)
  return {
    evaluate: (w, out) => {
      if (!(w >= 0) || w > axisEnd * (1 + 1e-12)) return false
      const { re, im } = approximation.response(w)
      out[0] = re
      out[1] = im
      return Number.isFinite(re) && Number.isFinite(im)
    },
    axisStart: 0, axisEnd, features,
    deadTime: Math.max(deadTime, approximation.deadTime),
  }
}

/** The same as a plain function of w (rad/s), and the longest dead time in it (s); null where the loop has no hold, or a measured block. */
export function approximateResponse(input: ExpressionInput): { response: Response, deadTime: number } | null {
  const blocks = input.blocks ?? {}
  const needed = orderBlocks(input.expression, blocks)
  const kinds = needed.map(name => blocks[name]?.kind)
  if (!kinds.includes('hold') || kinds.includes('measured')) return null
  const sampleTime = commonSampleTime(input.sampleTime, needed, blocks) as number
  const leaves = responseLeafSource(sampleTime, new Map())
  const { algebra } = leaves
  let deadTime = 0
  const scope = new BlockScope(input, {
    ...leaves,
    algebra: {
      ...algebra,
      delay: (value, delay) => {
        deadTime = Math.max(deadTime, delay.toNumber())
        return algebra.delay(value, delay)
      },
    },
  })
  const part = scope.evaluate()
  if (part === null) return null
  return { response: scope.arithmetic.settle(part, scope.tree.position).value, deadTime: deadTime + sampleTime }
}
