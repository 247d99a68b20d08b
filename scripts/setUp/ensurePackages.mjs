import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { hashFiles } from './hashFiles.mjs'
import { root } from './paths.mjs'
import { requireStep } from './runStep.mjs'

/** Installs the locked packages unless node_modules already holds just them. Compiling the SQLite binding takes a minute or two. */
export async function ensurePackages() {
  const [major, minor] = process.versions.node.split('.').map(Number)
  if (major < 20 || (major === 20 && minor < 9)) {
    console.error(`Wideberth needs Node.js 20.9 or newer; this is ${process.versions.node}.`)
    process.exit(1)
  }
  const stamp = join(root, 'node_modules', '.wideberth-lock')
  const wanted = hashFiles(['package-lock.json'])
  if (existsSync(stamp) && readFileSync(stamp, 'utf8') === wanted) return
  console.log('Installing packages (two to four minutes on a fresh machine; the SQLite binding is compiled) ...')
  await requireStep('Installing packages', 'npm', ['ci', '--no-audit', '--no-fund'], { quiet: true })
  writeFileSync(stamp, wanted)
}
