import { mkdtempSync } from 'node:fs'
import { readdir, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'

const stem = 'wideberth-print-'

function isAlive(processId: number): boolean {
  try {
    process.kill(processId, 0)
    return true
  }
  catch (error) {
    // Not permitted: it lives, as somebody else's.
    return error instanceof Error && 'code' in error && error.code === 'EPERM'
  }
}

/** A folder of its own for one browser's profile; its name carries the process it belongs to. */
export const createProfile = (): string => mkdtempSync(join(tmpdir(), `${stem}${process.pid}-`))

/** Removes the profiles that servers which are gone left behind. */
export async function removeStaleProfiles(): Promise<void> {
  for (const name of await readdir(tmpdir())) {
    const processId = Number(new RegExp(`^${stem}(\\d+)-`).exec(name)?.[1])
    if (processId > 0 && !isAlive(processId)) await rm(join(tmpdir(), name), { recursive: true, force: true })
  }
}
