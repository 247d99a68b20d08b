import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'

/** What a step is refused with; it fails where nothing is refused. */
export function refusalOf(step: () => unknown): { message: string, path: string, position: number | undefined } {
  try {
    step()
  }
  catch (error) {
    if (!(error instanceof AnalysisInputError)) throw error
    return { message: error.message, path: error.path, position: error.position }
  }
  throw new Error('nothing was refused')
}
