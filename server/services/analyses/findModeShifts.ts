import type { FrequencyUnit, LoopInput } from '#shared/types/analysis'
import type { BlockRole } from '#shared/types/block'
import type { ModeShiftTable } from '#shared/types/structure'
import type { OpenContext } from '../context'
import { runEngine } from './runEngine'

/** What a preview says in the place of a table. */
export const shiftsPending = 'Modes are moved when the report is frozen.'

const without = (frequencyUnit: FrequencyUnit, reason: string): ModeShiftTable =>
  ({ frequencyUnit, nominal: { verdict: 'undetermined', summary: null, vectorMargin: null, failure: reason }, modes: [], reason, notes: [] })

/**
 * The margins of loops with each flexible mode moved, null of a loop that is not built from blocks. `roles` of the blocks say whose modes are flexible modes.
 * Many analyses a loop: `known` takes only what was found before, and says of the others that it comes with the freeze.
 */
export async function findModeShifts(inputs: readonly LoopInput[], roles: Record<string, BlockRole>, context: OpenContext, { known = false } = {}): Promise<(ModeShiftTable | null)[]> {
  const questions = inputs.map((input) => {
    if (!('expression' in input) || !input.blocks) return null
    // Only what is asked about: the role of another block changes nothing.
    return { input, roles: Object.fromEntries(Object.keys(input.blocks).map(name => [name, roles[name] ?? 'other'])) }
  })
  const answers = await runEngine('modeShifts', questions.filter(question => question !== null), context, { known })
  let next = 0
  return questions.map((question) => {
    if (question === null) return null
    const unit = question.input.frequencyUnit ?? 'rad/s'
    const answer = answers[next++] ?? null
    if (answer === null) return without(unit, shiftsPending)
    return 'error' in answer ? without(unit, answer.error.message) : answer
  })
}
