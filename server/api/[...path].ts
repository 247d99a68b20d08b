import { AppError } from '#shared/errors/AppError'
import { describeFailure } from '../http/describeFailure'

/** Every other address under /api: answered in the API's own words, not with a page. */
export default defineEventHandler((event) => {
  const { status, reply } = describeFailure(new AppError('notFound', 'There is no such route.'), '')
  setResponseStatus(event, status)
  return reply
})
