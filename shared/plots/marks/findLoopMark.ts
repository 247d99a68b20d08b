import type { BlockResponseData, CrossingChartData, LoopFigureData } from '../FigureData'
import type { LoopMark } from './loopMarks'
import { loopMarks } from './loopMarks'

/** The crossing or closest approach with an id in the lists of a figure's main analysis, whether or not the figure marks it; null where there is none. */
export function findLoopMark(data: LoopFigureData | CrossingChartData | BlockResponseData, id: string): LoopMark | null {
  if (!('curves' in data)) return null
  return loopMarks(data.curves[0].analysis, data.frequencyUnit, data.requiredVectorMargin).find(mark => mark.id === id) ?? null
}
