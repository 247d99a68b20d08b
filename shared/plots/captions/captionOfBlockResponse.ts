import type { BlockResponseData } from '../FigureData'
import { formatFrequency } from '../../formatting/formatFrequency'
import { halfSampleRateWords, sentences } from './captionWords'

/** What there is to see in the response of a block. */
export function captionOfBlockResponse({ title, frequencyUnit, range, samples, halfSampleRate }: BlockResponseData): string {
  return sentences(
    `${title}: gain and phase over frequency, from ${formatFrequency(range.from, frequencyUnit)} to ${formatFrequency(range.to, frequencyUnit)}.`,
    halfSampleRateWords(halfSampleRate, frequencyUnit),
    samples === undefined ? '' : `Points are the ${samples.length} measured ones.`,
  )
}
