import type { MaybeRefOrGetter } from 'vue'
import type { FrequencyUnit } from '#shared/types/analysis'
import type { MeasurementProblem } from '#shared/importers/MeasurementProblem'
import type { BlockDefinition } from '#shared/types/block'
import { readTypedGain } from '~/services/readTypedGain'
import type { TypedGain } from '~/services/TypedGain'
import type { TypedProblem } from '~/services/TypedSource'
import type { BlockLook } from '~/workers/blockLook'

interface LiveBlockFacts {
  name: string
  frequencyUnit: FrequencyUnit
  channel: { input: number, output: number }
  others: Record<string, BlockDefinition>
  /** values in the condition looked at */
  parameters: Record<string, number>
  parameterNames: string[]
}

interface Question {
  typed: TypedGain
  facts: LiveBlockFacts
}

interface Answer {
  look: BlockLook | null
  problems: TypedProblem[]
  faults: { message: string, position: number }[]
  rows: MeasurementProblem[]
}

const pause = 150

/**
 * What the engine says of a block's gain while it is typed, computed in the worker: `problems` by the path of their field, `faults` at their place in
 * the expression, `rows` by line of a measured file. The last good look stays in sight, marked as old, while what is typed cannot be read.
 */
export function useLiveBlock(typed: MaybeRefOrGetter<TypedGain | null>, facts: MaybeRefOrGetter<LiveBlockFacts | null>) {
  const engine = useEngine()
  const look = shallowRef<BlockLook | null>(null)
  const isOld = ref(false)
  let timer: ReturnType<typeof setTimeout> | undefined

  const { answer, failure, pending, ask } = useLatest<Question, Answer>(async ({ typed, facts }) => {
    const answer: Answer = { look: null, problems: [], faults: [], rows: [] }
    if (typed.kind === 'expression' && typed.expression.trim() !== '') {
      const blocks = [...Object.keys(facts.others), facts.name]
      answer.faults = (await engine().checkExpression(typed.expression, { variable: typed.sampled ? 'z' : 's', parameterNames: facts.parameterNames, blocks })).map(({ message, position }) => ({ message, position }))
    }
    const read = readTypedGain(typed)
    if ('problems' in read) answer.problems = read.problems
    else if (answer.faults.length === 0) {
      const others = neededBlocks(read.definition, facts.others)
      for (const definition of [read.definition, ...Object.values(others)]) await keepUploadOf(definition)
      const reply = await engine().lookAtBlock({ ...facts, others, definition: read.definition })
      if ('look' in reply) answer.look = reply.look
      else if ('problems' in reply) answer.rows = reply.problems
      else if (reply.failure.path === 'expression' && reply.failure.position !== undefined) answer.faults = [{ message: reply.failure.message, position: reply.failure.position }]
      else answer.problems = [{ path: reply.failure.path, message: reply.failure.message }]
    }
    return answer
  })

  /** Brings the file that a definition names into the worker, once. */
  async function keepUploadOf(definition: BlockDefinition): Promise<void> {
    if (definition.kind !== 'stateSpace' && definition.kind !== 'measured') return
    await keepUpload(definition.uploadId)
  }
  async function keepUpload(id: number): Promise<void> {
    if (id === 0 || await engine().hasUpload(id)) return
    const text = await $fetch<string>(`/api/uploads/${id}`, { responseType: 'text' })
    await engine().keepUpload(id, text)
  }

  watch(answer, (found) => {
    if (found?.look) look.value = found.look
    isOld.value = found?.look === null
  })

  function refresh(): void {
    const [gain, known] = [toValue(typed), toValue(facts)]
    if (gain === null || known === null) return
    // Plain copies: the worker takes no reactive objects.
    void ask(JSON.parse(JSON.stringify({ typed: gain, facts: known })) as Question)
  }
  watch([() => toValue(typed), () => toValue(facts)], () => {
    clearTimeout(timer)
    timer = setTimeout(refresh, pause)
  }, { deep: true, immediate: import.meta.client })
  onScopeDispose(() => clearTimeout(timer))

  return { answer, failure, pending, look, isOld, refresh, keepUpload }
}
