import { existsSync, mkdirSync, readdirSync, renameSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { dataFolder } from './paths.mjs'
import { requireStep } from './runStep.mjs'

/**
 * Puts the demo data into an empty data folder: they are made whole in a folder beside and then moved in, so that a
 * start that was broken off leaves nothing half. WIDEBERTH_DEMO=0 leaves the database empty; the first visit then asks
 * for the first administrator. Returns whether the data in the folder are the demo's.
 */
export async function ensureDemoData(entry, folder = dataFolder()) {
  mkdirSync(folder, { recursive: true })
  if (existsSync(join(folder, 'wideberth.sqlite'))) return existsSync(join(folder, 'demo-data'))
  if (process.env.WIDEBERTH_DEMO === '0') return false
  console.log('Making the demo data: three systems, three issued revisions rendered (about a minute) ...')
  const making = join(folder, 'being-made')
  rmSync(making, { recursive: true, force: true })
  mkdirSync(making)
  await requireStep('Making the demo data', process.execPath, [entry], {
    quiet: 'stdout',
    env: { NODE_ENV: 'production', PORT: '0', HOST: '127.0.0.1', UV_THREADPOOL_SIZE: '16', WIDEBERTH_DATA: making, WIDEBERTH_MAKE_DEMO: '1', WIDEBERTH_SMTP_URL: '' },
  })
  for (const name of readdirSync(making).filter(entryName => entryName !== 'wideberth.sqlite')) renameSync(join(making, name), join(folder, name))
  renameSync(join(making, 'wideberth.sqlite'), join(folder, 'wideberth.sqlite'))
  rmSync(making, { recursive: true })
  return true
}
