import { describe, expect, it } from 'vitest'
import { newLoopSchema } from '#shared/schemas/loop'
import { newReportSchema, reportChangeSchema } from '#shared/schemas/report'

const loop = (name: string, notes = '') => newLoopSchema.safeParse({ code: 'SL-P', name, notes }).success

describe('texts that are printed', () => {
  it('hold no control characters: a figure with one is no XML, and a null byte ends a statement', () => {
    expect(['a\u0000b', 'a\u0001b', 'a\u001Bb', 'a\u007Fb', 'a\nb', 'a\tb'].map(name => loop(name))).toEqual(Array(6).fill(false))
    expect(newReportSchema.safeParse({ title: 'T', documentNumber: 'D\u0007' }).success).toBe(false)
  })

  it('hold no half of a surrogate pair, which no file can carry', () => {
    expect([loop('a\uD83D'), loop('a', '\uDE00 b'), loop('\u{1F600} \u00C5\u4E2D')]).toEqual([false, false, true])
  })

  it('may run over lines where they are longer than a line', () => {
    expect([loop('a', 'one\r\ntwo\tthree'), loop('a', 'one\u0000'), loop('a', 'one\u0008')]).toEqual([true, false, false])
    expect(reportChangeSchema.safeParse({ version: 1, remarks: '# a\n\n- b\u0000' }).success).toBe(false)
  })
})
