import { defineStore } from 'pinia'

export interface Toast {
  id: number
  text: string
  kind: 'said' | 'failed'
  /** takes back what was just done */
  undo: (() => Promise<void>) | null
}

const shownFor = 8000
/** longer, since an undo must be reached by keyboard too */
const undoShownFor = 20000

/** Short messages at the foot of the screen, with an undo where what was done can be undone. */
export const useToastStore = defineStore('toasts', () => {
  const toasts = ref<Toast[]>([])
  let count = 0

  function show(text: string, options: { kind?: Toast['kind'], undo?: () => Promise<void> } = {}): void {
    const toast: Toast = { id: ++count, text, kind: options.kind ?? 'said', undo: options.undo ?? null }
    toasts.value = [...toasts.value.slice(-3), toast]
    setTimeout(dismiss, toast.undo === null ? shownFor : undoShownFor, toast.id)
  }

  function dismiss(id: number): void {
    toasts.value = toasts.value.filter(toast => toast.id !== id)
  }

  /** Shows why something failed. */
  function fail(error: unknown): void {
    show(error instanceof Error ? error.message : String(error), { kind: 'failed' })
  }

  async function undo(toast: Toast): Promise<void> {
    dismiss(toast.id)
    try {
      await toast.undo?.()
    }
    catch (error) {
      fail(error)
    }
  }

  return { toasts, show, fail, dismiss, undo }
})
