import { describeClosedLoopPole } from '#shared/formatting/describeClosedLoopPole'
import { listInWords } from '#shared/formatting/listInWords'
import type { ReportSnapshot } from '#shared/types/snapshot'
import type { ClosedLoopPoles } from '#shared/types/structure'
import { shiftsPending } from '../../services/analyses/findModeShifts'
import type { PlacedCell } from './cellsOf'
import { governingCell } from './chapterView'
import { limitOf } from './criteriaWords'
import { modeShiftTable } from './modeShiftTable'
import type { SectionBlock, SectionView, TableView } from './ReportView'
import { tableOf } from './tableOf'

/** Poles of one loop that are printed; the package holds every one. */
const printedPoles = 60

function polesTable({ loop, condition }: PlacedCell, { poles, frequencyUnit }: ClosedLoopPoles): TableView {
  const left = poles.length - printedPoles
  return tableOf({
    caption: `${loop.code} ${loop.name}, ${condition.code} ${condition.name}: closed-loop poles`,
    columns: [{ head: 'frequency', unit: frequencyUnit, isNumber: true }, { head: 'damping', isNumber: true }, { head: 'time constant', isNumber: true }, { head: 'comes from', isWide: true }],
    rows: poles.slice(0, printedPoles).map((pole) => {
      const { frequency, damping, timeConstant, mode } = describeClosedLoopPole(pole)
      const tone = pole.timeConstant === null || pole.timeConstant < 0 ? 'bad' as const : 'plain' as const
      return { cells: [{ text: frequency }, { text: damping, tone }, { text: timeConstant, tone }, { text: mode }] }
    }),
    notes: left > 0 ? [`${left} more are in tables/closed-loop-poles.csv of this revision's package.`] : [],
    kind: 'poles',
  })
}

/** Loops whose poles are not listed, those with the very same reason together. */
function withoutList(cells: readonly PlacedCell[]): string[] {
  const loopsOf = new Map<string, Set<string>>()
  for (const { cell, loop } of cells) {
    const reason = cell.closedLoopPoles?.reason
    if (reason) loopsOf.set(reason, (loopsOf.get(reason) ?? new Set()).add(loop.code))
  }
  return [...loopsOf].map(([reason, loops]) => `${listInWords([...loops])}: ${reason}`)
}

const polesWords = 'One of each conjugate pair is listed. \u2018Comes from\u2019 names the open-loop pole it departs from as the gain rises from zero, where that is plain. Every condition is in tables/closed-loop-poles.csv of this revision\u2019s package.'
const shiftWords = 'Each flexible mode of a plant, actuator or sensor moved by \u221220, \u221210, +10 and +20 % with its damping and gains kept and the notch filters left where they are. Full digits are in tables/mode-shifts.csv of this revision\u2019s package.'

/** A title with its words, then a table a block, so that long ones may part over pages. */
const titled = (title: string, paragraphs: string[], tables: readonly TableView[]): SectionBlock[] => [
  { title, paragraphs, items: [], table: null }, ...tables.map(table => ({ title: '', paragraphs: [], items: [], table })),
]

/**
 * The closed-loop poles of every loop in the condition that stands worst, and what becomes of its margins where flexible modes lie elsewhere. Null where
 * the snapshot has neither, as from before they were listed.
 */
export function closedLoopSection(snapshot: ReportSnapshot, cells: readonly PlacedCell[], number: string): SectionView | null {
  const governing = snapshot.loops.flatMap((_, index) => governingCell(cells.filter(cell => cell.loopIndex === index)) ?? [])
  const poles = governing.flatMap((placed) => {
    const found = placed.cell.closedLoopPoles
    return found && found.reason === null ? [polesTable(placed, found)] : []
  })
  const reasons = withoutList(governing)
  const shifts = governing.flatMap((placed) => {
    const found = placed.cell.modeShifts
    return found && found.reason === null ? [modeShiftTable(placed, found, limitOf(snapshot.criteria, 'vectorMargin'))] : []
  })
  const isPending = governing.some(({ cell }) => cell.modeShifts?.reason === shiftsPending)
  if (poles.length + reasons.length + shifts.length === 0 && !isPending) return null
  return {
    number,
    anchor: 'closed-loop-poles',
    title: shifts.length === 0 ? 'Closed-loop poles' : 'Closed-loop poles and flexible modes',
    introduction: ['Each loop is shown in the condition in which it stands worst.'],
    blocks: [
      ...titled('Closed-loop poles', [...(poles.length === 0 ? [] : [polesWords]), ...reasons.map(reason => `No list for ${reason}`)], poles),
      ...(shifts.length === 0 && !isPending ? [] : titled('Flexible modes moved', [...(shifts.length === 0 ? [] : [shiftWords]), ...(isPending ? [shiftsPending] : [])], shifts)),
    ],
  }
}
