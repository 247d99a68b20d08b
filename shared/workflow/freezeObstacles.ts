export interface FreezeFacts {
  loops: readonly { code: string, breakPoint: string }[]
  conditions: readonly unknown[]
  /** cells whose verdict contradicts that of another break point of the same closed system, in words */
  disagreements?: readonly { loopCode: string, conditionCode: string, words: string }[]
}

/** Why a report cannot be frozen, in words that say where and what to do; empty when it can. */
export function freezeObstacles({ loops, conditions, disagreements = [] }: FreezeFacts): string[] {
  return [
    ...(loops.length === 0 ? ['The report covers no loop: choose at least one.'] : []),
    ...(conditions.length === 0 ? ['The report covers no operating condition: choose at least one.'] : []),
    ...loops.flatMap(({ code, breakPoint }) => breakPoint.trim() === '' ? [`${code} does not say at which signal it is opened: state its break point.`] : []),
    ...disagreements.map(({ loopCode, conditionCode, words }) => `${loopCode} in ${conditionCode}: ${words}`),
  ]
}
