import type { LoopInput } from '#shared/types/analysis'
import type { ClosedLoopPoles } from '#shared/types/structure'
import type { OpenContext } from '../context'
import { runEngine } from './runEngine'

/** The closed-loop poles of loops, in their order. Computed in the pool and kept; a list that cannot be given says why in its `reason`. */
export async function findClosedLoopPoles(inputs: readonly LoopInput[], context: OpenContext): Promise<ClosedLoopPoles[]> {
  const answers = await runEngine('closedLoopPoles', inputs, context)
  return answers.map((answer, index) => 'error' in answer ? { frequencyUnit: inputs[index]?.frequencyUnit ?? 'rad/s', poles: [], reason: answer.error.message } : answer)
}
