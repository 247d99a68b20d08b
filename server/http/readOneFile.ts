import type { H3Event } from 'h3'
import busboy from 'busboy'
import { AppError } from '#shared/errors/AppError'

/**
 * The one file, in the field `file`, of a multipart request, counted as it arrives. Throws 'invalid input' where it is not just
 * that, 'too large' over the limit (bytes).
 */
export function readOneFile(event: H3Event, limit: number): Promise<{ name: string, bytes: Buffer }> {
  const request = event.node.req
  if (!/^multipart\/form-data;/i.test(request.headers['content-type'] ?? '')) {
    throw new AppError('invalidInput', 'The request must carry a file as multipart/form-data.', { path: 'file' })
  }
  return new Promise((resolve, reject) => {
    let found: { name: string, bytes: Buffer } | undefined
    const form = busboy({ headers: request.headers, defParamCharset: 'utf8', limits: { files: 1, fields: 0, parts: 2, fileSize: limit } })
    const refuse = (error: AppError) => {
      request.unpipe(form)
      // The rest is read and dropped, so that the browser gets to read the answer.
      request.resume()
      reject(error)
    }
    form.on('file', (field, stream, info) => {
      const chunks: Buffer[] = []
      stream.on('data', (chunk: Buffer) => chunks.push(chunk))
      stream.on('limit', () => refuse(new AppError('tooLarge', `The file holds more than ${limit.toLocaleString('en')} bytes.`, { path: 'file' })))
      stream.on('end', () => {
        if (field === 'file') found = { name: info.filename ?? '', bytes: Buffer.concat(chunks) }
      })
    })
    form.on('filesLimit', () => refuse(new AppError('invalidInput', 'Send one file at a time.', { path: 'file' })))
    form.on('error', cause => refuse(new AppError('invalidInput', 'The upload broke off or is not multipart/form-data.', { path: 'file', cause })))
    form.on('close', () => found ? resolve(found) : reject(new AppError('invalidInput', 'There is no file in the field \'file\'.', { path: 'file' })))
    request.on('aborted', () => reject(new AppError('invalidInput', 'The upload broke off.', { path: 'file' })))
    request.pipe(form)
  })
}
