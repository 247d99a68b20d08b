/**
 * Runs `work` for the newest question only: while one is under way the next waits, questions between are dropped, and an answer
 * that was overtaken is never shown. `pending` is true while the answer shown is not the newest asked for.
 */
export function useLatest<Question, Answer>(work: (question: Question) => Promise<Answer>) {
  const answer = shallowRef<Answer | null>(null)
  const failure = shallowRef<unknown>(null)
  const pending = ref(false)
  let running = false
  let waiting: { question: Question } | null = null

  async function ask(question: Question): Promise<void> {
    waiting = { question }
    pending.value = true
    if (running) return
    running = true
    while (waiting !== null) {
      const current: { question: Question } = waiting
      waiting = null
      try {
        const found = await work(current.question)
        if (waiting === null) {
          answer.value = found
          failure.value = null
        }
      }
      catch (error) {
        if (waiting === null) failure.value = error
      }
    }
    running = false
    pending.value = false
  }

  return { answer, failure, pending, ask }
}
