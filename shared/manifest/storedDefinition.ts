import type { ManifestDefinition, ManifestUploadName } from '../types/manifest'

/** A definition of a manifest as it is stored: the upload it reads by its id. The other way is `manifestDefinition`. */
export function storedDefinition<Definition extends object>(definition: ManifestDefinition<Definition>, idOf: (upload: ManifestUploadName) => number): Definition {
  if (!('upload' in (definition as object))) return definition as Definition
  const { upload, ...rest } = definition as { upload: ManifestUploadName }
  return { ...rest, uploadId: idOf(upload) } as unknown as Definition
}
