import type { ClosedLoopVerdict, Stability } from '../types/analysis'
import type { OtherLoopState } from '../types/system'

export interface BreakPointFacts {
  loops: readonly { id: number, code: string, loopStates: readonly OtherLoopState[] }[]
  cells: readonly { loopId: number, conditionId: number, analysis: { stability: Pick<Stability, 'verdict'> } | null }[]
}

/** The key of a cell in what `breakPointDisagreements` answers. */
export const cellKey = (loopId: number, conditionId: number): string => `${loopId} ${conditionId}`

/**
 * Break points of one closed system must agree on whether it is stable. Two loops break the same closed system where each states the other as
 * closed and both state the same of every third loop; in each condition their verdicts, stable or not, must then be the same. Undetermined
 * verdicts and cells without an analysis contradict nobody.
 *
 * @returns for each cell in a disagreement, by `cellKey`, what to tell of it: the other loop, both verdicts, and what to check
 */
export function breakPointDisagreements({ loops, cells }: BreakPointFacts): Map<string, string> {
  const verdicts = new Map(cells.flatMap(({ loopId, conditionId, analysis }) => analysis ? [[cellKey(loopId, conditionId), analysis.stability.verdict] as const] : []))
  const conditions = [...new Set(cells.map(({ conditionId }) => conditionId))]
  const told = new Map<string, string[]>()
  const tell = (key: string, words: string) => told.set(key, [...told.get(key) ?? [], words])
  loops.forEach((one, i) => loops.slice(i + 1).filter(other => breakSameSystem(one, other)).forEach((other) => {
    for (const conditionId of conditions) {
      const keys = [cellKey(one.id, conditionId), cellKey(other.id, conditionId)] as const
      const [first, second] = [verdicts.get(keys[0]), verdicts.get(keys[1])]
      if (first === undefined || second === undefined || !contradict(first, second)) continue
      tell(keys[0], inWords(first, other.code, second))
      tell(keys[1], inWords(second, one.code, first))
    }
  }))
  return new Map([...told].map(([key, words]) => [key, words.join(' ')]))
}

type Breaking = BreakPointFacts['loops'][number]

function breakSameSystem(one: Breaking, other: Breaking): boolean {
  const [ofOne, ofOther] = [statesOf(one), statesOf(other)]
  if (ofOne.get(other.id) !== 'closed' || ofOther.get(one.id) !== 'closed') return false
  const third = new Set([...ofOne.keys(), ...ofOther.keys()].filter(id => id !== one.id && id !== other.id))
  return [...third].every(id => (ofOne.get(id) ?? 'at nominal') === (ofOther.get(id) ?? 'at nominal'))
}

const statesOf = ({ loopStates }: Breaking) =>
  new Map(loopStates.map(({ loopId, state, gain }) => [loopId, state === 'held' ? `held at ${gain ?? 'no gain stated'}` : state]))

function contradict(first: ClosedLoopVerdict, second: ClosedLoopVerdict): boolean {
  if (first === 'undetermined' || second === 'undetermined') return false
  return (first === 'stable') !== (second === 'stable')
}

const inWords = (own: ClosedLoopVerdict, code: string, other: ClosedLoopVerdict) =>
  `Opened here the closed loop is ${own}, opened at ${code} the same closed loop is ${other}: check the sign of the feedback, the loop gains and the stated states of both.`
