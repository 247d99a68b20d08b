import { isUtf8 } from 'node:buffer'
import type { H3Event } from 'h3'
import { AppError } from '#shared/errors/AppError'

/**
 * The JSON body of a request, counted as it arrives: the length a client announces is not believed.
 * Throws 'too large' over the limit (bytes) and 'invalid input' for what is not JSON.
 */
export async function readJsonBody(event: H3Event, limit: number): Promise<unknown> {
  const text = await readJsonText(event, limit)
  try {
    return JSON.parse(text) as unknown
  }
  catch (cause) {
    throw new AppError('invalidInput', 'The request is not JSON.', { cause })
  }
}

/** The JSON body of a request as its text, not yet read. Throws 'too large' over the limit (bytes) and 'invalid input' where it does not say that it is JSON or is not in UTF-8. */
export async function readJsonText(event: H3Event, limit: number): Promise<string> {
  const type = event.node.req.headers['content-type'] ?? ''
  if (!/^application\/json(?:;|$)/i.test(type)) throw new AppError('invalidInput', 'The request must carry JSON (content-type application/json).')
  const bytes = await readBytes(event, limit)
  // Decoded as it comes, a letter of another encoding would be stored as a question mark.
  if (!isUtf8(bytes)) throw new AppError('invalidInput', 'The request is not in UTF-8, as JSON is: save the file in that encoding.')
  return bytes.toString('utf8')
}

/** The bytes of a request's body; throws 'too large' as soon as they pass the limit. */
export async function readBytes(event: H3Event, limit: number): Promise<Buffer> {
  const chunks: Buffer[] = []
  let size = 0
  for await (const chunk of event.node.req as AsyncIterable<Buffer>) {
    size += chunk.length
    if (size > limit) throw new AppError('tooLarge', `The request holds more than ${limit.toLocaleString('en')} bytes.`)
    chunks.push(chunk)
  }
  return Buffer.concat(chunks)
}
