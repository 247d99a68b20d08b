import { describe, expect, it } from 'vitest'
import { useLatest } from '~/composables/useLatest'

/** Work that ends when it is told to. */
function held() {
  const ends: ((value: string) => void)[] = []
  const fails: ((reason: Error) => void)[] = []
  const asked: string[] = []
  const work = (question: string) => new Promise<string>((resolve, reject) => {
    asked.push(question)
    ends.push(resolve)
    fails.push(reject)
  })
  return { work, ends, fails, asked }
}
const settle = () => new Promise(resolve => setTimeout(resolve))

describe('the newest answer', () => {
  it('drops what was asked between, and never shows an answer that was overtaken', async () => {
    const { work, ends, asked } = held()
    const latest = useLatest(work)
    void latest.ask('k')
    void latest.ask('k/')
    void latest.ask('k/s')
    ends[0]!('answer to k')
    await settle()
    expect(latest.answer.value).toBeNull()
    expect(latest.pending.value).toBe(true)
    ends[1]!('answer to k/s')
    await settle()
    expect(asked).toEqual(['k', 'k/s'])
    expect(latest.answer.value).toBe('answer to k/s')
    expect(latest.pending.value).toBe(false)
  })

  it('keeps the last answer beside a failure, and forgets the failure with the next answer', async () => {
    const { work, ends, fails } = held()
    const latest = useLatest(work)
    void latest.ask('a')
    ends[0]!('A')
    await settle()
    void latest.ask('b')
    fails[1]!(new Error('broken'))
    await settle()
    expect(latest.answer.value).toBe('A')
    expect(latest.failure.value).toEqual(new Error('broken'))
    void latest.ask('c')
    ends[2]!('C')
    await settle()
    expect(latest.failure.value).toBeNull()
  })
})
