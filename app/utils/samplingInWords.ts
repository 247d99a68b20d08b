import { formatDelay } from '#shared/formatting/formatDelay'
import { listInWords } from '#shared/formatting/listInWords'
import type { BlockDefinition } from '#shared/types/block'

interface NamedGain { name: string, definition: BlockDefinition | null }

/** Where the sample time of a loop comes from: 'sampled at 20.0 us by C and PWM'; each rate where there are several; null for a continuous loop. */
export function samplingInWords(blocks: readonly NamedGain[]): string | null {
  const rates = new Map<number, string[]>()
  for (const { name, definition } of blocks) {
    const sampleTime = definition !== null && 'sampleTime' in definition ? definition.sampleTime : undefined
    if (sampleTime !== undefined) rates.set(sampleTime, [...rates.get(sampleTime) ?? [], name])
  }
  if (rates.size === 0) return null
  return `sampled at ${[...rates].map(([sampleTime, names]) => `${formatDelay(sampleTime)} by ${listInWords(names)}`).join(', at ')}`
}
