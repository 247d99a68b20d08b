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
import { withoutUnit } from './withoutUnit'

const figure = (value: number | null | undefined, format: (value: number) => string): CellDraft => (value === null || value === undefined ? { text: 'none', tone: 'quiet' } : { text: withoutUnit(format(value)) })

/** Closed loop and margins; a loop that is not stable has none. */
function marginCells({ verdict, summary, vectorMargin, failure }: MarginsThere): CellDraft[] {
  const blank: CellDraft[] = Array.from({ length: 4 }, () => ({ text: '' }))
  if (failure !== null) return [{ text: 'not analysed', small: failure, tone: 'open' }, ...blank, { text: '' }]
  const least: CellDraft = { text: vectorMargin === null ? '' : formatDistance(vectorMargin.distance) }
  if (summary === null) return [{ text: verdict, tone: 'bad' }, ...blank, least]
  return [
    { text: verdict },
    figure(summary.gainIncrease, formatDecibels), figure(summary.gainDecrease, formatDecibels), figure(summary.phaseLag, formatDegrees), figure(summary.phaseLead, formatDegrees),
    least,
  ]
}

/** The margins of one loop with each flexible mode moved, the loop as it is first. */
export function modeShiftTable({ loop, condition }: PlacedCell, { modes, nominal, frequencyUnit, notes }: ModeShiftTable): TableView {
  return tableOf({
    caption: `${loop.code} ${loop.name}, ${condition.code} ${condition.name}: margins with each flexible mode moved`,
    columns: [
      { head: 'mode' }, { head: 'moved by', isNumber: true }, { head: 'to', unit: frequencyUnit, isNumber: true }, { head: 'closed loop' }, { head: 'gain rise', unit: 'dB', isNumber: true }, { head: 'gain fall', unit: 'dB', isNumber: true },
      { head: 'lag', unit: 'deg', isNumber: true }, { head: 'lead', unit: 'deg', isNumber: true }, { head: 'least', unit: '|1 + L|', isNumber: true },
    ],
    rows: [
      { isMarked: true, cells: [{ text: 'as it is', isHead: true }, { text: '' }, { text: '' }, ...marginCells(nominal)] },
      ...modes.flatMap(({ block, mode, frequency, damping, shifts }) => shifts.map((shift, index) => ({
        cells: [
          index === 1
            ? { text: `${block}, ${formatFrequency(frequency, frequencyUnit)}, damping ${significantDigits(damping, 3)}`, tone: 'quiet' as const }
            : { text: index === 0 ? mode : '', isHead: true },
          { text: `${shift.change > 0 ? '+' : '\u2212'}${Math.round(Math.abs(shift.change) * 100)} %` },
          { text: formatFrequency(frequency * (1 + shift.change)) },
          ...marginCells(shift),
        ],
      }))),
    ],
    notes,
    kind: 'shifts',
  })
}
