import { uploadKeyOf } from '#shared/manifest/readManifest'
import { storedDefinition } from '#shared/manifest/storedDefinition'
import type { BlockDefinition } from '#shared/types/block'
import type { Manifest, ManifestDefinition, ManifestLoop, ManifestUploadName } from '#shared/types/manifest'
import type { SourceDefinition } from '#shared/types/source'
import { BlockRow } from '../../database/models/BlockRow'
import { ConditionRow } from '../../database/models/ConditionRow'
import { CriterionRow } from '../../database/models/CriterionRow'
import { LoopRow } from '../../database/models/LoopRow'
import { MembershipRow } from '../../database/models/MembershipRow'
import { ParameterRow } from '../../database/models/ParameterRow'
import { ParameterValue } from '../../database/models/ParameterValue'
import { SourceRow } from '../../database/models/SourceRow'
import { SystemRow } from '../../database/models/SystemRow'
import { UploadRow } from '../../database/models/UploadRow'
import { storeGains, uploadOf } from '../blocks/storeGains'
import { nowOf, type ServiceContext } from '../context'
import type { UploadBytes } from './readManifestUploads'

/** A system stored from a manifest, with each definition and its place there. */
export interface StoredManifest {
  system: SystemRow
  /** id of each condition by its code */
  conditions: Ids
  sources: { path: string, definition: SourceDefinition, conditionIds: number[] }[]
}

/** The ids that codes and names became. */
export type Ids = ReadonlyMap<string, number>

const idIn = (ids: Ids, name: string): number => {
  const id = ids.get(name)
  if (id === undefined) throw new Error(`The manifest was read without ${name} being missed.`)
  return id
}

/** Writes the rows of a manifest that has been read. To be called in the transaction that checks its definitions. */
export async function storeManifest(manifest: Manifest, files: readonly UploadBytes[], context: ServiceContext): Promise<StoredManifest> {
  const system = await SystemRow.create({ ...manifest.system, version: 1, createdAt: nowOf(context) })
  const systemId = system.id
  await MembershipRow.create({ personId: context.actor.id, systemId, role: 'engineer' })
  await CriterionRow.bulkCreate(manifest.criteria.map(({ quantity, limit }) => ({ systemId, quantity, limitValue: limit })))
  const conditions = await storeConditions(manifest, systemId, context)
  await storeParameters(manifest, systemId, conditions)
  const uploads = await storeUploads(files, systemId, context)
  await storeBlocks(manifest, systemId, conditions, uploads, context)
  const loops = await storeLoops(manifest, systemId, context)
  const sources = []
  for (const [index, loop] of manifest.loops.entries()) sources.push(...await storeSources(loop, `loops[${index}]`, idIn(loops, loop.code), conditions, uploads, context))
  return { system, conditions, sources }
}

async function storeConditions({ conditions }: Manifest, systemId: number, context: ServiceContext): Promise<Ids> {
  const ids = new Map<string, number>()
  for (const [index, { code, name, coordinates, tags, notes }] of conditions.entries()) {
    ids.set(code, (await ConditionRow.create({ systemId, code, name, coordinates, tags, notes, position: index + 1, version: 1, createdAt: nowOf(context) })).id)
  }
  return ids
}

async function storeParameters({ parameters }: Manifest, systemId: number, conditions: Ids): Promise<void> {
  for (const [index, { name, unit, notes, values }] of parameters.entries()) {
    const { id } = await ParameterRow.create({ systemId, name, unit, notes, position: index + 1, version: 1 })
    await ParameterValue.bulkCreate(Object.entries(values).map(([code, value]) => ({ parameterId: id, conditionId: idIn(conditions, code), value })))
  }
}

async function storeUploads(files: readonly UploadBytes[], systemId: number, context: ServiceContext): Promise<Ids> {
  const ids = new Map<string, number>()
  for (const file of files) {
    const { fileName, sha256, bytes } = file
    ids.set(uploadKeyOf(file), (await UploadRow.create({ systemId, fileName, size: bytes.length, sha256, bytes, uploadedBy: context.actor.id, createdAt: nowOf(context) })).id)
  }
  return ids
}

async function storeBlocks({ blocks }: Manifest, systemId: number, conditions: Ids, uploads: Ids, context: ServiceContext): Promise<void> {
  const stored = (definition: ManifestDefinition<BlockDefinition>) => storedDefinition<BlockDefinition>(definition, upload => idIn(uploads, uploadKeyOf(upload)))
  for (const [index, { name, role, unitIn, unitOut, notes, definition, byCondition }] of blocks.entries()) {
    const own = definition && stored(definition)
    const block = await BlockRow.create({ systemId, name, role, unitIn, unitOut, notes, definition: own, uploadId: uploadOf(own), position: index + 1, version: 1, createdAt: nowOf(context) })
    await storeGains(block, Object.fromEntries(Object.entries(byCondition).map(([code, gain]) => [idIn(conditions, code), stored(gain)])))
  }
}

/** All loops first: each may name any other. */
async function storeLoops({ loops }: Manifest, systemId: number, context: ServiceContext): Promise<Ids> {
  const ids = new Map<string, number>()
  const rows: LoopRow[] = []
  for (const [index, { code, name, axis, breakPoint, breakAt, otherLoops, notes }] of loops.entries()) {
    const row = await LoopRow.create({ systemId, code, name, axis, breakPoint, breakAt, otherLoops, loopStates: [], notes, position: index + 1, version: 1, createdAt: nowOf(context) })
    rows.push(row)
    ids.set(code, row.id)
  }
  for (const [index, { loopStates }] of loops.entries()) {
    if (loopStates.length > 0) await rows[index]?.update({ loopStates: loopStates.map(({ loop, ...state }) => ({ loopId: idIn(ids, loop), ...state })) })
  }
  return ids
}

async function storeSources({ sources }: ManifestLoop, path: string, loopId: number, conditions: Ids, uploads: Ids, context: ServiceContext): Promise<StoredManifest['sources']> {
  const stored = []
  const idOf = (upload: ManifestUploadName) => idIn(uploads, uploadKeyOf(upload))
  for (const [index, source] of sources.entries()) {
    const { name, ofRecord, setAsideReason } = source
    const conditionIds = source.conditions.map(code => idIn(conditions, code))
    const definition = storedDefinition<SourceDefinition>(source.definition, idOf)
    await SourceRow.bulkCreate(conditionIds.map(conditionId => ({
      loopId,
      conditionId,
      name,
      kind: definition.kind,
      definition,
      uploadId: definition.kind === 'measured' ? definition.uploadId : null,
      ofRecord,
      setAsideReason,
      version: 1,
      createdAt: nowOf(context),
    })))
    stored.push({ path: `${path}.sources[${index}]`, definition, conditionIds })
  }
  return stored
}
