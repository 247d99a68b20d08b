import { readdirSync } from 'node:fs'
import { fileURLToPath } from 'node:url'

/** The key of each route, such as 'PATCH /api/loops/[loopId]', read from the names of the files under server/api. */
export function routeKeysOfFiles(): string[] {
  const folder = fileURLToPath(new URL('../../server/api', import.meta.url))
  return readdirSync(folder, { recursive: true, withFileTypes: true })
    .filter(entry => entry.isFile())
    .map(entry => `${entry.parentPath}/${entry.name}`.slice(folder.length))
    // the answer to addresses that are no route
    .filter(path => path !== '/[...path].ts')
    .map((path) => {
      const [, address, method] = /^(.*)\.(get|post|put|patch|delete)\.ts$/.exec(path) ?? []
      if (address === undefined || method === undefined) throw new Error(`server/api${path} does not name its method.`)
      return `${method.toUpperCase()} /api${address.replace(/\/index$/, '')}`
    })
    .sort()
}
