import type { ModalGain } from '#shared/types/block'
import { randomFromSeed } from './randomFromSeed'

/**
 * A modal table as a survey of the article would have corrected it: frequencies within 2 %, damping ratios between 0.7 and 1.4 times, gains within 5 % of the design's, drawn
 * by a seed. Rigid bodies stay.
 */
export function correlateModes(table: ModalGain, seed: number): ModalGain {
  const random = randomFromSeed(seed)
  const within = (from: number, to: number) => from + (to - from) * random()
  return {
    ...table,
    modes: table.modes.map((mode) => {
      const factor = within(0.95, 1.05)
      return {
        ...mode,
        frequency: decimal(mode.frequency * within(0.98, 1.02)),
        damping: decimal(mode.damping * within(0.7, 1.4)),
        gainIn: mode.gainIn.map(gain => decimal(gain * factor)),
        gainOut: mode.gainOut.map(gain => decimal(gain * factor)),
      }
    }),
  }
}

/** Seven digits, as a table has them. */
const decimal = (value: number) => Number(value.toPrecision(7))
