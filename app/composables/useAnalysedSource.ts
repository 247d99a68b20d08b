import type { MaybeRefOrGetter, Ref } from 'vue'
import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import type { LoopFigureData } from '#shared/plots/FigureData'
import type { Criterion } from '#shared/types/criterion'
import type { AnalysedSource, Source } from '#shared/types/source'

interface Options {
  source: Ref<Source | null>
  read: (sourceId: number, signal: AbortSignal) => Promise<AnalysedSource>
  title: MaybeRefOrGetter<string>
  /** name of the curve */
  name: MaybeRefOrGetter<string>
  criteria: MaybeRefOrGetter<readonly Criterion[]>
  required: MaybeRefOrGetter<number | null>
}

/** A stored source with its analysis, how that stands to the criteria, and its figures, sampled in the worker. */
export function useAnalysedSource(options: Options) {
  const engine = useEngine()
  const analysed = shallowRef<AnalysedSource | null>(null)
  const figures = shallowRef<LoopFigureData | null>(null)
  const problem = ref<string | null>(null)
  let reading: AbortController | null = null

  const judgement = computed(() => analysed.value === null ? null : judgeAnalysis(analysed.value.analysis, toValue(options.criteria)))

  async function show(source: Source | null): Promise<void> {
    reading?.abort()
    const mine = reading = new AbortController()
    analysed.value = null
    figures.value = null
    problem.value = null
    if (source === null) return
    try {
      const found = await options.read(source.id, mine.signal)
      if (mine.signal.aborted) return
      analysed.value = found
      if (found.input === null || found.analysis === null) return
      const drawn = await engine().draw({
        title: toValue(options.title),
        requiredVectorMargin: toValue(options.required),
        curves: [{ name: toValue(options.name), input: found.input, analysis: found.analysis }],
      })
      if (!mine.signal.aborted) figures.value = drawn
    }
    catch (error) {
      if (!mine.signal.aborted) problem.value = error instanceof Error ? error.message : String(error)
    }
  }

  if (import.meta.client) {
    watch(() => options.source.value === null ? null : `${options.source.value.id}/${options.source.value.version}`, () => void show(options.source.value), { immediate: true })
    onScopeDispose(() => reading?.abort())
  }

  return { analysed, judgement, figures, problem }
}
