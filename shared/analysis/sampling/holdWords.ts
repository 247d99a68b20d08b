import type { HoldGain } from '../../types/block'

const WORDS: Record<HoldGain['hold'], string> = {
  zeroOrder: 'the zero-order hold',
  pwmSingleUpdate: 'the pulse-width modulator (single update)',
  pwmDoubleUpdate: 'the pulse-width modulator (double update)',
}

/** A hold in words, inside a sentence or at its start. */
export function holdWords({ hold }: HoldGain, atStart = false): string {
  const words = WORDS[hold]
  return atStart ? `T${words.slice(1)}` : words
}
