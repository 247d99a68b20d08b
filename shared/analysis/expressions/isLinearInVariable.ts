import type { ExpressionNode } from './ExpressionNode'

/** True for a sub-expression that is a multiple of the variable by its form, whatever values the parameters have. */
export function isLinearInVariable(node: ExpressionNode): boolean {
  switch (node.kind) {
    case 'variable': return node.variable === 's'
    case 'brackets': return isLinearInVariable(node.content)
    case 'negate': return isLinearInVariable(node.operand)
    case 'add':
    case 'subtract': return isLinearInVariable(node.left) && isLinearInVariable(node.right)
    case 'multiply':
      return (isLinearInVariable(node.left) && isFree(node.right)) || (isFree(node.left) && isLinearInVariable(node.right))
    case 'divide': return isLinearInVariable(node.left) && isFree(node.right)
    case 'power': return node.exponent === 1 && isLinearInVariable(node.base)
    default: return false
  }
}

/** True where the variable does not occur. */
function isFree(node: ExpressionNode): boolean {
  switch (node.kind) {
    case 'variable':
    case 'block':
    case 'exponential': return false
    case 'brackets': return isFree(node.content)
    case 'negate': return isFree(node.operand)
    case 'power': return isFree(node.base)
    case 'constant':
    case 'parameter': return true
    default: return isFree(node.left) && isFree(node.right)
  }
}
