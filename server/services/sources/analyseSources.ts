import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { AppError } from '#shared/errors/AppError'
import type { LoopInput } from '#shared/types/analysis'
import type { Block } from '#shared/types/block'
import type { AnalysedSource } from '#shared/types/source'
import type { System } from '#shared/types/system'
import { ConditionRow } from '../../database/models/ConditionRow'
import type { SourceRow } from '../../database/models/SourceRow'
import { presentSource } from '../../presenters/presentSource'
import { analyseInputs } from '../analyses/analyseInputs'
import { BlockGains } from '../blocks/BlockGains'
import { listBlocks } from '../blocks/listBlocks'
import type { OpenContext } from '../context'
import { listParameters } from '../parameters/listParameters'
import { buildLoopInput } from './buildLoopInput'

type Built = { input: LoopInput } | { failure: { message: string, path: string } }

interface AnalysisOptions {
  /** in the place of those stored. @default the blocks of the system */
  blocks?: Block[]
  /** whether new answers are kept in the database. @default true */
  keep?: boolean
}

/** Sources of one system with what the engine was handed and what it said of each, in their order. */
export async function analyseSources(sources: SourceRow[], system: Pick<System, 'id' | 'frequencyUnit'>, context: OpenContext, { blocks: drafted, keep = true }: AnalysisOptions = {}): Promise<AnalysedSource[]> {
  const [parameters, blocks, conditions] = await Promise.all([
    listParameters(system.id),
    drafted ?? listBlocks(system.id),
    ConditionRow.findAll({ where: { id: [...new Set(sources.map(source => source.conditionId))] }, attributes: ['id', 'code'] }),
  ])
  const codes = new Map(conditions.map(condition => [condition.id, condition.code]))
  const gains = new BlockGains(blocks, system)
  const built = await Promise.all(sources.map(({ definition, conditionId }): Promise<Built> => {
    const facts = { systemId: system.id, frequencyUnit: system.frequencyUnit, condition: { id: conditionId, code: codes.get(conditionId) ?? '' }, parameters, blocks: gains }
    return buildLoopInput(definition, facts).then(input => ({ input }), (error: unknown) => ({ failure: failureOf(error) }))
  }))
  const inputs = built.flatMap(entry => 'input' in entry ? [entry.input] : [])
  const results = await analyseInputs(inputs, context, { keep })
  return sources.map((row, index) => {
    const source = presentSource(row)
    const entry = built[index] as Built
    if ('failure' in entry) return { source, input: null, analysis: null, failure: entry.failure }
    const result = results[inputs.indexOf(entry.input)]
    if (result === undefined) throw new Error('The engine answered fewer inputs than it was asked.')
    if ('error' in result) return { source, input: entry.input, analysis: null, failure: { message: result.error.message, path: result.error.path } }
    return { source, input: entry.input, analysis: result, failure: null }
  })
}

/** What a person is told; a fault of the program is none of it and goes on. */
function failureOf(error: unknown): { message: string, path: string } {
  if (error instanceof AnalysisInputError) return { message: error.message, path: error.path }
  if (error instanceof AppError) return { message: error.message, path: error.path ?? '' }
  throw error
}
