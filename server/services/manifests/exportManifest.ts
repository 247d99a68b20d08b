import { manifestDefinition } from '#shared/manifest/manifestDefinition'
import { writeManifest } from '#shared/manifest/writeManifest'
import type { Block, BlockDefinition } from '#shared/types/block'
import { manifestFormat, manifestVersion, type ManifestBlock, type ManifestLoop, type ManifestLoopState, type ManifestParameter, type ManifestSource, type ManifestUpload, type ManifestUploadName } from '#shared/types/manifest'
import type { Loop, OperatingCondition, Parameter } from '#shared/types/system'
import { writeTransaction } from '../../database/database'
import { SourceRow } from '../../database/models/SourceRow'
import { UploadRow } from '../../database/models/UploadRow'
import { listBlocks } from '../blocks/listBlocks'
import { listConditions } from '../conditions/listConditions'
import { listCriteria } from '../criteria/listCriteria'
import { listLoops } from '../loops/listLoops'
import { listParameters } from '../parameters/listParameters'
import { findSystem } from '../systems/findSystem'

/**
 * The whole system as the text of a manifest; what is deleted, and what only points at something deleted, is left out.
 * Equal systems give equal bytes: importing the text as a new system and exporting that gives it again.
 */
export function exportManifest(systemId: number): Promise<{ name: string, text: string }> {
  // Nothing is written: in the queue of the writers all parts are read of one state.
  return writeTransaction(async () => {
    const { name, customer, documentNumber, frequencyUnit, description } = await findSystem(systemId)
    const conditions = await listConditions(systemId)
    const loops = await listLoops(systemId)
    const uploads = new UploadsNamed(await UploadRow.findAll({ where: { systemId }, attributes: ['id', 'fileName', 'sha256'] }))
    const manifestBlocks = (await listBlocks(systemId)).map(block => manifestBlock(block, conditions, uploads))
    const sources = await SourceRow.findAll({ where: { loopId: loops.map(loop => loop.id), conditionId: conditions.map(condition => condition.id) }, order: ['id'] })
    const blockNames = new Set(manifestBlocks.map(block => block.name))
    const manifestLoops = loops.map(loop => manifestLoop(loop, loops, blockNames, sources.filter(source => source.loopId === loop.id), conditions, uploads))
    return {
      name,
      text: writeManifest({
        format: manifestFormat,
        version: manifestVersion,
        system: { name, customer, documentNumber, frequencyUnit, description },
        conditions: conditions.map(({ code, name, coordinates, tags, notes }) => ({ code, name, coordinates: coordinates.map(({ name, unit, value }) => ({ name, unit, value })), tags, notes })),
        parameters: (await listParameters(systemId)).map(parameter => manifestParameter(parameter, conditions)),
        blocks: manifestBlocks,
        loops: manifestLoops,
        criteria: (await listCriteria(systemId)).map(({ quantity, limit }) => ({ quantity, limit })),
        uploads: await uploads.used(),
      }),
    }
  })
}

/** A record by condition as one by code, in the order of the conditions. */
const byCode = <Value>(record: Record<number, Value>, conditions: OperatingCondition[]): Record<string, Value> =>
  Object.fromEntries(conditions.flatMap(({ id, code }) => record[id] === undefined ? [] : [[code, record[id]]]))

const manifestParameter = ({ name, unit, notes, values }: Parameter, conditions: OperatingCondition[]): ManifestParameter => ({ name, unit, notes, values: byCode(values, conditions) })

function manifestBlock({ name, role, unitIn, unitOut, notes, definition, byCondition }: Block, conditions: OperatingCondition[], uploads: UploadsNamed): ManifestBlock {
  const named = (definition: BlockDefinition) => manifestDefinition(definition, id => uploads.nameOf(id))
  return {
    name, role, unitIn, unitOut, notes,
    definition: definition && named(definition),
    byCondition: Object.fromEntries(Object.entries(byCode(byCondition, conditions)).map(([code, definition]) => [code, named(definition)])),
  }
}

function manifestLoop(loop: Loop, loops: Loop[], blockNames: ReadonlySet<string>, sources: SourceRow[], conditions: OperatingCondition[], uploads: UploadsNamed): ManifestLoop {
  const { code, name, axis, breakPoint, breakAt, otherLoops, notes } = loop
  const loopStates = loop.loopStates.flatMap(({ loopId, state, gain }): ManifestLoopState[] => {
    const other = loops.find(({ id }) => id === loopId)
    return other === undefined ? [] : [{ loop: other.code, state, ...(state === 'held' && { gain }) }]
  })
  return { code, name, axis, breakPoint, breakAt: breakAt && blockNames.has(breakAt.block) ? { block: breakAt.block, side: breakAt.side } : null, otherLoops, loopStates, notes, sources: groupSources(sources, conditions, uploads) }
}

/** Sources that are the same in several conditions as one; two alike in one condition stay two. */
function groupSources(sources: SourceRow[], conditions: OperatingCondition[], uploads: UploadsNamed): ManifestSource[] {
  const groups = new Map<string, { source: ManifestSource, conditionIds: Set<number> }[]>()
  const ordered: { source: ManifestSource, conditionIds: Set<number> }[] = []
  for (const { conditionId, name, ofRecord, setAsideReason, definition } of sources) {
    const source = { name, conditions: [], ofRecord, setAsideReason, definition: manifestDefinition(definition, id => uploads.nameOf(id)) }
    const key = JSON.stringify(source)
    const alike = groups.get(key) ?? []
    groups.set(key, alike)
    const group = alike.find(({ conditionIds }) => !conditionIds.has(conditionId))
    if (group !== undefined) {
      group.conditionIds.add(conditionId)
      continue
    }
    const started = { source, conditionIds: new Set([conditionId]) }
    alike.push(started)
    ordered.push(started)
  }
  return ordered.map(({ source, conditionIds }) => ({ ...source, conditions: conditions.filter(({ id }) => conditionIds.has(id)).map(({ code }) => code) }))
}

/** The uploads of a system by the names definitions use; those named are told in the order they were first named. */
class UploadsNamed {
  readonly #names: ReadonlyMap<number, ManifestUploadName>
  readonly #used = new Map<string, number>()

  constructor(uploads: UploadRow[]) {
    this.#names = new Map(uploads.map(({ id, fileName, sha256 }) => [id, { fileName, sha256 }]))
  }

  nameOf(uploadId: number): ManifestUploadName {
    const name = this.#names.get(uploadId)
    if (name === undefined) throw new Error(`Upload ${uploadId} is not of the system whose definition reads it.`)
    const key = JSON.stringify(name)
    // two uploads of one file under one name are the same to every reader
    if (!this.#used.has(key)) this.#used.set(key, uploadId)
    return name
  }

  async used(): Promise<ManifestUpload[]> {
    const uploads: ManifestUpload[] = []
    for (const id of this.#used.values()) uploads.push(manifestUpload(await UploadRow.unscoped().findByPk(id, { rejectOnEmpty: true })))
    return uploads
  }
}

function manifestUpload({ fileName, sha256, bytes }: UploadRow): ManifestUpload {
  const text = bytes.toString('utf8')
  return Buffer.from(text, 'utf8').equals(bytes) ? { fileName, sha256, text } : { fileName, sha256, base64: bytes.toString('base64') }
}
