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
  let cleared = 0

  async function ask(question: Question): Promise<void> {
    waiting = { question }
    pending.value = true
    if (running) return
    running = true
    while (waiting !== null) {
      const current: { question: Question } = waiting
      const asked = cleared
      waiting = null
      try {
        const found = await work(current.question)
        if (waiting === null && asked === cleared) {
          answer.value = found
          failure.value = null
        }
      }
      catch (error) {
        if (waiting === null && asked === cleared) failure.value = error
      }
    }
    running = false
    pending.value = false
  }

  /** Forgets the answer, what waits and what is under way. */
  function clear(): void {
    cleared += 1
    waiting = null
    answer.value = null
    failure.value = null
  }

  return { answer, failure, pending, ask, clear }
}
