import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import type { BuildFault } from '#shared/analysis/blocks/findBuildFault'
import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
import { AppError } from '#shared/errors/AppError'
import type { AnalysisFailure, ExpressionInput } from '#shared/types/analysis'
import type { ExpressionDefinition } from '#shared/types/source'
import type { SystemRow } from '../../database/models/SystemRow'
import { runInPool } from '../../adapters/analysisPool/analysisPool'
import { ConditionRow } from '../../database/models/ConditionRow'
import { BlockGains } from '../blocks/BlockGains'
import { listBlocks } from '../blocks/listBlocks'
import { listParameters } from '../parameters/listParameters'
import { buildLoopInput } from './buildLoopInput'

/** An expression over the gains its blocks have in a condition: whether they can be put together as it says is asked. */
export interface BuildQuestion {
  definition: ExpressionDefinition
  conditionCode: string
  input: ExpressionInput
}

/** An expression in the first condition of each combination of kinds and sample times of its blocks; one in which something is missing is passed over. */
export async function buildQuestions(definition: ExpressionDefinition, system: SystemRow, conditionIds: readonly number[]): Promise<BuildQuestion[]> {
  const [parameters, blocks, conditions] = await Promise.all([
    listParameters(system.id), listBlocks(system.id), ConditionRow.findAll({ where: { systemId: system.id, id: [...conditionIds] }, attributes: ['id', 'code'], order: ['position', 'id'] }),
  ])
  const gains = new BlockGains(blocks, system)
  const questions = new Map<string, BuildQuestion>()
  for (const condition of conditions) {
    const facts = { systemId: system.id, frequencyUnit: system.frequencyUnit, condition, parameters, blocks: gains }
    const input = await buildLoopInput(definition, facts).catch(unlessMissing) as ExpressionInput | null
    if (input === null) continue
    const build = JSON.stringify(Object.entries(input.blocks ?? {}).map(([name, gain]) => [name, gain.kind, 'sampleTime' in gain ? gain.sampleTime : null]))
    if (!questions.has(build)) questions.set(build, { definition, conditionCode: condition.code, input })
  }
  return [...questions.values()]
}

/**
 * Refuses an expression whose blocks cannot be put together as it says: sampled and continuous parts without a hold, two rates in one loop, an algebraic loop
 * without a solution. The engine is asked, so never in a write transaction.
 */
export async function assertBuildable(questions: readonly BuildQuestion[]): Promise<void> {
  for (const { definition, conditionCode, input } of questions) {
    const fault = await askFault(input)
    // A block that cannot be taken at all is told where its loops are looked at; the expression is right until that is mended.
    if (fault === null || /^blocks\.\w+$/.test(fault.path)) continue
    throw new AppError('invalidInput', `${fault.message} (in the condition ${conditionCode})`, placeOf(fault, definition))
  }
}

function placeOf({ path, position }: BuildFault, { expression, deadTime = 0 }: ExpressionDefinition): { path: string, details?: { position: number } } {
  if (path !== 'expression') return { path: 'definition.expression', details: { position: placeOfBlock(expression, path) } }
  if (position === undefined) return { path: 'definition.expression' }
  // A dead time beside it stands behind the expression, which is put in brackets: see loopInputFromDefinition.
  const typed = deadTime === 0 ? position : Math.max(0, position - 1)
  return typed >= expression.length ? { path: 'definition.deadTime' } : { path: 'definition.expression', details: { position: typed } }
}

/** In a thread of its own: the matrices of a large block take their time. One that broke off is no fault of the input. */
async function askFault(input: ExpressionInput): Promise<BuildFault | null> {
  const answer = await runInPool('buildFault', input) as BuildFault | AnalysisFailure | null
  return answer === null || 'error' in answer ? null : answer
}

/** Where the block of a path as in 'blocks.G.sampleTime' is named; the start where only another block names it. */
const placeOfBlock = (expression: string, path: string) => namesInExpression(expression).find(({ name }) => name === path.split('.')[1])?.position ?? 0

function unlessMissing(error: unknown): null {
  if (error instanceof AnalysisInputError) return null
  throw error
}
