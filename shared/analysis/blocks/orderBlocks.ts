import type { BlockGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import { namesInExpression } from '../expressions/namesInExpression'
import { circleInWords } from './circleInWords'

/**
 * The blocks that an expression needs, those named by its blocks included, each after all that it needs itself.
 *
 * @throws AnalysisInputError at `blocks.X.expression` where blocks name one another in a circle
 */
export function orderBlocks(expression: string, blocks: Readonly<Record<string, BlockGain>>): string[] {
  const ordered: string[] = []
  const state = new Map<string, 'open' | 'done'>()
  /** the blocks between the expression and the one looked at */
  const way: string[] = []
  const visit = (name: string) => {
    const gain = blocks[name]!
    state.set(name, 'open')
    way.push(name)
    for (const { name: needed, position } of gain.kind === 'expression' ? namesInExpression(gain.expression) : []) {
      if (!Object.hasOwn(blocks, needed)) continue
      if (state.get(needed) === 'open') {
        const circle = way.slice(way.indexOf(needed))
        throw new AnalysisInputError(circleInWords(circle), `blocks.${name}.expression`, position)
      }
      if (!state.has(needed)) visit(needed)
    }
    way.pop()
    state.set(name, 'done')
    ordered.push(name)
  }
  for (const { name } of namesInExpression(expression)) if (Object.hasOwn(blocks, name) && !state.has(name)) visit(name)
  return ordered
}
