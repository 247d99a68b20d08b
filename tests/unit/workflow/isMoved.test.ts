import { describe, expect, it } from 'vitest'
import { isMoved } from '#shared/workflow/isMoved'
import type { MarginsThere } from '#shared/types/structure'
import { buildAnalysis } from '../../factories/buildSnapshot'

const there = (change: Partial<MarginsThere> = {}): MarginsThere => {
  const { stability, summary, vectorMargin } = buildAnalysis()
  return { verdict: stability.verdict, summary, vectorMargin, failure: null, ...change }
}
const withSummary = (change: Partial<NonNullable<MarginsThere['summary']>>) => there({ summary: { ...there().summary!, ...change } })

describe('a loop is moved by a change', () => {
  it.each([
    ['when it had no analysis before', null, there()],
    ['when its verdict is another', there(), there({ verdict: 'unstable' })],
    ['when it can no longer be analysed', there(), there({ failure: 'The block G has no gain in the condition C4.' })],
    ['when a margin appears', there(), withSummary({ gainDecrease: -3 })],
    ['when a delay margin of microseconds differs in its sixth figure', withSummary({ delay: 1.00000e-6 }), withSummary({ delay: 1.00001e-6 })],
    ['when the vector margin differs though no other does', there(), there({ vectorMargin: { distance: 0.847, frequency: 158.2 } })],
    ['when it is not stable and -1 lies farther', there({ summary: null }), there({ summary: null, vectorMargin: { distance: 0.9, frequency: 158.2 } })],
  ])('%s', (_, before, after) => {
    expect(isMoved(before, after)).toBe(true)
  })

  it.each([
    ['nothing is known before and after', null, null],
    ['only rounding differs', there(), withSummary({ gainIncrease: 16.33 * (1 + 1e-13) })],
    ['the vector margin lies at another frequency of the same distance', there(), there({ vectorMargin: { distance: 0.846, frequency: 20 } })],
  ])('but not where %s', (_, before, after) => {
    expect(isMoved(before, after)).toBe(false)
  })
})
