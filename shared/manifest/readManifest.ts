import type { z } from 'zod'
import { blockDefinitionSchema } from '../schemas/block'
import { manifestSchema } from '../schemas/manifest'
import { readBySchema, type InputFault } from '../schemas/readBySchema'
import { sourceDefinitionSchema } from '../schemas/source'
import { manifestFormat, manifestVersion, type Manifest, type ManifestUploadName } from '../types/manifest'
import { findBlockCircles } from './findBlockCircles'
import { findManifestFaults } from './findManifestFaults'

export type ManifestReading = { manifest: Manifest, faults: null } | { manifest: null, faults: InputFault[] }

/**
 * A manifest from unknown data, or every fault in it with its JSON path and what to do. Checked here: the format and its version, the shape, each definition as the
 * routes do, and what the parts say of one another (codes, names, uploads, what is of record). Not here: the bytes of the uploads, and what the engine says.
 */
export function readManifest(value: unknown): ManifestReading {
  const stranger = faultOfFormat(value)
  if (stranger !== null) return { manifest: null, faults: [stranger] }
  const { data, faults } = readBySchema(manifestSchema, value)
  if (faults !== null) return { manifest: null, faults }
  const manifest = data as unknown as Manifest
  const found = [...findManifestFaults(manifest), ...readDefinitions(manifest)]
  return found.length === 0 ? { manifest, faults: null } : { manifest: null, faults: found }
}

/** Of another format or version nothing else is worth telling. */
function faultOfFormat(value: unknown): InputFault | null {
  if (typeof value !== 'object' || value === null || Array.isArray(value)) return { path: '', message: 'This is no manifest of a system: it must be a JSON object.' }
  const { format, version } = value as Record<string, unknown>
  if (format !== manifestFormat) return { path: 'format', message: `This is no manifest of a system: format must be '${manifestFormat}'.` }
  if (version === manifestVersion) return null
  return { path: 'version', message: `This manifest is of version ${JSON.stringify(version) ?? 'none'}; this program reads version ${manifestVersion}. Export it again from a program that writes that one.` }
}

/** Puts each definition as its schema reads it in its place; tells what is wrong with the others. */
function readDefinitions(manifest: Manifest): InputFault[] {
  const uploads = new Set(manifest.uploads.map(uploadKeyOf))
  const read = new Set<string>()
  const faults: InputFault[] = []
  const readAt = <Definition extends object>(schema: z.ZodType, definition: Definition, path: string): Definition => {
    const { data, faults: found } = readDefinition(schema, definition, uploads)
    faults.push(...(found ?? []).map(fault => ({ ...fault, path: fault.path === '' ? path : `${path}.${fault.path}` })))
    if (data !== null && 'upload' in data) read.add(uploadKeyOf(data.upload as ManifestUploadName))
    return (data ?? definition) as Definition
  }
  manifest.blocks.forEach((block, place) => {
    if (block.definition !== null) block.definition = readAt(blockDefinitionSchema, block.definition, `blocks[${place}].definition`)
    for (const [code, definition] of Object.entries(block.byCondition)) {
      block.byCondition[code] = readAt(blockDefinitionSchema, definition, `blocks[${place}].byCondition.${code}`)
    }
  })
  manifest.loops.forEach((loop, place) => loop.sources.forEach((source, index) => {
    source.definition = readAt(sourceDefinitionSchema, source.definition, `loops[${place}].sources[${index}].definition`)
  }))
  faults.push(...findBlockCircles(manifest.blocks))
  if (faults.length > 0) return faults
  return manifest.uploads.flatMap((upload, index) => read.has(uploadKeyOf(upload)) ? [] : [{ path: `uploads[${index}]`, message: `No definition reads the file ${upload.fileName}: leave it out.` }])
}

/** A file by its name and hash, as one word. */
export const uploadKeyOf = ({ fileName, sha256 }: ManifestUploadName): string => `${sha256} ${fileName}`

/** A definition by the schema of its stored form, in which an upload is an id: any id stands in while it is read. */
function readDefinition(schema: z.ZodType, definition: object, uploads: ReadonlySet<string>): { data: object | null, faults: InputFault[] | null } {
  if ('uploadId' in definition) return { data: null, faults: [{ path: 'uploadId', message: 'Ids mean nothing in a manifest: name the file as upload, with its fileName and sha256.' }] }
  const { upload, ...rest } = definition as { upload?: unknown }
  const { data, faults } = readBySchema(schema, upload === undefined ? rest : { ...rest, uploadId: 1 })
  if (faults !== null) return { data: null, faults: faults.map(fault => fault.path === 'uploadId' ? { path: 'upload', message: 'Is missing: name one of the uploads by its fileName and sha256.' } : fault) }
  if (upload === undefined) return { data: data as object, faults: null }
  const fault = faultOfUpload(upload, uploads)
  if (fault !== null) return { data: null, faults: [fault] }
  const { uploadId: _, ...read } = data as { uploadId: number }
  return { data: { ...read, upload }, faults: null }
}

function faultOfUpload(upload: unknown, uploads: ReadonlySet<string>): InputFault | null {
  const name = upload as ManifestUploadName | null
  if (typeof name !== 'object' || typeof name?.fileName !== 'string' || typeof name.sha256 !== 'string' || Object.keys(name).length !== 2) {
    return { path: 'upload', message: 'Must be the fileName and the sha256 of one of the uploads.' }
  }
  return uploads.has(uploadKeyOf(name)) ? null : { path: 'upload', message: `There is no ${name.fileName} with this sha256 among the uploads: add it there.` }
}
