import { uploadKeyOf } from '#shared/manifest/readManifest'
import type { InputFault } from '#shared/schemas/readBySchema'
import type { Manifest, ManifestUploadName } from '#shared/types/manifest'
import type { UploadBytes } from './readManifestUploads'

/** Bytes that the definitions of a manifest may have read, a file once for each way in which it is read. */
const mostRead = 500_000_000

/** What a definition that reads a file says of how. */
interface ReadingDefinition {
  upload: ManifestUploadName
  mapping?: unknown
  states?: number | null
  outputs?: string[]
}

/** The fault of a manifest that would have its files read more often than can be waited for; null where it has none. */
export function findReadingFault({ blocks, loops }: Manifest, uploads: readonly UploadBytes[]): InputFault | null {
  const sizes = new Map(uploads.map(upload => [uploadKeyOf(upload), upload.bytes.length]))
  const definitions: (object | null)[] = [
    ...blocks.flatMap(({ definition, byCondition }) => [definition, ...Object.values(byCondition)]),
    ...loops.flatMap(loop => loop.sources.map(source => source.definition)),
  ]
  const readings = new Map<string, number>()
  for (const definition of definitions) {
    if (definition === null || !('upload' in definition)) continue
    const { upload, mapping, states, outputs } = definition as ReadingDefinition
    readings.set(JSON.stringify([upload.sha256, mapping, states, outputs?.length]), sizes.get(uploadKeyOf(upload)) ?? 0)
  }
  const read = [...readings.values()].reduce((sum, size) => sum + size, 0)
  if (read <= mostRead) return null
  return { path: 'uploads', message: `The definitions read their files in ${readings.size} ways, ${Math.round(read / 1e6)} MB together; at most ${mostRead / 1e6} MB are read. Give each its own smaller file.` }
}
