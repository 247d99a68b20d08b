import { formatDecibels } from '#shared/formatting/formatDecibels'
import { formatDegrees } from '#shared/formatting/formatDegrees'
import { formatDistance } from '#shared/formatting/formatDistance'
import { formatFrequency } from '#shared/formatting/formatFrequency'
import { significantDigits } from '#shared/formatting/significantDigits'
import type { MarginsThere, ModeShiftTable } from '#shared/types/structure'
import type { PlacedCell } from './cellsOf'
import type { TableView } from './ReportView'
import type { CellDraft } from './tableOf'
import { tableOf } from './tableOf'

const asItIs = 'as it is'

/** The margins that exist, one a line. */
function marginLines({ summary }: MarginsThere): string {
  if (summary === null) return ''
  const { gainIncrease, gainDecrease, phaseLag, phaseLead } = summary
  const line = (word: string, value: number | null, format: (value: number) => string) => (value === null ? [] : [`${word} ${format(value)}`])
  return [...line('rise', gainIncrease, formatDecibels), ...line('fall', gainDecrease, formatDecibels), ...line('lag', phaseLag, formatDegrees), ...line('lead', phaseLead, formatDegrees)].join('\n')
}

/** The least return difference with the margins beneath; a loop that is not stable has none, which is told first. */
function marginsCell(there: MarginsThere, required: number | null): CellDraft {
  if (there.failure !== null) return { text: 'not analysed', small: there.failure, tone: 'open' }
  const least = there.vectorMargin === null ? '' : formatDistance(there.vectorMargin.distance)
  if (there.summary === null) return { text: there.verdict, small: least, tone: 'bad' }
  const isUnder = required !== null && there.vectorMargin !== null && there.vectorMargin.distance < required
  return isUnder ? { text: `under, ${least}`, small: marginLines(there), tone: 'bad' } : { text: least, small: marginLines(there) }
}

/** A mode that changes no printed figure is told so in words: what moves the margins stands out. */
function shiftedCell(shift: MarginsThere, nominal: CellDraft, required: number | null): CellDraft {
  const cell = marginsCell(shift, required)
  return shift.failure === null && cell.text === nominal.text && cell.small === nominal.small ? { text: asItIs, tone: 'quiet' } : cell
}

const changeWords = (change: number) => `${change > 0 ? '+' : '\u2212'}${Math.round(Math.abs(change) * 100)} %`

/**
 * The margins of one loop with each flexible mode moved: a row a mode, the loop as it is first.
 *
 * @param required least |1 + L| asked for, null where none is
 */
export function modeShiftTable({ loop, condition }: PlacedCell, { modes, nominal, frequencyUnit, notes }: ModeShiftTable, required: number | null): TableView {
  const changes = [...new Set(modes.flatMap(({ shifts }) => shifts.map(({ change }) => change)))].sort((a, b) => a - b)
  const asModelled = marginsCell(nominal, required)
  return tableOf({
    caption: `${loop.code} ${loop.name}, ${condition.code} ${condition.name}: least |1 + L| and margins with each flexible mode moved${required === null ? '' : `; required ${formatDistance(required)}`}`,
    columns: [
      { head: 'mode' }, { head: 'frequency', unit: frequencyUnit, isNumber: true }, { head: asItIs, isNumber: true }, ...changes.map(change => ({ head: changeWords(change), isNumber: true })),
    ],
    rows: [
      { isMarked: true, cells: [{ text: 'none moved', isHead: true }, { text: '' }, asModelled, ...changes.map(() => ({ text: '' }))] },
      ...modes.map(({ block, mode, frequency, damping, shifts }) => ({
        cells: [
          { text: mode, isHead: true, small: `of ${block}, damping ${significantDigits(damping, 3)}` },
          { text: formatFrequency(frequency) },
          { text: '' },
          ...changes.map((change): CellDraft => {
            const shift = shifts.find(shift => shift.change === change)
            return shift === undefined ? { text: '' } : shiftedCell(shift, asModelled, required)
          }),
        ],
      })),
    ],
    notes,
    kind: 'shifts',
  })
}
