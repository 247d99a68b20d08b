import type { FrequencyUnit } from '../types/analysis'

/** What a frequency in one unit is multiplied by to have it in the other: 1 Hz is 2 pi rad/s, by definition. */
export const scaleOfFrequency = (from: FrequencyUnit, to: FrequencyUnit): number => from === to ? 1 : to === 'Hz' ? 1 / (2 * Math.PI) : 2 * Math.PI
