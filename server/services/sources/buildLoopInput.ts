import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { loopInputFromDefinition } from '#shared/sources/loopInputFromDefinition'
import type { FrequencyUnit, LoopInput } from '#shared/types/analysis'
import type { SourceDefinition } from '#shared/types/source'
import type { Parameter } from '#shared/types/system'
import { readPoints } from '../uploads/readPoints'

/** What a definition needs of its surroundings to become an input. */
export interface InputFacts {
  systemId: number
  frequencyUnit: FrequencyUnit
  conditionId: number
  conditionCode: string
  /** those of the system */
  parameters: Parameter[]
}

/**
 * What the engine is handed for a source in an operating condition: its definition, the values there of the parameters it names, the points of its
 * upload, the system's frequency unit. Throws AnalysisInputError where one of them is missing.
 */
export async function buildLoopInput(definition: SourceDefinition, facts: InputFacts): Promise<LoopInput> {
  const { frequencyUnit } = facts
  if (definition.kind === 'expression') return loopInputFromDefinition(definition, { frequencyUnit, parameters: valuesOfNamed(definition.expression, facts) })
  if (definition.kind !== 'measured') return loopInputFromDefinition(definition, { frequencyUnit, parameters: {} })
  const { points, problems } = await readPoints(facts.systemId, definition.uploadId, definition.mapping)
  const first = problems[0]
  if (first) throw new AnalysisInputError(first.line > 0 ? `Line ${first.line}: ${first.message}` : first.message, 'measured.points')
  return loopInputFromDefinition(definition, { frequencyUnit, parameters: {}, points })
}

/** Only the parameters an expression names are handed on: a change of another one leaves its analysis as it was. */
function valuesOfNamed(expression: string, { parameters, conditionId, conditionCode }: InputFacts): Record<string, number> {
  const named = new Set(expression.match(/[A-Za-z_]\w*/g) ?? [])
  return Object.fromEntries(parameters.filter(parameter => named.has(parameter.name)).map(({ name, values }) => {
    const value = values[conditionId]
    if (value === undefined) throw new AnalysisInputError(`The parameter ${name} has no value in the condition ${conditionCode}.`, `parameters.${name}`)
    return [name, value]
  }))
}
