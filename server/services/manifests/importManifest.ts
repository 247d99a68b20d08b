import { readManifest } from '#shared/manifest/readManifest'
import type { System } from '#shared/types/system'
import { recordAudit } from '../../audit/recordAudit'
import { writeTransaction } from '../../database/database'
import { rehearse } from '../../database/rehearse'
import { presentSystem } from '../../presenters/presentSystem'
import type { ServiceContext } from '../context'
import { assertManifestBuildable, assertManifestDefinitions } from './assertManifestDefinitions'
import { findReadingFault } from './findReadingFault'
import { parseManifestText } from './parseManifestText'
import { readManifestUploads } from './readManifestUploads'
import { refuseManifest } from './refuseManifest'
import { storeManifest } from './storeManifest'

/**
 * Makes a new system of a manifest's text, with the one who imports it as its engineer. Throws 'invalid input' with every fault and its JSON path; then
 * nothing is stored. What only a condition lacks, such as a parameter's value, is no fault: its cells tell it.
 */
export async function importManifest(text: string, context: ServiceContext): Promise<System> {
  const { manifest, faults } = readManifest(parseManifestText(text))
  if (faults !== null) throw refuseManifest(faults)
  const files = readManifestUploads(manifest.uploads)
  if (files.faults.length > 0) throw refuseManifest(files.faults)
  const unreadable = findReadingFault(manifest, files.uploads)
  if (unreadable !== null) throw refuseManifest([unreadable])
  // The engine is asked with no transaction open: the others go on writing while it takes its time.
  await assertManifestBuildable(await rehearse(async () => assertManifestDefinitions(await storeManifest(manifest, files.uploads, context))))
  return writeTransaction(async () => {
    const { system } = await storeManifest(manifest, files.uploads, context)
    await recordAudit(context, 'system imported', { systemId: system.id, subjectId: system.id, payload: { name: system.name, loops: manifest.loops.length, conditions: manifest.conditions.length } })
    return presentSystem(system)
  })
}
