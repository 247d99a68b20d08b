import { describe, expect, it } from 'vitest'
import { buildReportView } from '#server/reports/buildReportView'
import type { DrawnReport } from '#server/reports/figures/DrawnReport'
import { tablesOf } from '#server/reports/package/tablesOf'
import type { SectionView, TableView } from '#server/reports/view/ReportView'
import type { LoopAnalysis } from '#shared/types/analysis'
import type { BlockGain } from '#shared/types/block'
import type { ReportSnapshot, SnapshotCell } from '#shared/types/snapshot'
import { buildEdition } from '../../factories/buildEdition'
import { buildAnalysis, buildSnapshot } from '../../factories/buildSnapshot'

const noFigures: DrawnReport = { crossingChart: null, loops: [], figures: [], responses: [] }
const viewOf = (snapshot: ReportSnapshot) => buildReportView(snapshot, buildEdition(snapshot), noFigures)
const texts = (table: TableView | null | undefined) => (table?.rows ?? []).map(row => row.cells.map(cell => cell.text))
const sectionOf = (snapshot: ReportSnapshot, anchor: string): SectionView | undefined => viewOf(snapshot).sections.find(section => section.anchor === anchor)

/** The first cell changed; the others as they are. */
function withFirst(change: Partial<SnapshotCell>, more: Partial<ReportSnapshot> = {}): ReportSnapshot {
  const snapshot = buildSnapshot(more)
  return { ...snapshot, cells: snapshot.cells.map((cell, index) => (index === 0 ? { ...cell, ...change } : cell)) }
}
const withStructure = (change: Partial<LoopAnalysis['structure'] & object>) => buildAnalysis({ structure: { approximated: false, notes: [], ...change } })

describe('how loop gains are built, in the report', () => {
  it('has no section of blocks, poles or moved modes where a snapshot knows none', () => {
    expect(viewOf(buildSnapshot()).sections.map(({ number, anchor }) => [number, anchor])).toEqual([['5', 'conditions'], ['6', 'conventions'], ['7', 'cautions']])
  })

  it('prints each block once, its gains by condition, what stood in its file, and the loops built from it', () => {
    const plant: BlockGain = { kind: 'stateSpace', a: [[0, 1], [0, 0]], b: [[0], [1]], c: [[1, 0]], d: [[0]], inputs: [], outputs: [] }
    const file = { kind: 'stateSpace' as const, uploadId: 3, set: null, states: null, inputs: [], outputs: [] }
    const gain = (expression: string) => ({ kind: 'expression' as const, expression })
    const snapshot = withFirst({ input: { expression: 'C*G', blocks: { C: gain('2'), G: plant } } }, {
      blocks: [
        { name: 'C', role: 'controller', unitIn: 'rad', unitOut: 'N m', notes: '', definitions: { C1: gain('2'), C2: gain('3') } },
        { name: 'G', role: 'plant', unitIn: '', unitOut: '', notes: '', definitions: { C1: file } },
      ],
    })
    expect(texts(sectionOf(snapshot, 'blocks')?.blocks[0]?.table)).toEqual([
      ['C', 'controller', 'C1', '2', 'N\u00a0m per rad', 'SL-R'],
      ['', '', 'C2', '3', '', ''],
      ['G', 'plant', 'C1', '2 states', '', 'SL-R'],
      ['', '', 'C2', 'no gain in this condition', '', ''],
    ])
  })

  it('prints every mode of a modal table', () => {
    const modal = {
      kind: 'modal' as const, frequencyUnit: 'Hz' as const, derivative: 0 as const, inputs: [], outputs: [],
      rigid: [{ power: -2 as const, gainIn: [0.5], gainOut: [1] }], modes: [{ name: 'bending', frequency: 12.5, damping: 0.004, gainIn: [2], gainOut: [-1] }],
    }
    const snapshot = buildSnapshot({ blocks: [{ name: 'G', role: 'plant', unitIn: '', unitOut: '', notes: '', definitions: { C1: modal, C2: modal } }] })
    expect(texts(sectionOf(snapshot, 'blocks')?.blocks[1]?.table)).toEqual([['rigid, s^-2', '', '', '0.5', '1'], ['bending', '12.5', '0.004', '2', '-1']])
  })

  it('prints second-order sections exactly as coded, and the file that matrices came from', () => {
    const sections = { kind: 'sections' as const, gain: '1', sampleTime: 1e-3, rows: [['16089/16384', '-0.50', '0', '1.0', '-.1', '0']] }
    const file = { kind: 'stateSpace' as const, uploadId: 3, set: 'C1', states: null, inputs: [], outputs: [] }
    const snapshot = buildSnapshot({ blocks: [
      { name: 'N', role: 'filter', unitIn: '', unitOut: '', notes: '', definitions: { C1: sections, C2: sections } },
      { name: 'G', role: 'plant', unitIn: '', unitOut: '', notes: '', definitions: { C1: file }, files: { C1: { name: 'plant.csv', sha256: 'ab12' } } },
    ] })
    const [blocks, table] = sectionOf(snapshot, 'blocks')?.blocks ?? []
    expect(texts(table?.table)).toEqual([['1', '16089/16384', '-0.50', '0', '1.0', '-.1', '0']])
    expect(blocks?.table?.rows[1]?.cells[3]?.small).toBe('file plant.csv, SHA-256 ab12')
  })

  it('tells the sampling, the accuracy and hidden states of a loop with its condition, and a contradiction first', () => {
    const analysis = withStructure({
      sampleTime: 20e-6, accuracy: { relative: 3e-13, basis: 'built from state space' },
      notes: [{ block: 'G', code: 'unreachable', message: '2 states cannot be reached.' }],
    })
    const condition = viewOf(withFirst({ analysis, disagreement: 'SL-P says unstable.' })).chapters[0]?.conditions[0]
    expect(condition?.structure).toEqual(['SL-P says unstable.', 'Sampled every 20.0 us.', 'Built from state space: relative error on the axis below 3e-13.', 'G: 2 states cannot be reached.'])
    expect(condition?.structureTone).toBe('bad')
  })

  it('lists the closed-loop poles of the condition that stands worst, and says of which loops there can be no list', () => {
    const poles = [{ re: -2, im: 0, frequency: 2, damping: 1, timeConstant: 0.5, mode: null }, { re: 1, im: 3, frequency: 3.162, damping: -0.316, timeConstant: -1, mode: 'bending (G)' }]
    const snapshot = buildSnapshot()
    const cells = snapshot.cells.map((cell): SnapshotCell => ({
      ...cell, closedLoopPoles: cell.loopCode === 'SL-R' ? { frequencyUnit: 'rad/s', poles, reason: null } : { frequencyUnit: 'rad/s', poles: [], reason: 'dead time gives endlessly many.' },
    }))
    const section = sectionOf({ ...snapshot, cells }, 'closed-loop-poles')
    expect(section?.blocks.map(block => texts(block.table))).toEqual([[], [['2.000', '1', '500 ms', 'not told'], ['3.162', 'minus 0.316', 'grows by e in 1.00 s', 'bending (G)']]])
    expect(section?.blocks[0]?.paragraphs[1]).toBe('No list for SL-P: dead time gives endlessly many.')
    expect(tablesOf({ ...snapshot, cells }).find(({ name }) => name === 'tables/closed-loop-poles.csv')?.data.toString().split('\r\n')[2]).toBe('SL-R,C1,3.162,-0.316,-1,1,3,,,bending (G)')
  })

  it('prints each mode moved in a row, what moves no printed margin as it is, and no margin of a loop that becomes unstable', () => {
    const there = { verdict: 'stable' as const, summary: buildAnalysis().summary, vectorMargin: { distance: 0.846, frequency: 158 }, failure: null }
    const snapshot = withFirst({
      modeShifts: {
        frequencyUnit: 'rad/s', nominal: there, reason: null, notes: ['One mode of small gain is left out.'],
        modes: [{
          block: 'G', mode: 'bending', frequency: 100, damping: 0.01,
          shifts: [{ change: -0.2, ...there }, { change: -0.1, ...there, vectorMargin: { distance: 0.4, frequency: 158 } }, { change: 0.1, verdict: 'unstable', summary: null, vectorMargin: { distance: 0.1, frequency: 110 }, failure: null }],
        }],
      },
    })
    const table = sectionOf(snapshot, 'closed-loop-poles')?.blocks[2]?.table
    expect(table?.columns.map(({ head }) => head)).toEqual(['mode', 'frequency', 'as it is', '\u221220 %', '\u221210 %', '+10 %'])
    expect(texts(table)).toEqual([
      ['none moved', '', '0.846', '', '', ''],
      ['bending', '100.0', '', 'as it is', 'under, 0.400', 'unstable'],
    ])
    expect(table?.rows[1]?.cells.map(({ small }) => small)).toEqual(['of G, damping 0.0100', '', '', '', 'rise 16.3 dB\nlag 95.1 deg', '0.100'])
    expect(table?.notes).toEqual(['One mode of small gain is left out.'])
  })

  it('prints the sources set aside with the reason, and how far each lies from the one of record', () => {
    const difference = {
      frequencyUnit: 'rad/s' as const, reference: 'design model', other: 'sweep 1', basis: 'Compared at the points measured.', reason: null,
      bands: [{ from: 1, to: 10, gain: { difference: -1.5, frequency: 2 }, phase: { difference: 7, frequency: 3 }, relative: { ratio: 0.61, frequency: 4 } }],
    }
    const snapshot = withFirst({ otherSources: [{ name: 'sweep 1', kind: 'measured', setAsideReason: 'valve was cold', input: null, analysis: buildAnalysis(), failure: null, difference }] })
    const chapter = viewOf(snapshot).chapters[0]
    expect(texts(chapter?.sources).find(row => row[1] === 'sweep 1')).toEqual(['C1', 'sweep 1', 'measured response', 'set aside: valve was cold'])
    expect(texts(chapter?.conditions[0]?.differences)).toEqual([['sweep 1', '1.000 to 10.00', '1.5 dB lower', 'lead 7.00 deg', '0.610']])
    expect(tablesOf(snapshot).find(({ name }) => name === 'tables/source-differences.csv')?.data.toString()).toContain('SL-R,C1,sweep 1,valve was cold,1,10,-1.5,2,7,3,0.61,4')
  })
})
