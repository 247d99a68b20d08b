import { ENGINE_VERSION } from '#shared/analysis/engineVersion'
import { breakPointDisagreements, cellKey } from '#shared/workflow/breakPointDisagreements'
import type { Block, BlockDefinition } from '#shared/types/block'
import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import type { ReportSnapshot, SnapshotBlock, SnapshotCell, SnapshotLoop } from '#shared/types/snapshot'
import type { AnalysedSource, SourceDefinition } from '#shared/types/source'
import type { SourceDifference } from '#shared/types/structure'
import type { Criterion } from '#shared/types/criterion'
import type { Loop, OperatingCondition, Parameter } from '#shared/types/system'
import type { ReportRow } from '../database/models/ReportRow'
import { RevisionRow } from '../database/models/RevisionRow'
import { SourceRow } from '../database/models/SourceRow'
import { UploadRow } from '../database/models/UploadRow'
import { findModeShifts } from '../services/analyses/findModeShifts'
import { findClosedLoopPoles } from '../services/analyses/findClosedLoopPoles'
import { findDifferences } from '../services/analyses/findDifferences'
import { listBlocks } from '../services/blocks/listBlocks'
import { readBrandForPrint } from '../services/brand/readBrandForPrint'
import type { ServiceContext } from '../services/context'
import { nowOf } from '../services/context'
import { listLoops } from '../services/loops/listLoops'
import { listParameters } from '../services/parameters/listParameters'
import { analyseSources } from '../services/sources/analyseSources'
import { readSystem } from '../services/systems/readSystem'
import { compareStanding } from './view/compareStanding'

/** Rows in the order of the ids given; ids of rows that are gone are left out. */
function inOrder<Row extends { id: number }>(rows: readonly Row[], ids: readonly number[]): Row[] {
  return ids.flatMap(id => rows.filter(row => row.id === id))
}

async function fileOf(definition: SourceDefinition | BlockDefinition): Promise<{ name: string, sha256: string } | null> {
  if (!('uploadId' in definition)) return null
  const upload = await UploadRow.findByPk(definition.uploadId, { attributes: ['fileName', 'sha256'] })
  return upload === null ? null : { name: upload.fileName, sha256: upload.sha256 }
}

interface CoveredCell {
  loop: Loop
  condition: OperatingCondition
  ofRecord: AnalysedSource | undefined
  others: AnalysedSource[]
}

async function cellOf({ loop, condition, ofRecord: entry, others }: CoveredCell, differences: ReadonlyMap<number, SourceDifference>, disagreement: string | null, criteria: Criterion[]): Promise<SnapshotCell> {
  const analysis = entry?.analysis ?? null
  return {
    loopCode: loop.code,
    conditionCode: condition.code,
    source: entry ? { name: entry.source.name, kind: entry.source.kind, definition: entry.source.definition, file: await fileOf(entry.source.definition) } : null,
    input: entry?.input ?? null,
    analysis,
    failure: entry?.failure ?? null,
    judgement: judgeAnalysis(analysis, criteria),
    closedLoopPoles: null,
    modeShifts: null,
    otherSources: others.map(({ source, ...other }) => ({
      name: source.name, kind: source.kind, setAsideReason: source.setAsideReason, ...other, difference: differences.get(source.id) ?? null,
    })),
    disagreement,
  }
}

function blocksOf(blocks: readonly Block[], conditions: readonly OperatingCondition[]): Promise<SnapshotBlock[]> {
  return Promise.all(blocks.map(async ({ name, role, unitIn, unitOut, notes, definition, byCondition }) => {
    const inEffect = conditions.flatMap(({ id, code }): [string, BlockDefinition][] => {
      const there = byCondition[id] ?? definition
      return there === null ? [] : [[code, there]]
    })
    const files = await Promise.all(inEffect.map(async ([code, there]) => [code, await fileOf(there)] as const))
    return {
      name,
      role,
      unitIn,
      unitOut,
      notes,
      definitions: Object.fromEntries(inEffect),
      files: Object.fromEntries(files.flatMap(([code, file]) => (file === null ? [] : [[code, file]]))),
    }
  }))
}

function parametersOf(parameters: readonly Parameter[], conditions: readonly OperatingCondition[]): ReportSnapshot['parameters'] {
  return parameters.map(({ name, unit, notes, values }) => ({
    name,
    unit,
    notes,
    values: Object.fromEntries(conditions.flatMap(({ id, code }) => (values[id] === undefined ? [] : [[code, values[id]]]))),
  }))
}

function snapshotLoop({ id, code, name, axis, breakPoint, otherLoops, breakAt, loopStates, notes }: Loop, codes: ReadonlyMap<number, string>, report: ReportRow): SnapshotLoop {
  const states = loopStates.flatMap(({ loopId, ...state }) => codes.has(loopId) ? [{ code: codes.get(loopId) ?? '', ...state }] : [])
  return { code, name, axis, breakPoint, otherLoops, notes, remarks: report.loopRemarks[id] ?? '', breakAt, loopStates: states }
}

async function historyOf(reportId: number): Promise<ReportSnapshot['history']> {
  const rows = await RevisionRow.findAll({ where: { reportId }, order: [['id', 'ASC']] })
  return rows.flatMap(({ letter, changeNote, frozenByName, issuedByName, issuedAt }) => (
    issuedByName === null || issuedAt === null ? [] : [{ letter, changeNote, frozenBy: frozenByName, issuedBy: issuedByName, issuedAt }]
  ))
}

export interface DraftFacts {
  letter: string
  draftNumber: number
  changeNote: string
}

/** The loops and conditions a report covers, in the order it prints them. */
export async function coverageOf(report: ReportRow): Promise<{ loops: Loop[], conditions: OperatingCondition[] }> {
  const { loops, conditions } = await readSystem(report.systemId)
  return { loops: inOrder(loops, report.loopIds), conditions: inOrder(conditions, report.conditionIds) }
}

/** Cells that can be asked more than their analysis. */
const askable = (cells: readonly SnapshotCell[]) => cells.flatMap(cell => (cell.analysis === null || cell.input === null ? [] : [{ cell, input: cell.input }]))

async function addClosedLoopPoles(cells: readonly SnapshotCell[], context: ServiceContext): Promise<void> {
  const asked = askable(cells)
  const poles = await findClosedLoopPoles(asked.map(({ input }) => input), context)
  asked.forEach(({ cell }, index) => {
    cell.closedLoopPoles = poles[index] ?? null
  })
}

/** Flexible modes are moved where each loop stands worst, which is where a report prints them; it takes many analyses a loop. */
async function addModeShifts(cells: SnapshotCell[], blocks: readonly Block[], isPreview: boolean, context: ServiceContext): Promise<void> {
  const loopCodes = [...new Set(cells.map(({ loopCode }) => loopCode))]
  const governing = loopCodes.flatMap(code => cells.filter(({ loopCode, analysis }) => loopCode === code && analysis !== null).sort(compareStanding).slice(0, 1))
  const asked = askable(governing)
  const roles = Object.fromEntries(blocks.map(({ name, role }) => [name, role]))
  const shifts = await findModeShifts(asked.map(({ input }) => input), roles, context, { known: isPreview })
  asked.forEach(({ cell }, index) => {
    cell.modeShifts = shifts[index] ?? null
  })
}

/**
 * Everything a report says at this moment, as plain data: inputs, results, criteria, brand. Analyses that are not known yet are
 * computed, so this is never called inside a write transaction. A preview does not wait for flexible modes to be moved.
 */
export async function collectSnapshot(report: ReportRow, draft: DraftFacts, context: ServiceContext, { isPreview = false } = {}): Promise<ReportSnapshot> {
  const [{ system, criteria }, { loops, conditions }, parameters, blocks, brand, history] = await Promise.all([
    readSystem(report.systemId), coverageOf(report), listParameters(report.systemId), listBlocks(report.systemId), readBrandForPrint(), historyOf(report.id),
  ])
  const codes = new Map((await listLoops(report.systemId)).map(({ id, code }) => [id, code]))
  const sources = await SourceRow.findAll({ where: { loopId: loops.map(({ id }) => id), conditionId: conditions.map(({ id }) => id) }, order: ['id'] })
  const analysed = await analyseSources(sources, system, context)
  const covered = loops.flatMap(loop => conditions.map((condition): CoveredCell => {
    const ofCell = analysed.filter(({ source }) => source.loopId === loop.id && source.conditionId === condition.id)
    return { loop, condition, ofRecord: ofCell.find(({ source }) => source.ofRecord), others: ofCell.filter(({ source }) => !source.ofRecord) }
  }))
  const pairs = covered.flatMap(({ ofRecord, others }) => (ofRecord ? others.map(other => ({ reference: ofRecord, other })) : []))
  const found = await findDifferences(pairs, system.frequencyUnit, context)
  const differences = new Map(pairs.map(({ other }, index) => [other.source.id, found[index]!]))
  const disagreements = breakPointDisagreements({ loops, cells: covered.map(({ loop, condition, ofRecord }) => ({ loopId: loop.id, conditionId: condition.id, analysis: ofRecord?.analysis ?? null })) })
  const cells = await Promise.all(covered.map(cell => (
    cellOf(cell, differences, disagreements.get(cellKey(cell.loop.id, cell.condition.id)) ?? null, criteria)
  )))
  await addClosedLoopPoles(cells, context)
  await addModeShifts(cells, blocks, isPreview, context)
  return {
    format: 'wideberth report snapshot',
    formatVersion: 1,
    engineVersion: ENGINE_VERSION,
    frozenAt: nowOf(context),
    frozenBy: context.actor.name,
    ...draft,
    brand,
    system: { name: system.name, customer: system.customer, documentNumber: system.documentNumber, frequencyUnit: system.frequencyUnit, description: system.description },
    report: { title: report.title, documentNumber: report.documentNumber, remarks: report.remarks },
    criteria,
    conditions: conditions.map(({ code, name, coordinates, tags, notes }) => ({ code, name, coordinates, tags, notes })),
    loops: loops.map(loop => snapshotLoop(loop, codes, report)),
    parameters: parametersOf(parameters, conditions),
    blocks: await blocksOf(blocks, conditions),
    cells,
    history,
  }
}
