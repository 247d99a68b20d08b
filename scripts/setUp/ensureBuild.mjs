import { existsSync, mkdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { hashFiles } from './hashFiles.mjs'
import { root } from './paths.mjs'
import { requireStep } from './runStep.mjs'

/** What the built application is made from. */
const sources = ['app', 'server', 'shared', 'templates', 'public', 'modules', 'scripts/workers', 'nuxt.config.ts', 'tailwind.config.ts', 'package-lock.json']

/** Builds the application unless `.output` was built from just these sources. Returns the path of the server's entry. */
export async function ensureBuild() {
  const output = join(root, '.output')
  const stamp = join(output, 'built-from')
  const entry = join(output, 'server', 'index.mjs')
  const wanted = hashFiles(sources)
  if (existsSync(entry) && existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted) return entry
  console.log('Building the application (about a minute) ...')
  rmSync(stamp, { force: true })
  await requireStep('Building', 'npx', ['--no-install', 'nuxt', 'build'], { quiet: true, env: { NODE_ENV: 'production', NUXT_TELEMETRY_DISABLED: '1' } })
  mkdirSync(output, { recursive: true })
  writeFileSync(`${stamp}.new`, wanted)
  renameSync(`${stamp}.new`, stamp)
  return entry
}
