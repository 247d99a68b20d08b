import { describeClosedLoopPole } from '#shared/formatting/describeClosedLoopPole'
import type { ReportSnapshot } from '#shared/types/snapshot'
import type { ClosedLoopPoles } from '#shared/types/structure'
import type { PlacedCell } from './cellsOf'
import { governingCell } from './chapterView'
import type { SectionView, TableView } from './ReportView'
import { tableOf } from './tableOf'

/** Poles of one loop that are printed; the package holds every one. */
const printedPoles = 60

function polesTable({ loop, condition }: PlacedCell, { poles, frequencyUnit }: ClosedLoopPoles): TableView {
  const left = poles.length - printedPoles
  return tableOf({
    caption: `${loop.code} ${loop.name}, ${condition.code} ${condition.name}: closed-loop poles`,
    columns: [{ head: 'frequency', unit: frequencyUnit, isNumber: true }, { head: 'damping', isNumber: true }, { head: 'time constant', isNumber: true }, { head: 'goes back to', isWide: true }],
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
  return [...loopsOf].map(([reason, loops]) => `${[...loops].join(', ')}: ${reason}`)
}

/** The closed-loop poles of every loop in the condition that stands worst. Null where the snapshot has none, as from before they were listed. */
export function closedLoopSection(snapshot: ReportSnapshot, cells: readonly PlacedCell[], number: string): SectionView | null {
  if (!cells.some(({ cell }) => cell.closedLoopPoles)) return null
  const governing = snapshot.loops.flatMap((_, index) => governingCell(cells.filter(cell => cell.loopIndex === index)) ?? [])
  const tables = governing.flatMap((placed) => {
    const poles = placed.cell.closedLoopPoles
    return poles && poles.reason === null ? [polesTable(placed, poles)] : []
  })
  const left = withoutList(governing)
  return {
    number,
    anchor: 'closed-loop-poles',
    title: 'Closed-loop poles',
    introduction: [
      'Each loop in the condition that stands worst; every condition is in tables/closed-loop-poles.csv of this revision\u2019s package. One of each conjugate pair is listed. \u2018Goes back to\u2019 names the open-loop pole it departs from as the gain rises from zero, where that is plain.',
      ...(left.length === 0 ? [] : [`No list can be given for ${left.join('; ')}`]),
    ],
    blocks: tables.map(table => ({ title: '', paragraphs: [], items: [], table })),
  }
}
