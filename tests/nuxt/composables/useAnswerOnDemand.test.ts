import { flushPromises } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import { effectScope, ref, shallowRef } from 'vue'
import { useAnswerOnDemand } from '~/composables/useAnswerOnDemand'

function ask(answerOf: (question: string) => Promise<string>, first: string | null = 'a', wantedAtFirst = false) {
  const question = shallowRef<string | null>(first)
  const wanted = ref(wantedAtFirst)
  const scope = effectScope()
  const found = scope.run(() => useAnswerOnDemand(question, wanted, answerOf))!
  return { question, wanted, scope, ...found }
}

describe('an answer on demand', () => {
  it('is asked for only when somebody wants it, and once', async () => {
    const asked: string[] = []
    const { wanted, answer, scope } = ask(async (question) => {
      asked.push(question)
      return question.toUpperCase()
    })
    await flushPromises()
    expect(asked).toEqual([])
    wanted.value = true
    await flushPromises()
    wanted.value = false
    await flushPromises()
    wanted.value = true
    await flushPromises()
    expect([asked, answer.value]).toEqual([['a'], 'A'])
    scope.stop()
  })

  it('never shows the answer to a question that was overtaken', async () => {
    const replies = new Map<string, (value: string) => void>()
    const { question, answer, busy, scope } = ask(question => new Promise(resolve => replies.set(question, resolve)), 'a', true)
    await flushPromises()
    question.value = 'b'
    await flushPromises()
    replies.get('b')!('B')
    await flushPromises()
    replies.get('a')!('A')
    await flushPromises()
    expect([answer.value, busy.value]).toEqual(['B', false])
    scope.stop()
  })

  it('tells a failure in words, and asks again for the next question', async () => {
    const { question, answer, problem, busy, scope } = ask(async (question) => {
      if (question === 'a') throw new Error('no poles')
      return question
    }, 'a', true)
    await flushPromises()
    expect([answer.value, problem.value, busy.value]).toEqual([null, 'no poles', false])
    question.value = 'b'
    await flushPromises()
    expect([answer.value, problem.value]).toEqual(['b', null])
    scope.stop()
  })
})
