import { fileURLToPath } from 'node:url'
import { build } from 'esbuild'

const root = fileURLToPath(new URL('../..', import.meta.url))

/** The server's worker threads: the name of the bundle and the file it begins with. */
export const workers = { 'analysis-worker': 'server/adapters/analysisPool/analysisWorker.ts' }

/**
 * Bundles one worker with all it imports into a single file.
 * @param {string} name a key of `workers`
 * @param {string} outfile
 */
export async function bundleWorker(name, outfile) {
  await build({
    absWorkingDir: root,
    entryPoints: [workers[name]],
    outfile,
    bundle: true,
    platform: 'node',
    format: 'esm',
    target: 'node20',
    alias: { '#shared': `${root}shared`, '#server': `${root}server` },
    logLevel: 'warning',
  })
}
