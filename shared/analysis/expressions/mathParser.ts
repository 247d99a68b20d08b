import { create, parseDependencies, type MathNode } from 'mathjs'

/** The parser of mathjs alone: this instance knows no function, so that nothing could be evaluated with it. */
const instance = create({ ...parseDependencies }, {})

/** Syntax tree of a text; throws a SyntaxError for what is none. */
export function parseMath(text: string): MathNode {
  return instance.parse(text)
}
