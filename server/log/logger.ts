import pino from 'pino'

/** The server's log: JSON lines with UTC times. WIDEBERTH_LOG sets the level (`info` unless given, `silent` for none). Secrets never reach it. */
export const logger = pino({
  level: process.env.WIDEBERTH_LOG || 'info',
  timestamp: pino.stdTimeFunctions.isoTime,
  redact: { paths: ['password', 'token', '*.password', '*.token', 'headers.cookie'], censor: '(left out)' },
})
