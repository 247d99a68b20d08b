import { ApiError } from '~/services/ApiError'
import type { OtherLoopState } from '#shared/types/system'
import { parseNumberText } from './parseNumberText'

/** The state of another loop as it stands in the form: the gain is a text, '' where it is not held. */
export interface TypedLoopState {
  loopId: number
  state: OtherLoopState['state']
  gain: string
}

export const typedLoopStates = (states: readonly OtherLoopState[]): TypedLoopState[] =>
  states.map(({ loopId, state, gain }) => ({ loopId, state, gain: gain === undefined ? '' : String(gain) }))

/**
 * The states to be stored.
 * @throws ApiError with the path of a held loop whose gain is missing or no number
 */
export function readLoopStates(typed: readonly TypedLoopState[]): OtherLoopState[] {
  return typed.map(({ loopId, state, gain }, index) => {
    if (state !== 'held') return { loopId, state }
    const value = parseNumberText(gain)
    if (value === null) throw new ApiError('invalidInput', 'Type the gain it is held at.', `loopStates[${index}].gain`)
    if (Number.isNaN(value)) throw new ApiError('invalidInput', `'${gain.trim()}' is not a number.`, `loopStates[${index}].gain`)
    return { loopId, state, gain: value }
  })
}
