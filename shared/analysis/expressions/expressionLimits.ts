/** Sizes beyond which an expression is refused, so that every answer comes in bounded time and memory. */
export const expressionLimits = {
  characters: 8_000,
  /** numbers, names and operators */
  tokens: 4_000,
  /** brackets inside brackets, powers of powers, signs before signs */
  depth: 60,
  exponent: 50,
  /** order of the loop */
  degree: 300,
  /** degree of a polynomial that has to be multiplied out, and its roots found again */
  expandedDegree: 260,
  /** bits of an exact coefficient */
  bits: 40_000,
  /** different dead times in one sum */
  delays: 64,
} as const
