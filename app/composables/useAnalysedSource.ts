import type { MaybeRefOrGetter, Ref } from 'vue'
import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import type { LoopFigureData } from '#shared/plots/FigureData'
import type { Criterion } from '#shared/types/criterion'
import type { AnalysedSource, Source } from '#shared/types/source'
import type { DrawnCurve, DrawRequest } from '~/workers/drawCurves'

interface Options {
  source: Ref<Source | null>
  read: (sourceId: number, signal: AbortSignal) => Promise<AnalysedSource>
  title: MaybeRefOrGetter<string>
  /** name of the curve */
  name: MaybeRefOrGetter<string>
  criteria: MaybeRefOrGetter<readonly Criterion[]>
  required: MaybeRefOrGetter<number | null>
  /** other sources to be drawn in the same figures */
  beside?: MaybeRefOrGetter<readonly DrawnCurve[]>
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
      if (!mine.signal.aborted) analysed.value = found
    }
    catch (error) {
      if (!mine.signal.aborted) problem.value = error instanceof Error ? error.message : String(error)
    }
  }

  /** What the figures show: null while nothing is analysed. */
  const wanted = computed((): DrawRequest | null => {
    const { input, analysis } = analysed.value ?? { input: null, analysis: null }
    if (input === null || analysis === null) return null
    return {
      title: toValue(options.title),
      requiredVectorMargin: toValue(options.required),
      curves: [{ name: toValue(options.name), input, analysis }, ...toValue(options.beside) ?? []],
    }
  })

  /** The figures as they are stay in sight until those with other curves are drawn. */
  async function draw(request: DrawRequest | null): Promise<void> {
    if (request === null) return
    const isNewest = () => wanted.value === request
    try {
      const drawn = await engine().draw(request)
      if (isNewest()) figures.value = drawn
    }
    catch (error) {
      if (isNewest()) problem.value = error instanceof Error ? error.message : String(error)
    }
  }

  if (import.meta.client) {
    watch(() => options.source.value === null ? null : `${options.source.value.id}/${options.source.value.version}`, () => void show(options.source.value), { immediate: true })
    watch(wanted, request => void draw(request), { immediate: true })
    onScopeDispose(() => reading?.abort())
  }

  return { analysed, judgement, figures, problem }
}
