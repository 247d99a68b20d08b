import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { AppError } from '#shared/errors/AppError'
import { errorCodes, type ErrorCode } from '#shared/errors/errorCodes'

export interface FailureReply {
  error: { code: ErrorCode, message: string, path?: string, details?: unknown }
}

export interface Failure {
  status: number
  reply: FailureReply
  /** a fault of the program, to be logged with its stack and hidden from the person */
  unexpected: boolean
}

/** What a failure becomes on the wire: the one place that turns errors into statuses and words. */
export function describeFailure(error: unknown, requestId: string): Failure {
  if (error instanceof AppError) {
    const { code, message, path, details } = error
    return { status: errorCodes[code], unexpected: false, reply: { error: { code, message, ...(path !== undefined && { path }), ...(details !== undefined && { details }) } } }
  }
  if (error instanceof AnalysisInputError) {
    const { message, path, position } = error
    return { status: errorCodes.invalidInput, unexpected: false, reply: { error: { code: 'invalidInput', message, path, ...(position !== undefined && { details: { position } }) } } }
  }
  return {
    status: errorCodes.unexpected,
    unexpected: true,
    reply: { error: { code: 'unexpected', message: `Something went wrong on the server and was noted there under ${requestId}. Try again; if it stays so, tell your administrator.`, details: { requestId } } },
  }
}
