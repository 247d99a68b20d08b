import type { ReportSnapshot, SnapshotCell } from '#shared/types/snapshot'

export type SnapshotLoop = ReportSnapshot['loops'][number]
export type SnapshotCondition = ReportSnapshot['conditions'][number]

/** A loop in a condition with its place in the document. */
export interface PlacedCell {
  cell: SnapshotCell
  loop: SnapshotLoop
  loopIndex: number
  condition: SnapshotCondition
  conditionIndex: number
}

/** Every loop in every condition in the order printed. Throws a RangeError where the snapshot lacks a cell. */
export function cellsOf(snapshot: ReportSnapshot): PlacedCell[] {
  const byCodes = new Map(snapshot.cells.map(cell => [`${cell.loopCode}\n${cell.conditionCode}`, cell]))
  return snapshot.loops.flatMap((loop, loopIndex) => snapshot.conditions.map((condition, conditionIndex) => {
    const cell = byCodes.get(`${loop.code}\n${condition.code}`)
    if (!cell) throw new RangeError(`the snapshot says nothing of loop ${loop.code} in condition ${condition.code}`)
    return { cell, loop, loopIndex, condition, conditionIndex }
  }))
}
