import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
import { parseExpression } from '#shared/analysis/expressions/parseExpression'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import { AppError } from '#shared/errors/AppError'
import { loopInputFromDefinition } from '#shared/sources/loopInputFromDefinition'
import type { ExpressionDefinition, SourceDefinition } from '#shared/types/source'
import type { SystemRow } from '../../database/models/SystemRow'
import { BlockRow } from '../../database/models/BlockRow'
import { ParameterRow } from '../../database/models/ParameterRow'
import { readPoints } from '../uploads/readPoints'
import { assertBuildable, buildQuestions, type BuildQuestion } from './assertBuildable'
import { naming } from './naming'

/**
 * Refuses a definition that could not be analysed in any condition: an expression that does not parse or names what nobody knows, numbers the engine does
 * not take, a file with bad rows (each told by its line). An expression over blocks is refused, too, where the gains of these blocks cannot be put together as it
 * says in one of `conditionIds`. What only a condition lacks, such as a parameter's value or a block's gain, is no reason to refuse.
 */
export async function assertDefinition(definition: SourceDefinition, system: SystemRow, conditionIds: readonly number[]): Promise<void> {
  await assertBuildable(await assertReadable(definition, system, conditionIds))
}

/** The same without the engine: what it is still to be asked of an expression over blocks is answered. */
export async function assertReadable(definition: SourceDefinition, system: SystemRow, conditionIds: readonly number[]): Promise<BuildQuestion[]> {
  const { frequencyUnit } = system
  if (definition.kind === 'measured') {
    const { points, problems } = await readPoints(system.id, definition.uploadId, definition.mapping)
    if (problems.length > 0) throw new AppError('refused', 'The file cannot be read like this; nothing was stored.', { path: 'definition.mapping', details: { problems } })
    naming(() => readLoopInput(loopInputFromDefinition(definition, { frequencyUnit, parameters: {}, points })))
    return []
  }
  if (definition.kind === 'expression') return readableExpression(definition, system, conditionIds)
  naming(() => readLoopInput(loopInputFromDefinition(definition, { frequencyUnit, parameters: {} })))
  return []
}

async function readableExpression(definition: ExpressionDefinition, system: SystemRow, conditionIds: readonly number[]): Promise<BuildQuestion[]> {
  const { expression, sampleTime } = definition
  const namesOf = async (model: typeof ParameterRow | typeof BlockRow) => (await (model as typeof ParameterRow).findAll({ where: { systemId: system.id }, attributes: ['name'] })).map(row => row.name)
  const [parameterNames, blockNames] = [await namesOf(ParameterRow), await namesOf(BlockRow)]
  // Over blocks the words of faults and the variables are others: only where it may name one.
  const isOverBlocks = blockNames.length > 0 && namesInExpression(expression).some(({ name }) => !parameterNames.includes(name))
  naming(() => parseExpression(expression, { variable: sampleTime === undefined ? 's' : 'z', parameterNames, ...(isOverBlocks && { blocks: blockNames }) }))
  naming(() => readLoopInput(loopInputFromDefinition(definition, { frequencyUnit: system.frequencyUnit, parameters: {} })))
  return isOverBlocks ? buildQuestions(definition, system, conditionIds) : []
}
