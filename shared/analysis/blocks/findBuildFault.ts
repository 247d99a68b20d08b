import type { LoopInput } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import { lowerExpression } from '../expressions/lowerExpression'
import { measuredInputOf } from './measuredInputOf'

export interface BuildFault {
  message: string
  path: string
  /** character (from 0) in the expression of the path, where the fault has one */
  position?: number
}

/** Why the blocks of a loop cannot be put together as its expression says: domains, rates, an algebraic loop without a solution; null where they can. */
export function findBuildFault(input: LoopInput): BuildFault | null {
  try {
    if (measuredInputOf(input) === null && 'expression' in input) lowerExpression(input)
    return null
  }
  catch (error) {
    if (!(error instanceof AnalysisInputError)) throw error
    const { message, path, position } = error
    return { message, path, ...(position !== undefined && { position }) }
  }
}
