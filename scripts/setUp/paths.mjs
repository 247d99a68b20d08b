import { fileURLToPath } from 'node:url'
import { isAbsolute, join } from 'node:path'

/** The folder of the checkout. */
export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '')

/** The folder of all data: WIDEBERTH_DATA, or `.data` in the checkout. */
export const dataFolder = () => {
  const named = process.env.WIDEBERTH_DATA || '.data'
  return isAbsolute(named) ? named : join(root, named)
}
