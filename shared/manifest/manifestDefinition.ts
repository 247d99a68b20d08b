import type { ManifestDefinition, ManifestUploadName } from '../types/manifest'
import { definitionInOrder } from './definitionInOrder'

/** A stored definition as it stands in a manifest: its keys in order, the upload it reads by file name and hash. */
export function manifestDefinition<Definition extends object>(definition: Definition, nameOf: (uploadId: number) => ManifestUploadName): ManifestDefinition<Definition> {
  if (!('uploadId' in definition)) return definitionInOrder(definition) as ManifestDefinition<Definition>
  const { uploadId, ...rest } = definition
  const { fileName, sha256 } = nameOf(uploadId as number)
  return definitionInOrder({ ...rest, upload: { fileName, sha256 } }) as unknown as ManifestDefinition<Definition>
}
