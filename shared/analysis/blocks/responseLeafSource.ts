import { AnalysisInputError } from '../AnalysisInputError'
import type { ExactLoop } from '../expressions/ExactLoop'
import { rationalPart } from '../expressions/rationalPart'
import { prepareFactoredGain } from '../prepareFactoredGain'
import type { LeafSource } from './BlockScope'
import { exactLeafSource, type ExactLeafSource } from './exactLeafSource'
import { type Response, responseAlgebra } from './responseAlgebra'

/**
 * The blocks of a loop as functions of frequency w (rad/s), up to half the sampling frequency.
 *
 * @param sampleTime s, of the loop
 * @param measured the values of each measured block by its name
 */
export function responseLeafSource(sampleTime: number | undefined, measured: ReadonlyMap<string, Response>): LeafSource<Response> & Pick<ExactLeafSource, 'notes' | 'accuracy'> {
  const { rational, notes, accuracy } = exactLeafSource()
  return {
    notes,
    accuracy,
    algebra: responseAlgebra(sampleTime),
    rational: (name, gain, channel) => {
      const loop = rational(name, gain, channel)
      return loop && responseOf(loop, 'sampleTime' in gain && gain.sampleTime !== undefined ? sampleTime : undefined)
    },
    expression: (_, part) => part,
    measured: (name) => {
      const response = measured.get(name)
      if (!response) throw new AnalysisInputError('The block is measured: it is known only at its points.', 'points')
      return response
    },
  }
}

function responseOf(loop: ExactLoop, sampleTime: number | undefined): Response {
  const { evaluate } = prepareFactoredGain(rationalPart(loop, sampleTime))
  const out = new Float64Array(2)
  return w => evaluate(w, out) ? { re: out[0]!, im: out[1]! } : { re: Number.NaN, im: Number.NaN }
}
