import { accessSync, constants } from 'node:fs'
import { delimiter, join } from 'node:path'

const programs = ['chromium', 'chromium-browser', 'google-chrome-stable', 'google-chrome']

function isProgram(path: string): boolean {
  try {
    accessSync(path, constants.X_OK)
    return true
  }
  catch {
    return false
  }
}

/** Path of the Chromium to print with: WIDEBERTH_CHROMIUM if it is set, otherwise the first one on the PATH; null where there is none. */
export function findChromium(environment: NodeJS.ProcessEnv = process.env): string | null {
  const named = environment.WIDEBERTH_CHROMIUM
  if (named) return isProgram(named) ? named : null
  const folders = (environment.PATH ?? '').split(delimiter).filter(folder => folder !== '')
  for (const program of programs) {
    const found = folders.map(folder => join(folder, program)).find(isProgram)
    if (found) return found
  }
  return null
}
