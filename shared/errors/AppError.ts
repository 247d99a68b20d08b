import type { ErrorCode } from './errorCodes'

/** A failure that a user is told in words: `message` is shown, `path` names the field at fault where there is one. */
export class AppError extends Error {
  readonly code: ErrorCode
  readonly path: string | undefined
  readonly details: unknown

  constructor(code: ErrorCode, message: string, options: { path?: string, details?: unknown, cause?: unknown } = {}) {
    super(message, { cause: options.cause })
    this.name = 'AppError'
    this.code = code
    this.path = options.path
    this.details = options.details
  }
}
