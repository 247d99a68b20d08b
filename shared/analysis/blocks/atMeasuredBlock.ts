import { AnalysisInputError } from '../AnalysisInputError'
import type { MeasuredLoop } from './measuredInputOf'

/** Runs a step on a measured loop: over blocks its faults are told at the points of the measured block. */
export function atMeasuredBlock<T>({ block }: MeasuredLoop, step: () => T): T {
  try {
    return step()
  }
  catch (error) {
    if (!(error instanceof AnalysisInputError) || block === null || !error.path.startsWith('measured.')) throw error
    const { message, path, position } = error
    throw new AnalysisInputError(message, `blocks.${block}.${path.slice('measured.'.length)}`, position)
  }
}
