/** Day of an ISO 8601 instant, UTC: '2026-12-01'. */
export const formatDate = (instant: string): string => new Date(instant).toISOString().slice(0, 10)

/** Day and minute of an ISO 8601 instant: '2026-12-01 12:04 UTC'. */
export const formatInstant = (instant: string): string => `${new Date(instant).toISOString().slice(0, 16).replace('T', ' ')} UTC`
