import type { Ref } from 'vue'

/**
 * An answer that is computed only when somebody wants to see it: while `wanted` is true, and again whenever the question changes meanwhile.
 * An answer to a question that was overtaken is never shown.
 */
export function useAnswerOnDemand<Question, Answer>(question: Ref<Question | null>, wanted: Ref<boolean>, answerOf: (question: Question) => Promise<Answer>) {
  const answer = shallowRef<Answer | null>(null)
  const problem = ref<string | null>(null)
  const busy = ref(false)
  let asked: Question | null = null

  async function ask(current: Question): Promise<void> {
    asked = current
    answer.value = null
    problem.value = null
    busy.value = true
    try {
      const found = await answerOf(current)
      if (asked === current) answer.value = found
    }
    catch (error) {
      if (asked === current) problem.value = error instanceof Error ? error.message : String(error)
    }
    if (asked === current) busy.value = false
  }

  watch([question, wanted], ([current, isWanted]) => {
    if (current !== asked) {
      asked = null
      answer.value = null
      problem.value = null
      busy.value = false
    }
    if (isWanted && current !== null && current !== asked) void ask(current)
  }, { immediate: true })

  return { answer, problem, busy }
}
