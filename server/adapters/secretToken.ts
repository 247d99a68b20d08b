import { createHash, randomBytes } from 'node:crypto'

/** A secret of 256 random bits, fit for a cookie or a link. */
export const newSecret = (): string => randomBytes(32).toString('base64url')

/** What is stored of a secret: its SHA-256, from which it cannot be found again. */
export const hashOfSecret = (secret: string): string => createHash('sha256').update(secret).digest('hex')
