import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { collectSnapshot } from '#server/reports/collectSnapshot'
import { parseSnapshot, writeSnapshot } from '#server/reports/snapshotText'
import { closeAnalysisPool } from '#server/adapters/analysisPool/analysisPool'
import { AnalysisRow } from '#server/database/models/AnalysisRow'
import type { ServiceContext } from '#server/services/context'
import { createReport } from '#server/services/reports/createReport'
import { findReport } from '#server/services/reports/findReport'
import { createSources } from '#server/services/sources/createSources'
import { canonicalJson } from '#server/reports/canonicalJson'
import type { ReportSnapshot } from '#shared/types/snapshot'
import { buildBlock, typed } from '../../factories/buildBlock'
import { buildPerson } from '../../factories/buildPerson'
import { buildCondition, buildLoop, buildSystem } from '../../factories/buildSystem'
import { contextOf } from '../../factories/contextOf'
import { openTestDatabase } from '../../factories/openTestDatabase'

let context: ServiceContext
let close: () => Promise<void>
let snapshot: ReportSnapshot
let reportId: number
const draft = { letter: 'A', draftNumber: 1, changeNote: 'First issue' }

beforeAll(async () => {
  close = (await openTestDatabase()).close
  context = contextOf(await buildPerson())
  const system = await buildSystem(context)
  const c1 = await buildCondition(system.id, context, { code: 'C1' })
  const c2 = await buildCondition(system.id, context, { code: 'C2' })
  const loop = await buildLoop(system.id, context, { code: 'AZ' })
  await buildBlock(system.id, context, 'C', typed('2*(s+1)/(0.01*s+1)^2'), { role: 'controller', byCondition: { [c2.id]: typed('(s+1)/(0.01*s+1)^2') } })
  await buildBlock(system.id, context, 'G', {
    kind: 'modal', frequencyUnit: 'rad/s', derivative: 0, inputs: [], outputs: [], rigid: [{ power: -2, gainIn: [1], gainOut: [1] }],
    modes: [{ name: 'bending', frequency: 300, damping: 0.05, gainIn: [0.1], gainOut: [1] }],
  }, { role: 'plant' })
  const source = { conditionIds: [c1.id, c2.id], ofRecord: true, setAsideReason: '' }
  await createSources(loop.id, { ...source, name: 'design model', definition: { kind: 'expression', expression: 'C*G' } }, context)
  await createSources(loop.id, { ...source, conditionIds: [c1.id], name: 'rigid model', definition: { kind: 'expression', expression: 'C/s^2' }, ofRecord: false, setAsideReason: 'without the mode' }, context)
  const report = await createReport(system.id, { title: 'Margins', documentNumber: 'D-1' }, context)
  reportId = report.id
  snapshot = await collectSnapshot(await findReport(reportId), draft, context)
})
afterAll(async () => {
  await closeAnalysisPool()
  await close()
})

describe('a snapshot of loops built from blocks', () => {
  it('holds every block with its gain in each condition, and loop gains with no others than they name', () => {
    expect(snapshot.blocks?.map(({ name, role, definitions }) => [name, role, Object.keys(definitions)])).toEqual([['C', 'controller', ['C1', 'C2']], ['G', 'plant', ['C1', 'C2']]])
    expect(snapshot.blocks?.[0]?.definitions.C2).toEqual({ kind: 'expression', expression: '(s+1)/(0.01*s+1)^2' })
    const inputs = snapshot.cells.map(({ input }) => (input && 'expression' in input ? Object.keys(input.blocks ?? {}) : null))
    expect(inputs).toEqual([['C', 'G'], ['C', 'G']])
  })

  it('holds the closed-loop poles with the modes they go back to, and each flexible mode moved', () => {
    const [cell] = snapshot.cells
    // two of the controller, two rigid, two of the mode: six poles, of which pairs are told once
    expect(cell?.closedLoopPoles?.poles.reduce((sum, { im }) => sum + (im === 0 ? 1 : 2), 0)).toBe(6)
    expect(cell?.closedLoopPoles?.poles.map(({ mode }) => mode ?? '').join()).toContain('bending of G')
    // moved once a loop, where it stands worst
    const moved = snapshot.cells.flatMap(({ modeShifts }) => modeShifts ?? [])
    expect(moved.length).toBe(1)
    expect(moved[0]?.modes.map(({ block, mode, shifts }) => [block, mode, shifts.map(({ change }) => change)])).toEqual([['G', expect.stringContaining('bending'), [-0.2, -0.1, 0.1, 0.2]]])
  })

  it('holds the sources set aside with the reason and their difference from the one of record, in the conditions that have them', () => {
    expect(snapshot.cells.map(({ otherSources }) => otherSources?.map(({ name, setAsideReason, difference }) => [name, setAsideReason, difference?.reason]))).toEqual([[['rigid model', 'without the mode', null]], []])
    expect(snapshot.cells[0]?.otherSources?.[0]?.difference?.bands.length).toBeGreaterThan(0)
  })

  it('waits for no moved mode in a preview: what is not known yet says when it comes', async () => {
    const preview = async () => (await collectSnapshot(await findReport(reportId), draft, context, { isPreview: true })).cells.flatMap(({ modeShifts }) => modeShifts ?? [])
    expect((await preview()).map(({ reason }) => reason)).toEqual([null])
    await AnalysisRow.destroy({ where: {} })
    expect((await preview()).map(({ reason, modes }) => [reason, modes])).toEqual([['Modes are moved when the report is frozen.', []]])
  })

  it('is the same after its text was written and read', () => {
    expect(parseSnapshot(writeSnapshot(snapshot))).toEqual(JSON.parse(canonicalJson(snapshot)))
  })
})
