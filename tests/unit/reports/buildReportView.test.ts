import { describe, expect, it } from 'vitest'
import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import { buildReportView } from '#server/reports/buildReportView'
import type { DrawnReport } from '#server/reports/figures/DrawnReport'
import type { TableView } from '#server/reports/view/ReportView'
import { buildEdition } from '../../factories/buildEdition'
import { buildAnalysis, buildCell, buildSnapshot } from '../../factories/buildSnapshot'

const noFigures: DrawnReport = { crossingChart: null, loops: [], figures: [], responses: [] }
const unstable = buildAnalysis({ summary: null, stability: { verdict: 'unstable', basis: 'counted', openLoopUnstablePoles: 0, encirclements: -2, closedLoopUnstablePoles: 2 } })
const viewOf = (snapshot = buildSnapshot(), change = {}) => buildReportView(snapshot, buildEdition(snapshot, change), noFigures)
const texts = (table: TableView | null) => (table?.rows ?? []).map(row => row.cells.map(cell => cell.text))

describe('the view of a report', () => {
  it('refuses a snapshot that says nothing of a pair it covers', () => {
    const snapshot = buildSnapshot({ cells: buildSnapshot().cells.slice(1) })
    expect(() => viewOf(snapshot)).toThrow('loop SL-R in condition C1')
  })

  it('says \u2018no data\u2019 of a loop without a source, and why', () => {
    const snapshot = buildSnapshot({ cells: buildSnapshot().cells.map(cell => (cell.loopCode === 'SL-P' && cell.conditionCode === 'C2' ? buildCell('SL-P', 'C2', null) : cell)) })
    const view = viewOf(snapshot)
    expect(view.chapters[1]?.conditions[1]).toMatchObject({ verdict: 'no data', closedLoop: 'There is no source of record for this loop in this condition.' })
    expect(view.summary.finding).toBe('Of 4 loop-condition pairs, 1 pair is without data or not shown.')
  })

  it('puts an unstable pair first, gives it distances in place of margins, and leaves it out of the smallest margins', () => {
    const snapshot = buildSnapshot({ cells: [...buildSnapshot().cells.slice(0, 3), buildCell('SL-P', 'C2', unstable)] })
    const view = viewOf(snapshot)
    expect(view.summary.finding).toBe('Of 4 loop-condition pairs, 1 pair is unstable.')
    expect(texts(view.summary.attention)[0]).toEqual(['SL-P Slew position', 'C2 Extended', 'unstable', 'closed loop unstable; comes to 0.846 of \u22121 at 158.2 rad/s'])
    expect(view.summary.worst.notes).toEqual(['1 pair whose closed loop is not shown to be stable has no margins and is not in this table.'])
    const condition = view.chapters[1]?.conditions[1]
    expect(condition?.closedLoop).toBe('Closed loop unstable (counted): no open-loop poles beyond the stability boundary and 2 clockwise encirclements of the critical point, so 2 closed-loop poles beyond it.')
    expect(condition?.crossings?.columns.map(column => column.head)).toEqual(['frequency', 'what', 'slope', 'distance'])
    expect(texts(view.chapters[1]?.margins ?? null)[1]?.slice(1, 7)).toEqual(['', '', '', '', '', ''])
  })

  it('lists crossings and approaches together in order of frequency, signs as words', () => {
    const view = viewOf()
    expect(texts(view.chapters[0]?.conditions[0]?.crossings ?? null)).toEqual([
      ['23.25', 'gain crossover', 'gain falling', 'lag 95.1 deg', '71.4', '1.476', ''],
      ['158.2', 'closest approach', '', '', '', '0.846', 'gain rises 16.0 dB, lag 3.20 deg'],
      ['163.9', 'phase crossover', 'phase falling', 'gain may rise 16.3 dB', '', '0.847', ''],
    ])
  })

  it('tells many dips within the noise in one line that names each place, and keeps the vector margin and the others as rows', () => {
    const dip = (frequency: number, distance: number, withinNoise: boolean) => ({ frequency, distance, gainChange: 1, phaseChange: -1, ...(withinNoise && { withinNoise }) })
    const analysis = buildAnalysis({
      closestApproaches: [dip(30, 0.7, false), dip(40, 0.6, true), dip(50, 0.95, true), dip(60, 0.97, true), dip(70, 0.98, true), dip(80, 0.99, true)],
      vectorMargin: { distance: 0.6, frequency: 40 },
    })
    const crossings = viewOf(buildSnapshot({ cells: [buildCell('SL-R', 'C1', analysis), ...buildSnapshot().cells.slice(1)] })).chapters[0]?.conditions[0]?.crossings ?? null
    expect(texts(crossings).filter(row => row[1] === 'closest approach').map(row => row[0])).toEqual(['30.00', '40.00'])
    expect(crossings?.notes).toEqual(['4 more closest approaches are no deeper than the noise of the samples, none nearer than 0.950: at 50.00, 60.00, 70.00, 80.00 rad/s; their values are in the package.'])
  })

  it('puts a phase crossover at the end of the axis last, and one at zero first', () => {
    const analysis = buildAnalysis({ phaseCrossovers: [{ frequency: 0, gainMargin: -6.02, slope: 'falling' }, { frequency: 'infinity', gainMargin: 20, slope: 'rising' }] })
    const snapshot = buildSnapshot({ cells: [buildCell('SL-R', 'C1', analysis), ...buildSnapshot().cells.slice(1)] })
    const rows = texts(viewOf(snapshot).chapters[0]?.conditions[0]?.crossings ?? null)
    expect([rows[0]?.[0], rows[0]?.[3], rows.at(-1)?.[0]]).toEqual(['0', 'gain may fall 6.0 dB', 'infinity'])
  })

  it('says of a model that is not proven that it is not, and where, in the chapter and in the matrix', () => {
    const analysis = buildAnalysis({ coverage: { proven: false, from: 0, to: 'infinity', exceptions: [{ from: 90, to: 91.2, reason: 'the search ended at its limit of effort' }] } })
    const snapshot = buildSnapshot({ cells: [buildCell('SL-R', 'C1', analysis), ...buildSnapshot().cells.slice(1)] })
    const view = viewOf(snapshot)
    expect(view.chapters[0]?.conditions[0]?.coverage[0]).toMatch(/^Not proven/)
    expect(texts(view.chapters[0]?.conditions[0]?.gaps ?? null)).toEqual([['90.00', '91.20', 'the search ended at its limit of effort']])
    expect(view.matrix.tables[0]?.rows[0]?.cells[1]?.small).toContain('not proven')
  })

  it('says of measured data which gaps cannot be trusted, and never that they are proven', () => {
    const analysis = buildAnalysis({ coverage: { proven: false, from: 1, to: 200, exceptions: [{ from: 90, to: 91.2, reason: 'the phase turns too far between two samples' }] } })
    const measured = buildCell('SL-R', 'C1', analysis, {
      source: {
        name: 'sweep 1', kind: 'measured', file: { name: 'sweep.csv', sha256: 'f'.repeat(64) },
        definition: { kind: 'measured', uploadId: 1, mapping: { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' } },
      },
    })
    const view = viewOf(buildSnapshot({ cells: [measured, ...buildSnapshot().cells.slice(1)] }))
    expect(view.chapters[0]?.conditions[0]?.coverage[0]).toBe('Measured from 1.000 to 200.0 rad/s: one gap between samples cannot be trusted and is listed below. A crossing there may have been missed.')
    expect(view.chapters[0]?.sources.rows[0]?.cells[3]?.text).toContain('amplitude not stated')
  })

  it('names the smallest of each margin with loop, condition and frequency', () => {
    const weak = buildAnalysis({ phaseCrossovers: [{ frequency: 120.5, gainMargin: 4.2, slope: 'falling', distance: 0.4 }] })
    const snapshot = buildSnapshot({ cells: [...buildSnapshot().cells.slice(0, 2), buildCell('SL-P', 'C1', weak), buildSnapshot().cells[3]!] })
    expect(texts(viewOf(snapshot).summary.worst)[0]).toEqual(['gain may rise', '4.2 dB', 'at least 6 dB', 'SL-P Slew position', 'C1 Retracted', '120.5', 'not met'])
  })

  it('prints both signatures of an issued edition, and no stamp', () => {
    const view = viewOf(buildSnapshot(), { edition: 'issued', label: 'B', approvedBy: 'Ines Duval', issuedAt: '2026-03-09T08:00:00.000Z' })
    expect(view.stamp).toBeNull()
    expect(view.documentTitle).toBe('WB-0042 revision B: Stability margins of all axes')
    const field = (name: string) => view.cover.titleBlock.find(entry => entry.name === name)?.value
    expect([field('Prepared by'), field('Approved by'), field('Date of issue')]).toEqual(['Mara Okafor, 2026-03-02 10:20 UTC', 'Ines Duval, 2026-03-09 08:00 UTC', '2026-03-09'])
    expect(texts(view.cover.history)).toEqual([['A', '2026-01-12', 'First issue', 'Mara Okafor', 'Ines Duval'], ['B', '2026-03-09', 'Position gain lowered', 'Mara Okafor', 'Ines Duval']])
  })

  it('does not say that criteria are met where none are agreed', () => {
    const criteria = buildSnapshot().criteria.map(criterion => ({ ...criterion, limit: null }))
    const cells = buildSnapshot().cells.map(cell => ({ ...cell, judgement: judgeAnalysis(cell.analysis, criteria) }))
    const { finding, findingTone } = viewOf(buildSnapshot({ criteria, cells })).summary
    expect([finding, findingTone]).toEqual(['No limits are agreed, so none of the 4 loop-condition pairs is judged; every closed loop is stable.', 'plain'])
  })

  it('leaves a parameter without a value blank, whatever the condition is called', () => {
    const { conditions, cells } = buildSnapshot()
    const snapshot = buildSnapshot({
      conditions: [conditions[0]!, { ...conditions[1]!, code: 'constructor' }],
      cells: cells.map(cell => (cell.conditionCode === 'C2' ? { ...cell, conditionCode: 'constructor' } : cell)),
      parameters: [{ name: 'wz', unit: 'rad/s', notes: '', values: { C1: 2 } }],
    })
    const table = viewOf(snapshot).sections[0]?.blocks.at(-1)?.table ?? null
    expect(texts(table)).toEqual([['wz', 'rad/s', '2', '', '']])
  })

  it('says that s, zeros and poles are in rad/s, for the frequencies of the report may be in Hz', () => {
    const words = viewOf().sections[1]?.blocks[0]?.items.find(({ term }) => term === 'Frequencies')?.words
    expect(words).toContain('s, zeros and poles are in rad/s')
  })

  it('counts one loop as one', () => {
    const { loops, cells } = buildSnapshot()
    const snapshot = buildSnapshot({ loops: loops.slice(0, 1), cells: cells.slice(0, 2) })
    expect(viewOf(snapshot).matrix.introduction).toMatch(/^Tern 30 access gangway: 1 loop in 2 operating conditions\. /)
  })

  it('has a title that a browser reads back as it stands: white space is one space', () => {
    const { report } = buildSnapshot()
    expect(viewOf(buildSnapshot({ report: { ...report, title: 'Margins  of\tall\naxes' } })).documentTitle).toBe('WB-0042 B draft 2: Margins of all axes')
  })

  it('stamps what is not issued', () => {
    expect([viewOf().stamp, viewOf(buildSnapshot(), { edition: 'preview', label: 'Preview' }).stamp]).toEqual(['DRAFT', 'PREVIEW'])
  })

  it('carries every caution it owes its reader', () => {
    const cautions = viewOf().sections.at(-1)?.blocks.flatMap(block => block.items.map(item => item.words)).join(' ') ?? ''
    for (const words of ['simultaneous change in several loops is not covered', 'Nothing is said of the way between', 'amplitude they were measured or modelled for', 'evidence and no certificate', 'licensed or responsible engineer decide', 'never to be closed on hardware']) {
      expect(cautions).toContain(words)
    }
  })
})
