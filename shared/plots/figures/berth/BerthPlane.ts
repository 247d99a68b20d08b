import type { ClosestApproach, ListedFrequency } from '../../../types/analysis'
import type { Rectangle } from '../../curves/Rectangle'
import type { FigureMark } from '../../Figure'
import type { LoopMark } from '../../marks/loopMarks'
import type { AxisScale } from '../../scales/AxisScale'

/** The shown part of the plane of L. */
export interface BerthPlane {
  x: AxisScale
  y: AxisScale
  panel: Rectangle
  /** px per unit of L */
  unit: number
}

export type PlacedMark = LoopMark & FigureMark

/** What is nearest to -1, and where (px). */
export interface Berth {
  x: number
  y: number
  distance: number
  frequency: ListedFrequency
  /** null where it is an end of the axis */
  approach: ClosestApproach | null
}

/** Whether a chart is so small that only the most telling labels are written. */
export function isCompact(panel: Rectangle): boolean {
  return panel.height < 190 || panel.width < 330
}
