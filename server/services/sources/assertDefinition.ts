import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { parseExpression } from '#shared/analysis/expressions/parseExpression'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import { AppError } from '#shared/errors/AppError'
import { loopInputFromDefinition } from '#shared/sources/loopInputFromDefinition'
import type { SourceDefinition } from '#shared/types/source'
import type { SystemRow } from '../../database/models/SystemRow'
import { ParameterRow } from '../../database/models/ParameterRow'
import { readPoints } from '../uploads/readPoints'

/**
 * Refuses a definition that could not be analysed in any condition: an expression that does not parse or names an unknown parameter, numbers the engine does
 * not take, a file with bad rows (each told by its line). What only a condition lacks, such as a parameter's value, is no reason to refuse.
 */
export async function assertDefinition(definition: SourceDefinition, system: SystemRow): Promise<void> {
  const { frequencyUnit } = system
  if (definition.kind === 'measured') {
    const { points, problems } = await readPoints(system.id, definition.uploadId, definition.mapping)
    if (problems.length > 0) throw new AppError('refused', 'The file cannot be read like this; nothing was stored.', { path: 'definition.mapping', details: { problems } })
    naming(() => readLoopInput(loopInputFromDefinition(definition, { frequencyUnit, parameters: {}, points })))
    return
  }
  if (definition.kind === 'expression') {
    const parameterNames = (await ParameterRow.findAll({ where: { systemId: system.id }, attributes: ['name'] })).map(parameter => parameter.name)
    naming(() => parseExpression(definition.expression, { variable: definition.sampleTime === undefined ? 's' : 'z', parameterNames }))
  }
  naming(() => readLoopInput(loopInputFromDefinition(definition, { frequencyUnit, parameters: {} })))
}

/** Runs a check and tells its refusal at the field of the definition it is about. */
function naming(check: () => unknown): void {
  try {
    check()
  }
  catch (error) {
    if (!(error instanceof AnalysisInputError)) throw error
    const { message, path, position } = error
    throw new AppError('invalidInput', message, { path: `definition.${path}`, ...(position !== undefined && { details: { position } }), cause: error })
  }
}
