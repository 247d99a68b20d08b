import { describe, expect, it } from 'vitest'
import { ApiError } from '~/services/ApiError'
import { loopForm, loopFormInWords, readLoopForm } from '~/utils/loopForm'
import { buildLoop } from '../builders/buildCell'

describe('a loop in its form', () => {
  const loop = { ...buildLoop(1, 'SL-P'), breakAt: { block: 'C', side: 'input' as const }, loopStates: [{ loopId: 2, state: 'held' as const, gain: 0.5 }, { loopId: 3, state: 'open' as const }] }

  it('refuses a held loop without a gain, and one whose gain is no number, at its field', () => {
    for (const [gain, message] of [['', 'Type the gain'], ['a lot', '\'a lot\' is not a number']]) {
      const form = { ...loopForm(loop), loopStates: [{ loopId: 3, state: 'open' as const, gain: '' }, { loopId: 2, state: 'held' as const, gain: gain! }] }
      expect(() => readLoopForm(form)).toThrow(ApiError)
      expect(() => readLoopForm(form)).toThrow(expect.objectContaining({ path: 'loopStates[1].gain', message: expect.stringContaining(message!) }))
    }
  })

  it('gives back what it was made of', () => {
    const { code, name, axis, breakPoint, otherLoops, breakAt, loopStates, notes } = loop
    expect(readLoopForm(loopForm(loop))).toEqual({ code, name, axis, breakPoint, otherLoops, breakAt, loopStates, notes })
  })

  it('has no break point where no block is chosen', () => {
    expect(readLoopForm(loopForm(null))).toMatchObject({ breakAt: null, loopStates: [] })
  })

  it('is told in words beside what somebody else stored', () => {
    expect(loopFormInWords(loopForm(loop), new Map([[2, 'LU-R']]))).toMatchObject({ breakAt: 'input of C', loopStates: 'LU-R held at gain 0.5, a deleted loop open' })
  })
})
