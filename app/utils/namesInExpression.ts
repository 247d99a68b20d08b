/** The names an expression uses, in order of first use, without s, z, exp and pi. */
export function namesInExpression(expression: string): string[] {
  const names = expression.match(/(?<![\w.])[A-Za-z_]\w*/g) ?? []
  return [...new Set(names)].filter(name => !['s', 'z', 'exp', 'pi'].includes(name))
}
