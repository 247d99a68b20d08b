import { createHash } from 'node:crypto'

/** SHA-256 of bytes, or of a text in UTF-8, in lower-case hexadecimal. */
export const sha256Of = (data: string | Uint8Array): string => createHash('sha256').update(data).digest('hex')
