import { AppError } from '#shared/errors/AppError'
import type { InputFault } from '#shared/schemas/readBySchema'
import { assertDefinition } from '../sources/assertDefinition'
import { refuseManifest } from './refuseManifest'
import type { StoredManifest } from './storeManifest'

/** Refuses a manifest with every definition in it that a route would refuse, each at its place. To be called in the transaction that has stored it. */
export async function assertManifestDefinitions({ system, sources }: StoredManifest): Promise<void> {
  const faults: InputFault[] = []
  for (const { path, definition } of sources) faults.push(...await faultsOf(path, () => assertDefinition(definition, system)))
  if (faults.length > 0) throw refuseManifest(faults)
}

/** What a check refuses, at its place in the manifest; where it is about a file, every bad line. */
async function faultsOf(path: string, check: () => Promise<void>): Promise<InputFault[]> {
  try {
    await check()
    return []
  }
  catch (error) {
    if (!(error instanceof AppError)) throw error
    const place = error.path === undefined ? path : `${path}.${error.path}`
    return [{ path: place, message: error.message }, ...problemsOf(error.details).map(({ line, message }) => ({ path: place, message: line > 0 ? `Line ${line}: ${message}` : message }))]
  }
}

function problemsOf(details: unknown): { line: number, message: string }[] {
  if (typeof details !== 'object' || details === null || !('problems' in details)) return []
  return details.problems as { line: number, message: string }[]
}
