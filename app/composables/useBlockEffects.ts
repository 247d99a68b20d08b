import type { MaybeRefOrGetter } from 'vue'
import { ApiError } from '~/services/ApiError'
import { blocksClient, type BlockDraft } from '~/services/blocksClient'

const pause = 600

/** What the draft of a block would move, asked of the server while one types; nothing is stored by it. Null stands for nothing to ask. */
export function useBlockEffects(systemId: number, draft: MaybeRefOrGetter<BlockDraft | null>) {
  let timer: ReturnType<typeof setTimeout> | undefined
  // By its text: the draft is put together anew at every key.
  const text = computed(() => JSON.stringify(toValue(draft)))
  const { answer, failure, pending, ask } = useLatest(async (question: string) => ({ question, effects: await blocksClient.effects(systemId, JSON.parse(question) as BlockDraft) }))
  /** the draft last asked about: what was refused of it is not said of another */
  const asked = ref('')

  watch(text, (question) => {
    clearTimeout(timer)
    if (question !== 'null') {
      timer = setTimeout(() => {
        asked.value = question
        void ask(question)
      }, pause)
    }
  }, { immediate: import.meta.client })
  onScopeDispose(() => clearTimeout(timer))

  return {
    effects: computed(() => answer.value?.effects ?? null),
    /** they are those of an earlier draft */
    isOld: computed(() => answer.value?.question !== text.value),
    refusal: computed(() => failure.value === null || asked.value !== text.value ? null : ApiError.from(failure.value)),
    /** there is a draft that can be asked about */
    isAsked: computed(() => text.value !== 'null'),
    pending,
  }
}
