import type { ListedFrequency } from '#shared/types/analysis'
import type { CriterionQuantity, CriterionRow } from '#shared/types/criterion'
import type { ReportSnapshot, SnapshotCell } from '#shared/types/snapshot'
import type { CsvValue } from './csvOf'
import { csvOf } from './csvOf'
import type { PackagedFile } from './zipOf'

const frequencyValue = (frequency: ListedFrequency): CsvValue => (frequency === 'infinity' ? 'infinity' : frequency)
const namesOf = (cell: SnapshotCell): CsvValue[] => [cell.loopCode, cell.conditionCode]

function crossingRows(cell: SnapshotCell): CsvValue[][] {
  const { analysis } = cell
  if (!analysis) return []
  // A loop that is not shown to be stable has no margins: only places and distances are given.
  const hasMargins = analysis.summary !== null
  const margin = (value: number): CsvValue => (hasMargins ? value : null)
  const rows = [
    ...analysis.gainCrossovers.map(crossing => ({
      frequency: crossing.frequency,
      row: ['gain crossover', frequencyValue(crossing.frequency), crossing.slope, margin(crossing.phaseMargin), margin(crossing.delayMargin), null, crossing.distance ?? null],
    })),
    ...analysis.phaseCrossovers.map(crossing => ({
      frequency: crossing.frequency,
      row: ['phase crossover', frequencyValue(crossing.frequency), crossing.slope, null, null, margin(crossing.gainMargin), crossing.distance ?? null],
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
    [...namesOf(cell), approach.frequency, approach.distance, ...(hasMargins ? [approach.gainChange, approach.phaseChange] : [null, null])]
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

/** The tables of the package with full digits: crossings, closest approaches, smallest margins, criteria, and what is not covered. */
export function tablesOf(snapshot: ReportSnapshot): PackagedFile[] {
  const { cells, system: { frequencyUnit: unit } } = snapshot
  const table = (name: string, head: string[], rows: CsvValue[][]): PackagedFile => ({ name: `tables/${name}.csv`, data: csvOf(['loop', 'condition', ...head], rows) })
  return [
    table('crossings', ['what', `frequency, ${unit}`, 'slope', 'phase margin, deg (positive: lag reaches -1; negative: lead does)', 'delay margin, s', 'gain margin, dB (positive: gain may rise; negative: gain may fall)', '|1 + L|'], cells.flatMap(crossingRows)),
    table('closest-approaches', [`frequency, ${unit}`, '|1 + L|', 'gain change, dB', 'phase change, deg (negative: lag)'], cells.flatMap(approachRows)),
    table('summary-margins', ['source', 'kind', 'verdict', 'closed loop', 'coverage', 'gain may rise, dB', 'gain may fall, dB', 'lag, deg', 'lead, deg', 'delay, s', 'vector margin', 'least |1 + L|', `at, ${unit}`, 'max |S|', 'max |T|'], cells.map(summaryRow)),
    table('criteria', ['quantity', 'direction', 'limit (dB, deg, s or ratio)', 'smallest', 'set by', `at, ${unit}`, 'verdict', 'reason'], cells.flatMap(criterionRows)),
    table('coverage', [`from, ${unit}`, `to, ${unit}`, 'reason'], cells.flatMap(coverageRows)),
  ]
}
