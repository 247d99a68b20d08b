import { describe, expect, it } from 'vitest'
import { blocksUsed } from '~/utils/blocksUsed'
import { missingGains } from '~/utils/missingGains'
import { buildBlock } from '../builders/buildBlock'

describe('a block without a gain in the condition looked at', () => {
  it('is told where the expression names it, or the block that needs it', () => {
    const blocks = [
      buildBlock('G', { kind: 'expression', expression: '1/(s + P)' }),
      buildBlock('P', null, { byCondition: { 1: { kind: 'expression', expression: '1' } } }),
      buildBlock('H', null),
    ]
    const expression = '2*G/(1 + H)'
    expect(missingGains(expression, blocksUsed(expression, blocks, 2), 'Heavy')).toEqual([
      { message: 'The block P, which G needs, has no gain in Heavy. Give it one there.', position: 2 },
      { message: 'The block H has no gain in Heavy. Give it one there.', position: 9 },
    ])
    expect(missingGains('G', blocksUsed('G', blocks, 1), 'Nominal')).toEqual([])
  })
})
