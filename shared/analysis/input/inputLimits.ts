/** Sizes beyond which an input is refused, so that every answer comes in bounded time and memory. */
export const inputLimits = {
  /** Degree of a numerator or denominator, and number of zeros or of poles. */
  order: 200,
  measuredPoints: 200_000,
  expressionLength: 8_000,
  parameters: 1_000,
  nameLength: 500,
  blocks: 500,
  /** characters of the expressions of all blocks together */
  blockExpressionsLength: 100_000,
  blockNameLength: 60,
  /** of a state space */
  states: 200,
  /** inputs, and outputs, of a block */
  channels: 50,
  channelNameLength: 60,
  sections: 100,
  /** of a modal table */
  modes: 200,
  rigidTerms: 20,
} as const

/**
 * A root counts as the conjugate of another when the two differ by no more than this part of their distance from 0:
 * decimals written with ten digits pass, two different modes do not.
 */
export const conjugateTolerance = 1e-9
