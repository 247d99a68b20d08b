import type { ApproximationDifference, ListedFrequency } from '#shared/types/analysis'
import type { CriterionQuantity, CriterionRow } from '#shared/types/criterion'
import type { ReportSnapshot, SnapshotCell } from '#shared/types/snapshot'
import type { CsvValue } from './csvOf'
import { csvOf } from './csvOf'
import type { PackagedFile } from './zipOf'

const frequencyValue = (frequency: ListedFrequency): CsvValue => (frequency === 'infinity' ? 'infinity' : frequency)
const namesOf = (cell: SnapshotCell): CsvValue[] => [cell.loopCode, cell.conditionCode]

const approximationValues = ({ approximation }: { approximation?: ApproximationDifference }): CsvValue[] => [approximation?.gain ?? null, approximation?.phase ?? null, approximation?.distance ?? null]
const approximationHead = ['approximation less exact, dB', 'approximation less exact, deg', 'approximation less exact, |1 + L|']

function crossingRows(cell: SnapshotCell): CsvValue[][] {
  const { analysis } = cell
  if (!analysis) return []
  // A loop that is not shown to be stable has no margins: only places and distances are given.
  const hasMargins = analysis.summary !== null
  const margin = (value: number): CsvValue => (hasMargins ? value : null)
  const rows = [
    ...analysis.gainCrossovers.map(crossing => ({
      frequency: crossing.frequency,
      row: ['gain crossover', frequencyValue(crossing.frequency), crossing.slope, margin(crossing.phaseMargin), margin(crossing.delayMargin), null, crossing.distance ?? null, ...approximationValues(crossing)],
    })),
    ...analysis.phaseCrossovers.map(crossing => ({
      frequency: crossing.frequency,
      row: ['phase crossover', frequencyValue(crossing.frequency), crossing.slope, null, null, margin(crossing.gainMargin), crossing.distance ?? null, ...approximationValues(crossing)],
    })),
  ]
  const place = (frequency: ListedFrequency) => (frequency === 'infinity' ? Infinity : frequency)
  return rows
    .sort((a, b) => place(a.frequency) - place(b.frequency) || 0)
    .map(({ row }): CsvValue[] => [...namesOf(cell), ...row])
}

function approachRows(cell: SnapshotCell): CsvValue[][] {
  const hasMargins = cell.analysis?.summary != null
  return (cell.analysis?.closestApproaches ?? []).map(approach => (
    [...namesOf(cell), approach.frequency, approach.distance, ...(hasMargins ? [approach.gainChange, approach.phaseChange] : [null, null]), ...approximationValues(approach)]
  ))
}

function coverageWord({ analysis, source }: SnapshotCell): CsvValue {
  if (!analysis) return null
  if (analysis.coverage.proven) return 'proven'
  return source?.kind === 'measured' ? 'measured' : 'not proven'
}

function summaryRow(cell: SnapshotCell): CsvValue[] {
  const { analysis, judgement, source } = cell
  const summary = analysis?.summary ?? null
  const smallest = (quantity: CriterionQuantity, direction: CriterionRow['direction']): CsvValue =>
    (summary === null ? null : judgement.rows.find(row => row.quantity === quantity && row.direction === direction)?.value ?? null)
  return [
    ...namesOf(cell), source?.name ?? null, source?.kind ?? 'no data', judgement.verdict, analysis?.stability.verdict ?? null, coverageWord(cell),
    smallest('gainMargin', 'rise'), smallest('gainMargin', 'fall'), smallest('phaseMargin', 'lag'), smallest('phaseMargin', 'lead'), smallest('delayMargin', null),
    smallest('vectorMargin', null), analysis?.vectorMargin?.distance ?? null, analysis?.vectorMargin ? frequencyValue(analysis.vectorMargin.frequency) : null,
    summary?.sensitivityPeak ?? null, summary?.complementarySensitivityPeak ?? null,
  ]
}

function criterionRows(cell: SnapshotCell): CsvValue[][] {
  return cell.judgement.rows.map(row => (
    [...namesOf(cell), row.quantity, row.direction, row.limit, row.value, row.driver?.kind ?? null, row.driver ? frequencyValue(row.driver.frequency) : null, row.verdict, row.reason ?? null]
  ))
}

function coverageRows(cell: SnapshotCell): CsvValue[][] {
  return (cell.analysis?.coverage.exceptions ?? []).map(stretch => [...namesOf(cell), stretch.from, frequencyValue(stretch.to), stretch.reason])
}

function poleRows(cell: SnapshotCell): CsvValue[][] {
  return (cell.closedLoopPoles?.poles ?? []).map(pole => [...namesOf(cell), pole.frequency, pole.damping, pole.timeConstant, pole.re, pole.im, pole.z?.[0] ?? null, pole.z?.[1] ?? null, pole.mode])
}

function shiftRows(cell: SnapshotCell): CsvValue[][] {
  return (cell.modeShifts?.modes ?? []).flatMap(({ block, mode, frequency, damping, shifts }) => shifts.map(({ change, verdict, summary, vectorMargin, failure }): CsvValue[] => [
    ...namesOf(cell), block, mode, frequency, damping, change * 100, failure === null ? verdict : `not analysed: ${failure}`,
    summary?.gainIncrease ?? null, summary?.gainDecrease ?? null, summary?.phaseLag ?? null, summary?.phaseLead ?? null, summary?.delay ?? null,
    vectorMargin?.distance ?? null, vectorMargin ? frequencyValue(vectorMargin.frequency) : null,
  ]))
}

function differenceRows(cell: SnapshotCell): CsvValue[][] {
  return (cell.otherSources ?? []).flatMap(({ name, setAsideReason, difference }) => (difference?.bands ?? []).map(({ from, to, gain, phase, relative }): CsvValue[] => [
    ...namesOf(cell), name, setAsideReason, from, to, gain.difference, gain.frequency, phase.difference, phase.frequency, relative.ratio, relative.frequency,
  ]))
}

/** The tables of the package with full digits: crossings, closest approaches, smallest margins, criteria, and what is not covered. */
export function tablesOf(snapshot: ReportSnapshot): PackagedFile[] {
  const { cells, system: { frequencyUnit: unit } } = snapshot
  const table = (name: string, head: string[], rows: CsvValue[][]): PackagedFile => ({ name: `tables/${name}.csv`, data: csvOf(['loop', 'condition', ...head], rows) })
  return [
    table('crossings', ['what', `frequency, ${unit}`, 'slope', 'phase margin, deg (positive: lag reaches -1; negative: lead does)', 'delay margin, s', 'gain margin, dB (positive: gain may rise; negative: gain may fall)', '|1 + L|', ...approximationHead], cells.flatMap(crossingRows)),
    table('closest-approaches', [`frequency, ${unit}`, '|1 + L|', 'gain change, dB', 'phase change, deg (negative: lag)', ...approximationHead], cells.flatMap(approachRows)),
    table('summary-margins', ['source', 'kind', 'verdict', 'closed loop', 'coverage', 'gain may rise, dB', 'gain may fall, dB', 'lag, deg', 'lead, deg', 'delay, s', 'vector margin', 'least |1 + L|', `at, ${unit}`, 'max |S|', 'max |T|'], cells.map(summaryRow)),
    table('criteria', ['quantity', 'direction', 'limit (dB, deg, s or ratio)', 'smallest', 'set by', `at, ${unit}`, 'verdict', 'reason'], cells.flatMap(criterionRows)),
    table('coverage', [`from, ${unit}`, `to, ${unit}`, 'reason'], cells.flatMap(coverageRows)),
    ...furtherTables(snapshot, table),
  ]
}

/** What only loops over blocks, or with several sources, have; a table without a row is left out. */
function furtherTables({ cells, system: { frequencyUnit: unit } }: ReportSnapshot, table: (name: string, head: string[], rows: CsvValue[][]) => PackagedFile): PackagedFile[] {
  const at = `at, ${unit}`
  return [
    { name: 'closed-loop-poles', head: [`frequency, ${unit}`, 'damping', 'time constant, s', 'Re s, rad/s', 'Im s, rad/s', 'Re z', 'Im z', 'comes from'], rows: cells.flatMap(poleRows) },
    {
      name: 'mode-shifts', rows: cells.flatMap(shiftRows),
      head: ['block', 'mode', `frequency, ${unit}`, 'damping', 'moved by, %', 'closed loop', 'gain may rise, dB', 'gain may fall, dB', 'lag, deg', 'lead, deg', 'delay, s', 'least |1 + L|', at],
    },
    {
      name: 'source-differences', rows: cells.flatMap(differenceRows),
      head: ['source', 'set aside', `from, ${unit}`, `to, ${unit}`, 'gain, dB', at, 'phase, deg', at, 'of the distance to -1', at],
    },
  ].filter(({ rows }) => rows.length > 0).map(({ name, head, rows }) => table(name, head, rows))
}
