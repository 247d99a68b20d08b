import type { MaybeRefOrGetter } from 'vue'
import type { MeasurementPreview } from '#shared/importers/previewMeasurement'
import type { MeasurementProblem } from '#shared/importers/MeasurementProblem'
import type { FrequencyUnit } from '#shared/types/analysis'
import type { BlockGain } from '#shared/types/block'
import type { Criterion } from '#shared/types/criterion'
import { readTypedSource, type TypedProblem, type TypedSource } from '~/services/TypedSource'
import type { AnalysisFailed, LiveAnalysis } from '~/workers/engine'

interface LiveFacts {
  title: string
  frequencyUnit: FrequencyUnit
  /** values in the condition that is looked at, as typed */
  parameters: Record<string, number>
  parameterNames: string[]
  blockNames: string[]
  /** faults of blocks that have no gain in that condition */
  missingGains: { message: string, position: number }[]
  criteria: Criterion[]
}

interface Question {
  typed: TypedSource
  facts: LiveFacts
}

interface Answer {
  result: LiveAnalysis | null
  problems: TypedProblem[]
  faults: { message: string, position: number }[]
  rows: MeasurementProblem[]
}

const pause = 120

/**
 * What the engine says of a source while it is typed, computed in the worker. `problems` are told at the field of their path,
 * `faults` at their place in the expression, `rows` by line of the measured file. The last good result stays in sight,
 * marked as old, while what is typed cannot be analysed.
 *
 * @param gains of the blocks in the condition looked at; they may be large, so they go to the worker once and not with every letter typed
 */
export function useLiveSource(typed: MaybeRefOrGetter<TypedSource>, facts: MaybeRefOrGetter<LiveFacts | null>, gains: MaybeRefOrGetter<Record<string, BlockGain>>) {
  const engine = useEngine()
  const preview = shallowRef<MeasurementPreview | null>(null)
  const result = shallowRef<LiveAnalysis | null>(null)
  const isOld = ref(false)
  /** the gains that the worker has */
  let given: Record<string, BlockGain> | null = null
  let timer: ReturnType<typeof setTimeout> | undefined

  const { answer, failure, pending, ask } = useLatest<Question, Answer>(async ({ typed, facts }) => {
    const answer: Answer = { result: null, problems: [], faults: [], rows: [] }
    const blocks = toValue(gains)
    if (blocks !== given) await engine().takeBlocks(toRaw(blocks))
    given = blocks
    if (typed.kind === 'expression' && typed.expression.trim() !== '') {
      const { parameterNames, blockNames } = facts
      answer.faults = (await engine().checkExpression(typed.expression, { variable: typed.sampled ? 'z' : 's', parameterNames, ...blockNames.length > 0 && { blocks: blockNames } }))
        .map(({ message, position }) => ({ message, position }))
      if (answer.faults.length === 0) answer.faults = facts.missingGains
    }
    const read = readTypedSource(typed)
    if ('problems' in read) answer.problems = read.problems
    else if (answer.faults.length === 0) {
      const request = { title: facts.title, name: typed.name.trim() || 'as typed', facts: { frequencyUnit: facts.frequencyUnit, parameters: facts.parameters }, criteria: facts.criteria }
      const { definition } = read
      if (definition.kind !== 'measured') take(await engine().analyse({ ...request, definition }), answer)
      else if (preview.value !== null) take(await engine().analyseFile({ ...request, definition }), answer)
    }
    return answer
  })

  function take(reply: LiveAnalysis | AnalysisFailed | { problems: MeasurementProblem[] }, answer: Answer): void {
    if ('problems' in reply) answer.rows = reply.problems
    else if ('analysis' in reply) answer.result = reply
    else if (reply.failure.path === 'expression' && reply.failure.position !== undefined) answer.faults = [{ message: reply.failure.message, position: reply.failure.position }]
    else answer.problems = [{ path: reply.failure.path, message: reply.failure.message }]
  }

  watch(answer, (found) => {
    if (found?.result) result.value = found.result
    isOld.value = found?.result === null
  })

  function refresh(): void {
    const known = toValue(facts)
    if (known === null) return
    // Plain copies: the worker takes no reactive objects.
    void ask(JSON.parse(JSON.stringify({ typed: toValue(typed), facts: known })) as Question)
  }

  function refreshSoon(): void {
    clearTimeout(timer)
    timer = setTimeout(refresh, pause)
  }
  watch([() => toValue(typed), () => toValue(facts)], refreshSoon, { deep: true })
  watch(() => toValue(gains), refreshSoon)
  onMounted(refresh)
  onScopeDispose(() => clearTimeout(timer))

  /** Opens a measured file in the worker; the preview carries a first guess of its columns. */
  async function openFile(file: Blob): Promise<MeasurementPreview> {
    const found = await engine().openFile(file)
    preview.value = found
    refresh()
    return found
  }

  /** The message for a field; entries such as 'zeros[2]' belong to the field 'zeros'. */
  const problemAt = (path: string) => answer.value?.problems.find(problem => problem.path === path || problem.path.startsWith(`${path}[`))?.message

  return { answer, failure, pending, result, isOld, preview, openFile, problemAt }
}
