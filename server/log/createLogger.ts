import pino, { type DestinationStream, type Logger } from 'pino'

/** What a query carries: the values in it, and in the errors of its driver, may be secrets such as the link in a mail. */
const ofQuery = new Set(['sql', 'parameters', 'parent', 'original', 'errors', 'aggregateErrors', 'fields', 'instance'])

/** An error for the log: its type, words and stack, those of its causes too, and nothing of a statement it came from. */
function describe(error: Error): object {
  const described = pino.stdSerializers.err(error)
  return Object.fromEntries(Object.entries(described).filter(([key]) => !ofQuery.has(key)))
}

/** A log of JSON lines with UTC times. Secrets never reach it. */
export const createLogger = (destination?: DestinationStream): Logger => pino({
  level: process.env.WIDEBERTH_LOG || 'info',
  timestamp: pino.stdTimeFunctions.isoTime,
  redact: { paths: ['password', 'token', '*.password', '*.token', 'headers.cookie'], censor: '(left out)' },
  serializers: { err: describe },
}, destination as DestinationStream)
