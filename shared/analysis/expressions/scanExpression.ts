import { AnalysisInputError } from '../AnalysisInputError'
import { complexRefusal } from '../input/complexRefusal'
import type { BlockChannel } from './ExpressionNode'
import { expressionLimits } from './expressionLimits'

export interface ExpressionToken {
  kind: 'number' | 'name' | 'operator' | 'open' | 'close'
  text: string
  position: number
  /** what stands in square brackets behind a name, as in G[1, 2] */
  channel?: BlockChannel
}

const NUMBER = /(?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d+)?/iy
const NAME = /[a-z_]\w*/iy
const CHANNEL_START = /\s*\[/y
const OPERATORS = '+-*/^'

const refuse = (message: string, position: number): never => {
  throw new AnalysisInputError(message, 'expression', position)
}

/**
 * Cuts an expression into tokens, each with its place, and writes out the multiplications that were left out where that can mean
 * only one thing, as in 2s, 3(s+1) and (s+1)(s+2).
 *
 * @throws AnalysisInputError with path 'expression' and the position of the character at fault
 */
export function scanExpression(text: string): ExpressionToken[] {
  if (text.length > expressionLimits.characters) {
    refuse(`The expression has ${text.length} characters; at most ${expressionLimits.characters} are read.`, expressionLimits.characters)
  }
  const tokens: ExpressionToken[] = []
  /** open brackets: their token, and the token before the whole operand they belong to */
  const open: { position: number, before: string }[] = []
  /** what stands before the operand just ended: only then can a left-out multiplication be read in one way */
  let beforeOperand = ''
  let at = 0
  while (at < text.length) {
    const character = text[at] as string
    if (/\s/.test(character)) {
      at++
      continue
    }
    if (tokens.length >= expressionLimits.tokens) refuse(`The expression has more than ${expressionLimits.tokens} parts.`, at)
    const token = readToken(text, at)
    const previous = tokens[tokens.length - 1]
    if (previous && endsOperand(previous) && startsOperand(token)) {
      multiplyHere(tokens, previous, token, beforeOperand)
      beforeOperand = '*'
    }
    if (token.kind === 'number' || token.kind === 'name') beforeOperand = beforeOf(tokens)
    if (token.kind === 'open') {
      const last = tokens[tokens.length - 1]
      open.push({ position: at, before: last?.kind === 'name' ? beforeOperand : beforeOf(tokens) })
      if (open.length > expressionLimits.depth) refuse(`Brackets are nested more than ${expressionLimits.depth} deep.`, at)
    }
    if (token.kind === 'close') {
      const opened = open.pop()
      if (!opened) return refuse('This closing bracket has no opening one.', at)
      const last = tokens[tokens.length - 1]
      if (last?.kind === 'open') refuse('These brackets are empty.', last.position)
      if (last?.kind === 'operator') refuse(`Something is missing after "${last.text}".`, last.position)
      beforeOperand = opened.before
    }
    if (token.kind === 'operator') checkOperator(tokens, token)
    tokens.push(token)
    at += token.text.length
    if (token.kind === 'name') at = readChannel(text, at, token)
  }
  const last = tokens[tokens.length - 1]
  if (!last) return refuse('The expression is empty.', 0)
  if (last.kind === 'operator') refuse(`Something is missing after "${last.text}".`, last.position)
  const unclosed = open.pop()
  if (unclosed) refuse('This bracket is not closed.', unclosed.position)
  return tokens
}

function readToken(text: string, at: number): ExpressionToken {
  const character = text[at] as string
  NUMBER.lastIndex = at
  const number = NUMBER.exec(text)
  if (number) return { kind: 'number', text: number[0], position: at }
  NAME.lastIndex = at
  const name = NAME.exec(text)
  if (name) return { kind: 'name', text: name[0], position: at }
  if (character === '(') return { kind: 'open', text: '(', position: at }
  if (character === ')') return { kind: 'close', text: ')', position: at }
  if (OPERATORS.includes(character)) return { kind: 'operator', text: character, position: at }
  if (character === ',') return refuse('A comma has no meaning here: write decimals with a point.', at)
  if ('[]{}'.includes(character)) return refuse('Only round brackets are read here, and square ones behind the name of a block.', at)
  return refuse(`The character "${String.fromCodePoint(text.codePointAt(at) as number)}" has no meaning here.`, at)
}

/** The channel behind a name, if there is one: it becomes part of the name. Returns where the text goes on. */
function readChannel(text: string, at: number, name: ExpressionToken): number {
  CHANNEL_START.lastIndex = at
  const start = CHANNEL_START.exec(text)
  if (!start) return at
  const from = at + start[0].length
  const bracket = from - 1
  const to = text.indexOf(']', from)
  if (to < 0) return refuse('This bracket is not closed.', bracket)
  const parts = text.slice(from, to).split(',').map(part => part.trim())
  if (parts.length !== 2 || parts.includes('')) return refuse(`A channel is written ${name.text}[output, input], as in ${name.text}[1, 2].`, bracket)
  name.channel = { output: parts[0] as string, input: parts[1] as string }
  return to + 1
}

const endsOperand = (token: ExpressionToken) => token.kind === 'number' || token.kind === 'name' || token.kind === 'close'
const startsOperand = (token: ExpressionToken) => token.kind === 'number' || token.kind === 'name' || token.kind === 'open'
/** The operator before an operand that starts here, its own signs aside. */
const beforeOf = (tokens: ExpressionToken[]) => {
  let index = tokens.length - 1
  while (tokens[index]?.kind === 'operator' && tokens[index - 1]?.kind === 'operator') index--
  const last = tokens[index]
  return last?.kind === 'operator' ? last.text : ''
}

function multiplyHere(tokens: ExpressionToken[], previous: ExpressionToken, token: ExpressionToken, beforeOperand: string): void {
  if (previous.kind === 'name' && token.kind === 'open') {
    if (previous.text === 's' || previous.text === 'z') {
      refuse(`A multiplication sign is missing: write ${previous.text}*( ... ).`, token.position)
    }
    // a name before a bracket reads as a function: the parser knows which there are
    return
  }
  if (token.kind === 'name' && /^[ij]$/.test(token.text)) refuse(complexRefusal, token.position)
  if (previous.kind === 'name' || token.kind === 'number') refuse('An operator is missing before this.', token.position)
  if (beforeOperand === '/' || beforeOperand === '^') {
    refuse('A multiplication sign is missing here, and without it this can be read in two ways: write * and brackets.', token.position)
  }
  tokens.push({ kind: 'operator', text: '*', position: token.position })
}

function checkOperator(tokens: ExpressionToken[], token: ExpressionToken): void {
  const last = tokens[tokens.length - 1]
  if (token.text === '+' || token.text === '-') {
    let signs = 0
    while (tokens[tokens.length - 1 - signs]?.kind === 'operator') signs++
    if (signs > expressionLimits.depth) refuse('Too many signs follow one another.', token.position)
    return
  }
  if (!last || last.kind === 'open') refuse(`Something is missing before "${token.text}".`, token.position)
  if (last?.kind === 'operator') {
    refuse(last.text === '*' && token.text === '*' ? 'Write powers with ^.' : `Something is missing between "${last.text}" and "${token.text}".`, token.position)
  }
}
