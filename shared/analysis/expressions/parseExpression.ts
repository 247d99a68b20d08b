import type { BlockGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import { complexRefusal } from '../input/complexRefusal'
import type { ExpressionNode, ExpressionVariable } from './ExpressionNode'
import { expressionLimits } from './expressionLimits'
import { isLinearInVariable } from './isLinearInVariable'
import { parseMath } from './mathParser'
import { nearestName } from './nearestName'
import { scanExpression, type ExpressionToken } from './scanExpression'

export interface ExpressionNames {
  /** the variable of an expression without blocks; over blocks both s and z can be written */
  variable: ExpressionVariable
  parameterNames: readonly string[]
  /** blocks that can be named: their names, or their gains by name */
  blocks?: readonly string[] | Readonly<Record<string, BlockGain>>
}

/** The same with the names of blocks in a set; null where there are no blocks. */
interface KnownNames {
  variable: ExpressionVariable
  parameterNames: readonly string[]
  blockNames: ReadonlySet<string> | null
}

/** The few fields of a syntax node that are read here; everything else of it is left alone. */
interface SyntaxNode {
  type: string
  name?: string
  fn?: string | { name?: string }
  args?: SyntaxNode[]
  content?: SyntaxNode
}

const BINARY: Record<string, 'add' | 'subtract' | 'multiply' | 'divide'> = {
  add: 'add', subtract: 'subtract', multiply: 'multiply', divide: 'divide',
}

/**
 * Reads a loop gain as typed: numbers, the variable, pi, the given parameters, + - * /, whole powers, brackets and, in s, exp of
 * something linear in s. The syntax tree is mathjs's; each node is checked against a list of what is allowed and copied into
 * a tree of our own, so that nothing that was typed is ever evaluated by a general evaluator.
 *
 * @throws AnalysisInputError with path 'expression', the character at fault in `position`
 */
export function parseExpression(text: string, { variable, parameterNames, blocks }: ExpressionNames): ExpressionNode {
  const names: KnownNames = { variable, parameterNames, blockNames: blocks ? new Set(Array.isArray(blocks) ? blocks as string[] : Object.keys(blocks)) : null }
  const tokens = scanExpression(text)
  for (const [index, token] of tokens.entries()) {
    if (token.kind === 'name') checkName(token, tokens[index + 1], names)
  }
  // Every operand gets a name of its own: the tree then tells where each part stood, and no word has a meaning for the parser.
  const numbered = tokens.map((token, index) => token.kind === 'number' || token.kind === 'name' ? `t${index}` : token.text).join(' ')
  let tree: SyntaxNode
  try {
    tree = parseMath(numbered) as SyntaxNode
  }
  catch (error) {
    if (error instanceof SyntaxError) throw new AnalysisInputError('The expression cannot be read.', 'expression', 0)
    throw error
  }
  return copyNode(tree, tokens, names, 0)
}

function checkName(token: ExpressionToken, next: ExpressionToken | undefined, { variable, parameterNames, blockNames }: KnownNames): void {
  const { text, position } = token
  const called = next?.kind === 'open'
  const refuse = (message: string) => {
    throw new AnalysisInputError(message, 'expression', position)
  }
  if (token.channel && !blockNames?.has(text)) refuse(`"${text}" is no block: only a block has channels in square brackets.`)
  if (text === 'exp') {
    if (variable === 'z' && !blockNames) refuse('exp has no place in a sampled loop: write dead time as a power of z, as in z^-2.')
    if (!called) refuse('exp needs an argument in brackets, as in exp(-s*T).')
    return
  }
  const isVariable = text === variable || (blockNames !== null && (text === 's' || text === 'z'))
  const known = isVariable || text === 'pi' || parameterNames.includes(text) || blockNames?.has(text)
  if (called && known) refuse(`A multiplication sign is missing: write ${text}*( ... ).`)
  if (called) refuse(`The function "${text}" cannot be used here: only exp(-s*T) for dead time, + - * / and whole powers.`)
  if (known) return
  if (text === 's') refuse('This loop is sampled: its variable is z, not s.')
  if (text === 'z') refuse('This loop is continuous: its variable is s. Give a sample time for a loop in z.')
  if (text === 'i' || text === 'j') refuse(complexRefusal)
  const near = nearestName(text, [...parameterNames, ...blockNames ?? []])
  refuse(`Unknown name "${text}": it is no ${blockNames ? 'block and no parameter' : 'parameter of this expression'}.${near === null ? '' : ` Is "${near}" meant?`}`)
}

function copyNode(node: SyntaxNode, tokens: ExpressionToken[], names: KnownNames, depth: number): ExpressionNode {
  if (depth > expressionLimits.tokens) throw new AnalysisInputError('The expression is nested too deep.', 'expression', 0)
  const copy = (child: SyntaxNode) => copyNode(child, tokens, names, depth + 1)
  switch (node.type) {
    case 'ParenthesisNode': {
      const content = copy(node.content as SyntaxNode)
      return names.blockNames ? { kind: 'brackets', content, position: content.position } : content
    }
    case 'SymbolNode':
      return copyLeaf(tokens[Number((node.name as string).slice(1))] as ExpressionToken, names)
    case 'FunctionNode': {
      const token = tokens[Number((node.fn as { name: string }).name.slice(1))] as ExpressionToken
      const argument = copy((node.args as SyntaxNode[])[0] as SyntaxNode)
      if (!isLinearInVariable(argument)) {
        throw new AnalysisInputError('The argument of exp must be -s*T with a dead time T that does not depend on s.', 'expression', argument.position)
      }
      return { kind: 'exponential', argument, position: token.position }
    }
    case 'OperatorNode': {
      const args = node.args as SyntaxNode[]
      if (node.fn === 'unaryMinus') {
        const operand = copy(args[0] as SyntaxNode)
        return { kind: 'negate', operand, position: operand.position }
      }
      if (node.fn === 'unaryPlus') return copy(args[0] as SyntaxNode)
      if (node.fn === 'pow') {
        const base = copy(args[0] as SyntaxNode)
        return { kind: 'power', base, exponent: wholeExponent(copy(args[1] as SyntaxNode)), position: base.position }
      }
      const kind = BINARY[node.fn as string]
      if (kind) {
        const left = copy(args[0] as SyntaxNode)
        const right = copy(args[1] as SyntaxNode)
        return { kind, left, right, position: kind === 'divide' ? right.position : left.position }
      }
    }
  }
  throw new AnalysisInputError('The expression holds something that has no meaning in a loop gain.', 'expression', 0)
}

function copyLeaf(token: ExpressionToken, { variable, parameterNames, blockNames }: KnownNames): ExpressionNode {
  const { text, position } = token
  if (token.kind === 'number') {
    const value = Number(text)
    if (!Number.isFinite(value)) throw new AnalysisInputError(`The number ${text.slice(0, 30)} is too large.`, 'expression', position)
    return { kind: 'constant', value, position }
  }
  if (text === variable || (blockNames && (text === 's' || text === 'z'))) return { kind: 'variable', variable: text as ExpressionVariable, position }
  if (blockNames?.has(text)) return { kind: 'block', name: text, channel: token.channel ?? null, position }
  if (text === 'pi' && !parameterNames.includes('pi')) return { kind: 'constant', value: Math.PI, position }
  return { kind: 'parameter', name: text, position }
}

function wholeExponent(node: ExpressionNode): number {
  const value = constantValue(node)
  if (value === null) throw new AnalysisInputError('A power must be a whole number written out, as in s^2.', 'expression', node.position)
  if (!Number.isInteger(value)) throw new AnalysisInputError(`The power ${value} is not a whole number.`, 'expression', node.position)
  if (Math.abs(value) > expressionLimits.exponent) {
    throw new AnalysisInputError(`The power ${value} is too large: at most ${expressionLimits.exponent}.`, 'expression', node.position)
  }
  return value
}

/** Value of a sub-expression of plain numbers; null where a name stands in it. */
function constantValue(node: ExpressionNode): number | null {
  if (node.kind === 'constant') return node.value
  if (node.kind === 'brackets') return constantValue(node.content)
  if (node.kind === 'negate') {
    const value = constantValue(node.operand)
    return value === null ? null : -value
  }
  if (node.kind === 'power') {
    const value = constantValue(node.base)
    return value === null ? null : value ** node.exponent
  }
  if (node.kind !== 'add' && node.kind !== 'subtract' && node.kind !== 'multiply' && node.kind !== 'divide') return null
  const left = constantValue(node.left)
  const right = constantValue(node.right)
  if (left === null || right === null) return null
  switch (node.kind) {
    case 'add': return left + right
    case 'subtract': return left - right
    case 'multiply': return left * right
    case 'divide': return left / right
  }
}
