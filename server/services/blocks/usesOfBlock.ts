import { AppError } from '#shared/errors/AppError'
import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
import type { BlockDefinition } from '#shared/types/block'
import { ConditionRow } from '../../database/models/ConditionRow'
import { LoopRow } from '../../database/models/LoopRow'
import { SourceRow } from '../../database/models/SourceRow'
import { listBlocks } from './listBlocks'

const mostTold = 3

/** Where a block is named, in words: 'SL-P (design model in C1, C2)', 'the block H', 'the break point of SL-R'. */
export async function usesOfBlock(systemId: number, name: string): Promise<string[]> {
  const [blocks, loops, conditions] = await Promise.all([listBlocks(systemId), LoopRow.findAll({ where: { systemId }, order: ['position', 'id'] }), ConditionRow.findAll({ where: { systemId } })])
  const codes = new Map(conditions.map(({ id, code }) => [id, code]))
  const sources = await SourceRow.findAll({ where: { loopId: loops.map(loop => loop.id), conditionId: [...codes.keys()], kind: 'expression' }, order: ['id'] })
  const naming = sources.filter(({ definition }) => names(definition, name))
  return [
    ...loops.flatMap((loop) => {
      const own = naming.filter(source => source.loopId === loop.id)
      return [...new Set(own.map(source => source.name))].map((sourceName) => {
        const there = own.filter(source => source.name === sourceName).map(source => codes.get(source.conditionId) ?? '')
        return `${loop.code} (${sourceName} in ${inShort(there)})`
      })
    }),
    ...blocks.filter(block => block.name !== name && [block.definition, ...Object.values(block.byCondition)].some(definition => names(definition, name))).map(block => `the block ${block.name}`),
    ...loops.filter(loop => loop.breakAt?.block === name).map(loop => `the break point of ${loop.code}`),
  ]
}

/** Refuses what would take a name from under the expressions that use it, telling which. */
export async function assertBlockUnused(systemId: number, name: string, doing: 'deleted' | 'renamed'): Promise<void> {
  const uses = await usesOfBlock(systemId, name)
  if (uses.length === 0) return
  throw new AppError('refused', `The block ${name} cannot be ${doing} while it is used: ${inShort(uses)}. Take it out there first.`, { path: 'name', details: { uses } })
}

const names = (definition: BlockDefinition | { kind: string } | null, name: string): boolean =>
  definition?.kind === 'expression' && 'expression' in definition && namesInExpression(definition.expression).some(found => found.name === name)

const inShort = (words: readonly string[]) => words.length > mostTold ? `${words.slice(0, mostTold).join(', ')} and ${words.length - mostTold} more` : words.join(', ')
