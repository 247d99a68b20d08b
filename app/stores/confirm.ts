import { defineStore } from 'pinia'

export interface Question {
  title: string
  text: string
  /** words of the button that goes ahead */
  yes: string
  no?: string
  danger?: boolean
}

/** One question at a time to the person at the screen; BaseConfirm shows it. */
export const useConfirmStore = defineStore('confirm', () => {
  const question = ref<Question | null>(null)
  let settle: ((answer: boolean) => void) | null = null

  /** Resolves to whether the person went ahead; a question still open is answered with no. */
  function ask(next: Question): Promise<boolean> {
    settle?.(false)
    question.value = next
    return new Promise((resolve) => {
      settle = resolve
    })
  }

  function answer(yes: boolean): void {
    question.value = null
    settle?.(yes)
    settle = null
  }

  return { question, ask, answer }
})
