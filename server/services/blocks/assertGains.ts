import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { circleInWords } from '#shared/analysis/blocks/circleInWords'
import { parseExpression } from '#shared/analysis/expressions/parseExpression'
import { readBlockGain } from '#shared/analysis/input/readBlockGain'
import { AppError } from '#shared/errors/AppError'
import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
import type { Block, BlockDefinition } from '#shared/types/block'
import type { System } from '#shared/types/system'
import { ConditionRow } from '../../database/models/ConditionRow'
import { ParameterRow } from '../../database/models/ParameterRow'
import { assertProper } from './assertProper'
import { resolveBlockGain } from './resolveBlockGain'
import { findCircle } from './findCircle'

export type DraftGains = Pick<Block, 'name' | 'definition' | 'byCondition'>

/**
 * Refuses a block of which a gain cannot be read by itself: a wrong number in a file or section, an expression that does not parse or names what nobody knows, a
 * block that needs itself or has more zeros than poles. Told at `definition.<path>` or `byCondition.<conditionId>.<path>`, with the place in an expression as `details.position`.
 *
 * @param others the other blocks of the system
 */
export async function assertGains(draft: DraftGains, others: readonly Block[], system: Pick<System, 'id' | 'frequencyUnit'>): Promise<void> {
  const [conditions, parameters] = await Promise.all([
    ConditionRow.findAll({ where: { systemId: system.id }, attributes: ['id', 'code'] }),
    ParameterRow.findAll({ where: { systemId: system.id }, attributes: ['name'] }),
  ])
  const known = new Map(conditions.map(({ id, code }) => [id, code]))
  for (const conditionId of Object.keys(draft.byCondition)) {
    if (!known.has(Number(conditionId))) throw new AppError('invalidInput', 'There is no such operating condition in this system.', { path: `byCondition.${conditionId}` })
  }
  const parameterNames = parameters.map(parameter => parameter.name)
  const blockNames = [...others.map(block => block.name), draft.name]
  for (const [path, definition] of definitionsOf(draft)) {
    await told(path, async () => {
      readBlockGain(await resolveBlockGain(definition, system))
      if (definition.kind !== 'expression') return
      parseExpression(definition.expression, { variable: definition.sampleTime === undefined ? 's' : 'z', parameterNames, blocks: blockNames })
    })
  }
  assertNoCircle(draft, others)
  await assertProper(draft, others, system)
}

const definitionsOf = ({ definition, byCondition }: DraftGains): [string, BlockDefinition][] => [
  ...(definition === null ? [] : [['definition', definition] as [string, BlockDefinition]]),
  ...Object.entries(byCondition).map(([id, own]): [string, BlockDefinition] => [`byCondition.${id}`, own]),
]

/** Refuses a block that comes to need itself, in all conditions or in one, at the expression in which it does. */
export function assertNoCircle(draft: DraftGains, others: readonly Block[]): void {
  // The same expression may stand in a thousand conditions.
  const read = new Map<string, string[]>()
  const namesIn = (expression: string): string[] => {
    const names = read.get(expression) ?? [...new Set(namesInExpression(expression).map(({ name }) => name))]
    read.set(expression, names)
    return names
  }
  // Wherever no block has a gain of its own, all conditions are alike: they stand for the one without an id.
  const places = new Set([null, ...[draft, ...others].flatMap(block => Object.keys(block.byCondition).map(Number))])
  for (const place of places) {
    const inEffect = (block: DraftGains) => (place === null ? undefined : block.byCondition[place]) ?? block.definition
    const definitions = new Map([...others, draft].map(block => [block.name, inEffect(block)]))
    const circle = findCircle(draft.name, definitions, namesIn)
    const own = definitions.get(draft.name)
    if (circle === null || own?.kind !== 'expression') continue
    const path = place !== null && draft.byCondition[place] ? `byCondition.${place}` : 'definition'
    const position = namesInExpression(own.expression).find(({ name }) => name === circle[1])?.position ?? 0
    throw new AppError('invalidInput', circleInWords(circle.slice(0, -1)), { path: `${path}.expression`, details: { position } })
  }
}

/** Runs a check of one definition and tells its refusal at the definition's place in the request. */
async function told(path: string, check: () => Promise<void>): Promise<void> {
  try {
    await check()
  }
  catch (error) {
    if (error instanceof AnalysisInputError) {
      throw new AppError('invalidInput', error.message, { path: `${path}.${error.path}`, ...(error.position !== undefined && { details: { position: error.position } }), cause: error })
    }
    if (error instanceof AppError) throw new AppError(error.code, error.message, { path: `${path}.${error.path ?? ''}`, details: error.details, cause: error })
    throw error
  }
}
