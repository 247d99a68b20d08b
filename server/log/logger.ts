import { createLogger } from './createLogger'

/** The server's log. WIDEBERTH_LOG sets the level (`info` unless given, `silent` for none). */
export const logger = createLogger()
