import { AppError } from '#shared/errors/AppError'
import { findChromium } from '../adapters/chromium/findChromium'
import { database } from '../database/database'

/** GET /api/health: whether the database answers and there is a Chromium to print with. */
export default defineApiHandler('GET /api/health', {}, async () => {
  try {
    await database().query('SELECT 1')
  }
  catch (cause) {
    throw new AppError('unavailable', 'The database does not answer.', { cause })
  }
  return { ok: true, database: 'ok', chromium: findChromium() === null ? 'missing' : 'ok' }
})
