import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { BlockScope } from '#shared/analysis/blocks/BlockScope'
import { exactLeaf } from '#shared/analysis/blocks/exactLeaf'
import { exactLeafSource } from '#shared/analysis/blocks/exactLeafSource'
import { AppError } from '#shared/errors/AppError'
import type { ExpressionInput, LoopInput } from '#shared/types/analysis'
import type { Block, BlockGain } from '#shared/types/block'
import type { System } from '#shared/types/system'
import { ConditionRow } from '../../database/models/ConditionRow'
import { listParameters } from '../parameters/listParameters'
import { buildLoopInput } from '../sources/buildLoopInput'
import { BlockGains } from './BlockGains'
import type { DraftGains } from './assertGains'

/** Kinds whose factors take too long to be found while a request waits: an expression over them is told where its loops are looked at. */
const longWinded: readonly BlockGain['kind'][] = ['stateSpace', 'measured']

/**
 * Refuses a block that has more zeros than poles in a condition, or whose own expression puts sampled and continuous parts together that do not go together:
 * no loop could be built from it. What its expression needs and does not find in a condition is no fault of it. Told as `assertGains` tells.
 */
export async function assertProper(draft: DraftGains, others: readonly Block[], system: Pick<System, 'id' | 'frequencyUnit'>): Promise<void> {
  const [conditions, parameters] = await Promise.all([
    ConditionRow.findAll({ where: { systemId: system.id }, attributes: ['id', 'code'] }),
    listParameters(system.id),
  ])
  const drafted: Block = { id: 0, version: 0, systemId: system.id, role: 'plant', unitIn: '', unitOut: '', notes: '', position: 0, ...draft }
  const gains = new BlockGains([...others, drafted], system)
  const tried = new Set<string>()
  for (const condition of conditions) {
    const facts = { systemId: system.id, frequencyUnit: system.frequencyUnit, condition, parameters, blocks: gains }
    const input = await buildLoopInput({ kind: 'expression', expression: draft.name }, facts).catch(unlessMissing)
    const key = JSON.stringify(input)
    if (!isExpression(input) || tried.has(key)) continue
    tried.add(key)
    const fault = ownFault(draft.name, input)
    if (fault === null) continue
    const path = draft.byCondition[condition.id] ? `byCondition.${condition.id}` : 'definition'
    // The request is of this block: its name goes without saying.
    throw new AppError('invalidInput', fault.message.replace(`Block ${draft.name}: `, ''), { path: `${path}.${fault.path.slice(`blocks.${draft.name}.`.length)}`, ...(fault.position !== undefined && { details: { position: fault.position } }), cause: fault })
  }
}

const isExpression = (input: LoopInput | null): input is ExpressionInput => input !== null && 'expression' in input

function ownFault(name: string, input: ExpressionInput): AnalysisInputError | null {
  const blocks = input.blocks ?? {}
  const own = blocks[name]
  try {
    if (own?.kind === 'coefficients' || own?.kind === 'zerosPoles') inBlock(name, () => void exactLeaf(own, { output: 0, input: 0 }))
    else if (own?.kind === 'expression' && !Object.values(blocks).some(({ kind }) => longWinded.includes(kind))) void new BlockScope(input, exactLeafSource())
    return null
  }
  catch (error) {
    if (!(error instanceof AnalysisInputError)) throw error
    return error.path.startsWith(`blocks.${name}.`) ? error : null
  }
}

function inBlock(name: string, read: () => void): void {
  try {
    read()
  }
  catch (error) {
    if (error instanceof AnalysisInputError) throw new AnalysisInputError(error.message, `blocks.${name}.${error.path}`, error.position)
    throw error
  }
}

function unlessMissing(error: unknown): null {
  if (error instanceof AnalysisInputError) return null
  throw error
}
