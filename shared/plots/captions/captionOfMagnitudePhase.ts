import type { LoopFigureData } from '../FigureData'
import { hasMargins } from '../text/markWords'
import { countWords, drawnToWords, halfSampleRateWords, measuredWords, otherCurvesWords, sentences, stabilityWords } from './captionWords'

/** What there is to see in gain and phase over frequency. */
export function captionOfMagnitudePhase({ title, curves, frequencyUnit }: LoopFigureData): string {
  const [main] = curves
  const { analysis } = main
  const bars = hasMargins(analysis)
    ? 'Vertical bars are margins: of phase at each gain crossover, to an odd multiple of 180 deg; of gain at each phase crossover, to 0 dB.'
    : ''
  return sentences(
    `${title}, ${main.name}: gain and phase of the loop gain over frequency, with ${countWords(analysis.gainCrossovers.length, 'gain crossover')} and ${countWords(analysis.phaseCrossovers.length, 'phase crossover')}, each marked on both. Bands of buff tint: gain above one.`,
    stabilityWords(analysis),
    bars,
    halfSampleRateWords(main.halfSampleRate, frequencyUnit),
    otherCurvesWords(curves),
    drawnToWords(main, frequencyUnit),
    measuredWords(main, false),
  )
}
