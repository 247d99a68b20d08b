import { createHash } from 'node:crypto'
import { readdirSync, readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { root } from './paths.mjs'

/** SHA-256 over the names and bytes of these files and folders of the checkout: equal while nothing in them changed. */
export function hashFiles(names) {
  const hash = createHash('sha256')
  const visit = (name) => {
    const path = join(root, name)
    const found = statSync(path, { throwIfNoEntry: false })
    if (!found) return
    if (found.isDirectory()) return readdirSync(path).sort().forEach(entry => visit(join(name, entry)))
    hash.update(name).update('\0').update(readFileSync(path)).update('\0')
  }
  names.forEach(visit)
  return hash.digest('hex')
}
