import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { AppError } from '#shared/errors/AppError'

/** Runs a check and tells its refusal at the field of the definition it is about. */
export function naming(check: () => unknown): void {
  try {
    check()
  }
  catch (error) {
    if (!(error instanceof AnalysisInputError)) throw error
    const { message, path, position } = error
    throw new AppError('invalidInput', message, { path: `definition.${path}`, ...(position !== undefined && { details: { position } }), cause: error })
  }
}
