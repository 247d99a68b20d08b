import type { ExpressionNode } from '../expressions/ExpressionNode'

/**
 * How often a block stands as a factor of an expression: 1 where the expression is proportional to it, 0 where it is free of it, -1 where it divides; null
 * where it stands in a sum with what is free of it, as in a feedback.
 *
 * @param ofBlock the same of each block that the expression names
 */
export function powerOfBlock(tree: ExpressionNode, ofBlock: (name: string) => number | null): number | null {
  const power = (node: ExpressionNode) => powerOfBlock(node, ofBlock)
  switch (tree.kind) {
    case 'block': return ofBlock(tree.name)
    case 'brackets': return power(tree.content)
    case 'negate': return power(tree.operand)
    case 'power': {
      const base = power(tree.base)
      return base === null ? null : base * tree.exponent
    }
    case 'add':
    case 'subtract': {
      const [left, right] = [power(tree.left), power(tree.right)]
      return left === right ? left : null
    }
    case 'multiply':
    case 'divide': {
      const [left, right] = [power(tree.left), power(tree.right)]
      return left === null || right === null ? null : tree.kind === 'multiply' ? left + right : left - right
    }
    default: return 0
  }
}
