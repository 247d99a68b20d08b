import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'

/** The names of blocks and parameters an expression uses, each once, in order of first use, without what is written as a function. */
export function namesUsed(expression: string): string[] {
  const names = namesInExpression(expression).filter(({ name, position }) => !/^\s*\(/.test(expression.slice(position + name.length)))
  return [...new Set(names.map(({ name }) => name))]
}
