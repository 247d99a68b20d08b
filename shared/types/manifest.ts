import type { FrequencyUnit } from './analysis'
import type { BlockDefinition, BlockRole } from './block'
import type { Criterion } from './criterion'
import type { SourceDefinition } from './source'
import type { BreakAt } from './system'

/** Which of the manifest's uploads a definition reads. */
export interface ManifestUploadName {
  fileName: string
  sha256: string
}

/** A stored definition with the upload it reads named by file and hash: ids mean nothing outside their database. */
export type ManifestDefinition<Definition> = Definition extends { uploadId: number } ? Omit<Definition, 'uploadId'> & { upload: ManifestUploadName } : Definition

export interface ManifestCondition {
  code: string
  name: string
  coordinates: { name: string, unit: string, value: number }[]
  tags: string[]
  notes: string
}

export interface ManifestParameter {
  name: string
  unit: string
  notes: string
  /** by the code of the operating condition */
  values: Record<string, number>
}

export interface ManifestBlock {
  name: string
  role: BlockRole
  unitIn: string
  unitOut: string
  notes: string
  definition: ManifestDefinition<BlockDefinition> | null
  /** by the code of the operating condition */
  byCondition: Record<string, ManifestDefinition<BlockDefinition>>
}

/** What another loop does while this one is open, by its code. */
export interface ManifestLoopState {
  loop: string
  state: 'closed' | 'open' | 'held'
  gain?: number
}

/** A source in one or several operating conditions, where it is the same in all of them. */
export interface ManifestSource {
  name: string
  /** codes */
  conditions: string[]
  ofRecord: boolean
  setAsideReason: string
  definition: ManifestDefinition<SourceDefinition>
}

export interface ManifestLoop {
  code: string
  name: string
  axis: string
  breakPoint: string
  breakAt: BreakAt | null
  otherLoops: string
  loopStates: ManifestLoopState[]
  notes: string
  sources: ManifestSource[]
}

/** An uploaded file: its text where the bytes are UTF-8, else the bytes in base 64. */
export type ManifestUpload = ManifestUploadName & ({ text: string } | { base64: string })

/** The format's name, and the version of it that this program reads and writes. */
export const manifestFormat = 'wideberth system'
export const manifestVersion = 1

/**
 * A whole system as one JSON text: nothing but what an engineer has put in, without ids, dates or people. docs/manifest.md describes it field by field.
 */
export interface Manifest {
  format: typeof manifestFormat
  version: typeof manifestVersion
  system: { name: string, customer: string, documentNumber: string, frequencyUnit: FrequencyUnit, description: string }
  conditions: ManifestCondition[]
  parameters: ManifestParameter[]
  blocks: ManifestBlock[]
  loops: ManifestLoop[]
  criteria: Criterion[]
  uploads: ManifestUpload[]
}
