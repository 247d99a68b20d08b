import { access, constants } from 'node:fs/promises'
import { AppError } from '#shared/errors/AppError'
import { database } from '../database/database'

/** GET /api/health: whether the database answers and Chromium is where it is expected. */
export default defineApiHandler('GET /api/health', {}, async () => {
  try {
    await database().query('SELECT 1')
  }
  catch (cause) {
    throw new AppError('unavailable', 'The database does not answer.', { cause })
  }
  const chromium = await access(process.env.WIDEBERTH_CHROMIUM || '/usr/bin/chromium', constants.X_OK).then(() => 'ok', () => 'missing')
  return { ok: true, database: 'ok', chromium }
})
