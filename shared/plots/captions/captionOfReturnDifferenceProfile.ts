import type { LoopFigureData } from '../FigureData'
import { countWords, drawnToWords, halfSampleRateWords, measuredWords, nearestWords, otherCurvesWords, sentences, stabilityWords } from './captionWords'

/** What there is to see in a return difference profile. */
export function captionOfReturnDifferenceProfile({ title, curves, requiredVectorMargin, frequencyUnit }: LoopFigureData): string {
  const [main] = curves
  const tint = requiredVectorMargin === null
    ? 'In the tinted part the closed loop amplifies disturbances.'
    : 'In the tinted part the closed loop amplifies disturbances; the curve must stay above the dashed line.'
  return sentences(
    `${title}, ${main.name}: the return difference |1 + L|, the distance of the loop gain to −1, over frequency, with ${countWords(main.analysis.closestApproaches.length, 'closest approach')}. ${tint}`,
    stabilityWords(main.analysis),
    nearestWords(main.analysis, requiredVectorMargin, frequencyUnit),
    halfSampleRateWords(main.halfSampleRate, frequencyUnit),
    otherCurvesWords(curves),
    drawnToWords(main, frequencyUnit),
    measuredWords(main, false),
  )
}
