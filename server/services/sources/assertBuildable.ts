import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { measuredInputOf } from '#shared/analysis/blocks/measuredInputOf'
import { lowerExpression } from '#shared/analysis/expressions/lowerExpression'
import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
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
      if (measuredInputOf(input) === null) lowerExpression(input)
    }
    catch (error) {
      if (!(error instanceof AnalysisInputError)) throw error
      // A block that cannot be taken at all is told where its loops are looked at; the expression is right until that is mended.
      if (/^blocks\.\w+$/.test(error.path)) continue
      const position = error.path === 'expression' ? error.position : placeOfBlock(definition.expression, error.path)
      throw new AppError('invalidInput', `${error.message} (in the condition ${condition.code})`, { path: 'definition.expression', ...(position !== undefined && { details: { position } }), cause: error })
    }
  }
}

/** Where the block of a path as in 'blocks.G.sampleTime' is named; the start where only another block names it. */
const placeOfBlock = (expression: string, path: string) => namesInExpression(expression).find(({ name }) => name === path.split('.')[1])?.position ?? 0

function unlessMissing(error: unknown): null {
  if (error instanceof AnalysisInputError) return null
  throw error
}
