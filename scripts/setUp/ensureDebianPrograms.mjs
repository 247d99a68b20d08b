import { existsSync } from 'node:fs'
import { runStep } from './runStep.mjs'

const folders = ['/usr/bin', '/usr/local/bin', '/bin']
const isThere = program => folders.some(folder => existsSync(`${folder}/${program}`))

/** Each program we may need: the Debian package that brings it, and how we see that it is there. */
const packages = {
  'chromium': { isThere: () => Boolean(process.env.WIDEBERTH_CHROMIUM) || isThere('chromium'), for: 'printing reports as PDF' },
  'poppler-utils': { isThere: () => isThere('pdfinfo') && isThere('pdffonts'), for: 'testing the PDF' },
  'unzip': { isThere: () => isThere('unzip'), for: 'testing the ZIP' },
}

/**
 * Installs those of these Debian packages that are missing, where this process may; otherwise says what to install by hand.
 * Returns whether all are there.
 */
export async function ensureDebianPrograms(names) {
  const missing = names.filter(name => !packages[name].isThere())
  if (missing.length === 0) return true
  const byHand = `apt-get install ${missing.join(' ')}`
  if (process.getuid?.() !== 0 || !isThere('apt-get')) {
    console.log(missing.map(name => `${name} was not found; it is needed for ${packages[name].for}.`).join('\n'))
    console.log(`Install by hand as root: ${byHand}  (or, for a Chromium elsewhere, set WIDEBERTH_CHROMIUM to its path)`)
    return false
  }
  console.log(`Installing from Debian: ${missing.join(', ')} ...`)
  const env = { DEBIAN_FRONTEND: 'noninteractive' }
  await runStep('apt-get', ['update'], { env, quiet: true })
  const code = await runStep('apt-get', ['install', '-y', '--no-install-recommends', ...missing], { env, quiet: true })
  if (code !== 0) console.log(`That did not work. Install by hand as root: ${byHand}`)
  return code === 0
}
