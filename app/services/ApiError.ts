import { errorCodes, type ErrorCode } from '#shared/errors/errorCodes'

interface ErrorReply {
  error: { code: ErrorCode, message: string, path?: string, details?: unknown }
}

const isErrorReply = (value: unknown): value is ErrorReply =>
  typeof value === 'object' && value !== null && 'error' in value
  && typeof value.error === 'object' && value.error !== null
  && 'code' in value.error && typeof value.error.code === 'string' && value.error.code in errorCodes
  && 'message' in value.error && typeof value.error.message === 'string'

/** What an API route refused, in words for the person at the screen; `path` names the field at fault, `details` is as API routes give it. */
export class ApiError extends Error {
  readonly code: ErrorCode
  readonly path: string | undefined
  readonly details: unknown

  constructor(code: ErrorCode, message: string, path?: string, details?: unknown) {
    super(message)
    this.name = 'ApiError'
    this.code = code
    this.path = path
    this.details = details
  }

  /** Any failure of a request as an ApiError; one without an answer says that the server was not reached. */
  static from(failure: unknown): ApiError {
    if (failure instanceof ApiError) return failure
    const reply = typeof failure === 'object' && failure !== null && 'data' in failure ? failure.data : undefined
    if (isErrorReply(reply)) return new ApiError(reply.error.code, reply.error.message, reply.error.path, reply.error.details)
    const status = typeof failure === 'object' && failure !== null && 'status' in failure ? failure.status : undefined
    if (typeof status === 'number' && status > 0) {
      const known = (Object.keys(errorCodes) as ErrorCode[]).find(code => errorCodes[code] === status)
      return new ApiError(known ?? 'unexpected', `The server answered ${status} without saying why. Try again; if it stays so, tell your administrator.`)
    }
    if (failure instanceof Error && !('request' in failure)) return new ApiError('unexpected', failure.message)
    return new ApiError('unavailable', 'The server could not be reached. What you typed is kept; try again in a moment.')
  }
}
