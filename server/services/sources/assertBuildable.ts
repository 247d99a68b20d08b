import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { lowerExpression } from '#shared/analysis/expressions/lowerExpression'
import { AppError } from '#shared/errors/AppError'
import type { ExpressionInput } from '#shared/types/analysis'
import type { ExpressionDefinition } from '#shared/types/source'
import type { SystemRow } from '../../database/models/SystemRow'
import { ConditionRow } from '../../database/models/ConditionRow'
import { BlockGains } from '../blocks/BlockGains'
import { listBlocks } from '../blocks/listBlocks'
import { listParameters } from '../parameters/listParameters'
import { buildLoopInput } from './buildLoopInput'

/**
 * Refuses an expression whose blocks cannot be put together as it says: sampled and continuous parts without a hold, two rates in one loop, an algebraic loop
 * without a solution. Tried in the first condition of each combination of kinds and sample times; one in which something is missing is passed over.
 */
export async function assertBuildable(definition: ExpressionDefinition, system: SystemRow, conditionIds: readonly number[]): Promise<void> {
  const [parameters, blocks, conditions] = await Promise.all([
    listParameters(system.id), listBlocks(system.id), ConditionRow.findAll({ where: { systemId: system.id, id: [...conditionIds] }, attributes: ['id', 'code'], order: ['position', 'id'] }),
  ])
  const gains = new BlockGains(blocks, system)
  const tried = new Set<string>()
  for (const condition of conditions) {
    const facts = { systemId: system.id, frequencyUnit: system.frequencyUnit, condition, parameters, blocks: gains }
    const input = await buildLoopInput({ ...definition, deadTime: undefined }, facts).catch(unlessMissing) as ExpressionInput | null
    if (input === null) continue
    const build = JSON.stringify(Object.entries(input.blocks ?? {}).map(([name, gain]) => [name, gain.kind, 'sampleTime' in gain ? gain.sampleTime : null]))
    if (tried.has(build)) continue
    tried.add(build)
    try {
      lowerExpression(input)
    }
    catch (error) {
      // What is wrong in a block is told where that is looked at; the expression is right until it is mended.
      if (!(error instanceof AnalysisInputError)) throw error
      if (error.path !== 'expression') continue
      const { message, position } = error
      throw new AppError('invalidInput', `${message} (in the condition ${condition.code})`, { path: 'definition.expression', ...(position !== undefined && { details: { position } }), cause: error })
    }
  }
}

function unlessMissing(error: unknown): null {
  if (error instanceof AnalysisInputError) return null
  throw error
}
