/** The names an expression uses, in order of first use, without s, z, pi and what is written as a function. */
export function namesInExpression(expression: string): string[] {
  const names = expression.match(/(?<![\w.])[A-Za-z_]\w*\b(?!\s*\()/g) ?? []
  return [...new Set(names)].filter(name => !['s', 'z', 'pi', 'exp'].includes(name))
}
