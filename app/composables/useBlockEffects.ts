import type { MaybeRefOrGetter } from 'vue'
import type { BlockEffect } from '#shared/types/structure'
import { ApiError } from '~/services/ApiError'
import { blocksClient, type BlockDraft } from '~/services/blocksClient'

const pause = 600

/** What the draft of a block would move, asked of the server while one types; nothing is stored by it. Null stands for nothing to ask. */
export function useBlockEffects(systemId: number, draft: MaybeRefOrGetter<BlockDraft | null>) {
  let timer: ReturnType<typeof setTimeout> | undefined
  const { answer, failure, pending, ask } = useLatest<BlockDraft, BlockEffect[]>(question => blocksClient.effects(systemId, question))
  const isOld = ref(false)

  // By its text: the draft is put together anew at every key.
  watch(() => JSON.stringify(toValue(draft)), (text) => {
    clearTimeout(timer)
    isOld.value = true
    const question = JSON.parse(text) as BlockDraft | null
    if (question === null) return
    timer = setTimeout(async () => {
      await ask(question)
      isOld.value = false
    }, pause)
  }, { immediate: import.meta.client })
  onScopeDispose(() => clearTimeout(timer))

  const refusal = computed(() => failure.value === null ? null : ApiError.from(failure.value))
  return { effects: answer, refusal, pending, isOld }
}
