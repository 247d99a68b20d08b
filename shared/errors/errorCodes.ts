/** Every code an API error may carry, with its HTTP status: the only table of the two. */
export const errorCodes = {
  invalidInput: 400,
  signedOut: 401,
  notAllowed: 403,
  notFound: 404,
  conflict: 409,
  gone: 410,
  tooLarge: 413,
  refused: 422,
  tooManyTries: 429,
  unexpected: 500,
  unavailable: 503,
} as const

export type ErrorCode = keyof typeof errorCodes
