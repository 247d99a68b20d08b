import type { H3Event } from 'h3'

/** The address a request comes from. What a proxy says of it is believed only with WIDEBERTH_TRUST_PROXY=1: a client could say the same. */
export const addressOf = (event: H3Event): string => getRequestIP(event, { xForwardedFor: process.env.WIDEBERTH_TRUST_PROXY === '1' }) ?? 'unknown'
