import { z } from 'zod'
import { AppError } from '#shared/errors/AppError'
import { analyseInPool } from '../../adapters/analysisPool/analysisPool'

const mostEntries = 1000

/**
 * POST /api/analyses: one entry of the contract gives its analysis, a list gives a list in the same order; an entry that cannot be analysed
 * gives `{ error: { message, path } }` in its place.
 */
export default defineApiHandler('POST /api/analyses', { body: z.unknown(), bodyLimit: 50_000_000 }, async ({ body }) => {
  if (!Array.isArray(body)) return analyseInPool(body)
  if (body.length > mostEntries) throw new AppError('invalidInput', `A list holds at most ${mostEntries} entries.`)
  return Promise.all(body.map(entry => analyseInPool(entry)))
})
