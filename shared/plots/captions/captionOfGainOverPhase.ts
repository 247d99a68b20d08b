import type { LoopFigureData } from '../FigureData'
import { hasMargins } from '../text/markWords'
import { drawnToWords, measuredWords, nearestWords, otherCurvesWords, sentences, stabilityWords } from './captionWords'

/** What there is to see in gain over phase. */
export function captionOfGainOverPhase({ title, curves, requiredVectorMargin, frequencyUnit }: LoopFigureData): string {
  const [main] = curves
  const ring = requiredVectorMargin === null ? '' : ' L must stay outside the dashed line.'
  return sentences(
    `${title}, ${main.name}: gain over phase of the loop gain. Each cross is the critical point −1, at an odd multiple of 180 deg and 0 dB; the tints are lines of equal distance to it.${ring} Numbers along the curve are frequencies in ${frequencyUnit}.`,
    stabilityWords(main.analysis),
    hasMargins(main.analysis) ? 'The way from a cross to the curve is gain margin when vertical, phase margin when horizontal.' : '',
    nearestWords(main.analysis, requiredVectorMargin, frequencyUnit),
    otherCurvesWords(curves),
    drawnToWords(main, frequencyUnit),
    measuredWords(main, true).replace(', with their 95 % confidence discs where coherence was recorded', ''),
  )
}
