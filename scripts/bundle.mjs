import { existsSync, mkdirSync, readFileSync, renameSync, statSync, writeFileSync } from 'node:fs'
import { dirname, join, relative } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'

/** The folder of the project, wherever it was cloned to and whatever folder the command was called from. */
export const projectFolder = dirname(dirname(fileURLToPath(import.meta.url)))

const cacheFolder = join(projectFolder, '.cache')

async function loadEsbuild() {
  try {
    return await import('esbuild')
  }
  catch (error) {
    if (error.code !== 'ERR_MODULE_NOT_FOUND') throw error
    console.error(`The packages are not installed: run 'npm ci' in ${projectFolder} first.`)
    process.exit(2)
  }
}

const stamp = (path) => {
  const { mtimeMs, size } = statSync(path)
  return `${mtimeMs}/${size}`
}

function isFresh(record, bundle) {
  if (!existsSync(record) || !existsSync(bundle)) return false
  const { inputs, node } = JSON.parse(readFileSync(record, 'utf8'))
  return node === process.version && Object.entries(inputs).every(([path, known]) => existsSync(join(projectFolder, path)) && stamp(join(projectFolder, path)) === known)
}

/**
 * Bundles a TypeScript entry (path from the project's folder) to `.cache/<name>.mjs` unless no file it was made from has changed, and returns the
 * address to import it from. `packages`: 'external'
 * leaves every package to be loaded from node_modules.
 */
export async function bundle(entry, name, { packages = 'bundle' } = {}) {
  const target = join(cacheFolder, `${name}.mjs`)
  const record = join(cacheFolder, `${name}.json`)
  if (isFresh(record, target)) return pathToFileURL(target).href
  const { build } = await loadEsbuild()
  mkdirSync(cacheFolder, { recursive: true })
  // written aside and renamed, so that two commands at once never read half a file
  const draft = join(cacheFolder, `${name}.${process.pid}.mjs`)
  const { metafile } = await build({
    absWorkingDir: projectFolder,
    entryPoints: [entry],
    outfile: draft,
    bundle: true,
    platform: 'node',
    format: 'esm',
    target: 'node20',
    metafile: true,
    packages,
    alias: { '#shared': join(projectFolder, 'shared'), '#server': join(projectFolder, 'server') },
    sourcemap: 'inline',
    logLevel: 'error',
  })
  const inputs = Object.fromEntries(Object.keys(metafile.inputs).map(path => [relative(projectFolder, join(projectFolder, path)), stamp(join(projectFolder, path))]))
  renameSync(draft, target)
  writeFileSync(`${record}.${process.pid}`, JSON.stringify({ node: process.version, inputs }))
  renameSync(`${record}.${process.pid}`, record)
  return pathToFileURL(target).href
}
