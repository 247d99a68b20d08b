import type { ExpressionNode } from '#shared/analysis/expressions/ExpressionNode'

export type Complex = [number, number]

const times = (a: Complex, b: Complex): Complex => [a[0] * b[0] - a[1] * b[1], a[0] * b[1] + a[1] * b[0]]
const over = (a: Complex, b: Complex): Complex => {
  const square = b[0] * b[0] + b[1] * b[1]
  return [(a[0] * b[0] + a[1] * b[1]) / square, (a[1] * b[0] - a[0] * b[1]) / square]
}

/** L(jw) by walking the tree with complex doubles: a second way to the value, written for the tests. */
export function plainEvaluation(node: ExpressionNode, parameters: Record<string, number>, w: number): Complex {
  const at = (child: ExpressionNode) => plainEvaluation(child, parameters, w)
  switch (node.kind) {
    case 'constant': return [node.value, 0]
    case 'parameter': return [parameters[node.name] as number, 0]
    case 'variable': return [0, w]
    case 'negate': return times([-1, 0], at(node.operand))
    case 'exponential': {
      const [re, im] = at(node.argument)
      return [Math.exp(re) * Math.cos(im), Math.exp(re) * Math.sin(im)]
    }
    case 'power': {
      const base = at(node.base)
      let result: Complex = [1, 0]
      for (let k = 0; k < Math.abs(node.exponent); k++) result = times(result, base)
      return node.exponent < 0 ? over([1, 0], result) : result
    }
    case 'add':
    case 'subtract': {
      const left = at(node.left)
      const right = times(at(node.right), [node.kind === 'add' ? 1 : -1, 0])
      return [left[0] + right[0], left[1] + right[1]]
    }
    case 'multiply': return times(at(node.left), at(node.right))
    case 'divide': return over(at(node.left), at(node.right))
    case 'brackets': return at(node.content)
    case 'block': throw new Error(`the block ${node.name} has no value here`)
  }
}
