/** The names an expression uses, in order of first use, without s, z and exp. */
export function namesInExpression(expression: string): string[] {
  const names = expression.match(/(?<![\w.])[A-Za-z_]\w*/g) ?? []
  return [...new Set(names)].filter(name => !['s', 'z', 'exp'].includes(name))
}
