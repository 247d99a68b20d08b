import type { BreakAt, Loop } from '#shared/types/system'
import type { LoopFields } from '~/services/systemsClient'
import { readLoopStates, typedLoopStates, type TypedLoopState } from './typedLoopStates'

/** The fields of a loop as they stand in its form. */
export interface LoopForm extends Omit<LoopFields, 'breakAt' | 'loopStates'> {
  /** '' while no block is chosen */
  breakBlock: string
  breakSide: BreakAt['side']
  loopStates: TypedLoopState[]
}

export const loopForm = (loop: Loop | null): LoopForm => ({
  code: loop?.code ?? '', name: loop?.name ?? '', axis: loop?.axis ?? '', breakPoint: loop?.breakPoint ?? '',
  breakBlock: loop?.breakAt?.block ?? '', breakSide: loop?.breakAt?.side ?? 'output',
  loopStates: typedLoopStates(loop?.loopStates ?? []), otherLoops: loop?.otherLoops ?? '', notes: loop?.notes ?? '',
})

/**
 * What is to be stored.
 * @throws ApiError with the path of a state that cannot be read
 */
export function readLoopForm({ breakBlock, breakSide, loopStates, ...fields }: LoopForm): LoopFields {
  return { ...fields, breakAt: breakBlock === '' ? null : { block: breakBlock, side: breakSide }, loopStates: readLoopStates(loopStates) }
}

/** The fields in words, to be compared with those somebody else stored. */
export function loopFormInWords({ breakBlock, breakSide, loopStates, ...fields }: LoopForm, codes: ReadonlyMap<number, string>) {
  return {
    ...fields,
    breakAt: breakBlock === '' ? '' : `${breakSide} of ${breakBlock}`,
    loopStates: loopStates.map(({ loopId, state, gain }) => `${codes.get(loopId) ?? 'a deleted loop'} ${state}${state === 'held' ? ` at gain ${gain}` : ''}`).join(', '),
  }
}
