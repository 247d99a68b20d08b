import { describe, expect, it } from 'vitest'
import { nextRevisionLetter } from '#shared/workflow/revisionLetters'

describe('nextRevisionLetter', () => {
  it('refuses what is no letter of ASME Y14.35', () => {
    for (const letter of ['', 'I', 'O', 'Q', 'S', 'X', 'Z', 'a', 'A1']) expect(() => nextRevisionLetter(letter), letter).toThrow(RangeError)
  })

  it('begins with A', () => {
    expect(nextRevisionLetter(null)).toBe('A')
  })

  it('goes A B C D E F G H J K L M N P R T U V W Y AA AB (ASME Y14.35, without I, O, Q, S, X, Z)', () => {
    const order = ['A', 'B', 'C', 'D', 'E', 'F', 'G', 'H', 'J', 'K', 'L', 'M', 'N', 'P', 'R', 'T', 'U', 'V', 'W', 'Y', 'AA', 'AB']
    order.slice(1).forEach((letter, index) => expect(nextRevisionLetter(order[index] ?? null)).toBe(letter))
  })

  it('carries over: AY is followed by BA and YY by AAA', () => {
    expect([nextRevisionLetter('AY'), nextRevisionLetter('YY')]).toEqual(['BA', 'AAA'])
  })
})
