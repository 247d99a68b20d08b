import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
import { namesNeeded } from '#shared/sources/namesNeeded'
import type { Block, BlockInUse } from '#shared/types/block'
import { SourceRow } from '../../database/models/SourceRow'
import { listConditions } from '../conditions/listConditions'
import { listLoops } from '../loops/listLoops'
import { listBlocks } from './listBlocks'

/** The blocks of a system in their order, each with the loops and blocks that depend on it in any condition. */
export async function listBlocksInUse(systemId: number): Promise<BlockInUse[]> {
  const [blocks, loops, conditions] = await Promise.all([listBlocks(systemId), listLoops(systemId), listConditions(systemId)])
  const sources = await SourceRow.findAll({ where: { loopId: loops.map(loop => loop.id), conditionId: conditions.map(condition => condition.id), kind: 'expression' }, attributes: ['loopId', 'definition'] })
  // One expression of a block for all its conditions together: whether it is used anywhere is asked.
  const expressions = new Map(blocks.map(block => [block.name, { kind: 'expression', expression: expressionsOf(block).join('\n') }]))
  const needed = new Map<number, Set<string>>()
  for (const { loopId, definition } of sources) {
    if (definition.kind !== 'expression') continue
    const names = needed.get(loopId) ?? new Set()
    for (const name of namesNeeded(definition.expression, name => expressions.get(name)).blocks) names.add(name)
    needed.set(loopId, names)
  }
  return blocks.map(block => ({
    ...block,
    loopIds: loops.filter(loop => needed.get(loop.id)?.has(block.name)).map(loop => loop.id),
    blockNames: blocks.filter(other => other.id !== block.id && namesInExpression(expressions.get(other.name)?.expression ?? '').some(({ name }) => name === block.name)).map(other => other.name),
  }))
}

const expressionsOf = ({ definition, byCondition }: Block) => [definition, ...Object.values(byCondition)].flatMap(gain => gain?.kind === 'expression' ? [gain.expression] : [])
