import type { Ref } from 'vue'
import type { Source } from '#shared/types/source'
import { loopsClient, type ComparedSources } from '~/services/loopsClient'

interface Options {
  loopId: number
  conditionId: Ref<number | null>
  /** those of the condition; they are compared where there are several */
  sources: Ref<readonly Source[]>
}

/** All sources of a loop in the condition looked at, with how far each lies from the one of record; read again whenever one of them changes. */
export function useComparedSources({ loopId, conditionId, sources }: Options) {
  const compared = shallowRef<ComparedSources | null>(null)
  const problem = ref<string | null>(null)
  let reading: AbortController | null = null

  async function read(): Promise<void> {
    reading?.abort()
    const mine = reading = new AbortController()
    compared.value = null
    problem.value = null
    if (conditionId.value === null || sources.value.length < 2) return
    try {
      const found = await loopsClient.compareSources(loopId, conditionId.value, mine.signal)
      if (!mine.signal.aborted) compared.value = found
    }
    catch (error) {
      if (!mine.signal.aborted) problem.value = error instanceof Error ? error.message : String(error)
    }
  }

  if (import.meta.client) {
    watch(() => [conditionId.value, ...sources.value.map(({ id, version, ofRecord }) => `${id}/${version}/${ofRecord}`)].join(' '), () => void read(), { immediate: true })
    onScopeDispose(() => reading?.abort())
  }

  return { compared, problem, read }
}
