import type { LoopFigureData } from '../FigureData'
import { drawnToWords, measuredWords, nearestWords, otherCurvesWords, sentences, stabilityWords } from './captionWords'

/** What there is to see in a berth chart. */
export function captionOfBerthChart({ title, curves, requiredVectorMargin, frequencyUnit }: LoopFigureData): string {
  const [main] = curves
  const rings = requiredVectorMargin === null
    ? 'Rings are lines of equal distance to −1.'
    : 'Rings are lines of equal distance to −1; L must stay outside the dashed one.'
  return sentences(
    `${title}, ${main.name}: the loop gain near the critical point −1. ${rings} Numbers along the curve are frequencies in ${frequencyUnit}.`,
    stabilityWords(main.analysis),
    nearestWords(main.analysis, requiredVectorMargin, frequencyUnit),
    'Triangles are gain crossovers (point down: gain falling), diamonds phase crossovers, circles closest approaches.',
    otherCurvesWords(curves),
    drawnToWords(main, frequencyUnit),
    measuredWords(main, true),
  )
}
