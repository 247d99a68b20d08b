import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { loopInputFromDefinition } from '#shared/sources/loopInputFromDefinition'
import type { FrequencyUnit, LoopInput } from '#shared/types/analysis'
import type { BlockGain } from '#shared/types/block'
import type { ExpressionDefinition, SourceDefinition } from '#shared/types/source'
import type { Parameter } from '#shared/types/system'
import type { BlockGains } from '../blocks/BlockGains'
import { readPoints } from '../uploads/readPoints'

/** What a definition needs of its surroundings to become an input. */
export interface InputFacts {
  systemId: number
  frequencyUnit: FrequencyUnit
  condition: { id: number, code: string }
  /** those of the system */
  parameters: Parameter[]
  blocks: BlockGains
}

/**
 * What the engine is handed for a source in an operating condition: its definition, the values and gains there of the parameters and blocks it needs, the points
 * of its upload, the system's frequency unit. Throws AnalysisInputError where one of them is missing.
 */
export async function buildLoopInput(definition: SourceDefinition, facts: InputFacts): Promise<LoopInput> {
  const { frequencyUnit } = facts
  if (definition.kind === 'expression') return loopInputFromDefinition(definition, { frequencyUnit, ...await namedBy(definition, facts) })
  if (definition.kind !== 'measured') return loopInputFromDefinition(definition, { frequencyUnit, parameters: {} })
  const { points, problems } = await readPoints(facts.systemId, definition.uploadId, definition.mapping)
  const first = problems[0]
  if (first) throw new AnalysisInputError(first.line > 0 ? `Line ${first.line}: ${first.message}` : first.message, 'measured.points')
  return loopInputFromDefinition(definition, { frequencyUnit, parameters: {}, points })
}

/** Only what an expression needs is looked for: what else is missing in the condition is no fault of it. */
async function namedBy({ expression }: ExpressionDefinition, { parameters, blocks, condition }: InputFacts): Promise<{ parameters: Record<string, number>, blocks: Record<string, BlockGain> }> {
  const needed = blocks.neededIn(condition.id, expression)
  const gains: Record<string, BlockGain> = {}
  for (const name of needed.blocks) gains[name] = await blocks.gainIn(condition, name)
  const named = new Set(needed.others)
  const values = parameters.filter(parameter => named.has(parameter.name)).map(({ name, values }): [string, number] => {
    const value = values[condition.id]
    if (value === undefined) throw new AnalysisInputError(`The parameter ${name} has no value in the condition ${condition.code}.`, `parameters.${name}`)
    return [name, value]
  })
  return { parameters: Object.fromEntries(values), blocks: gains }
}
