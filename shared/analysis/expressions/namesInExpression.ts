/** A name as it stands in an expression. */
export interface NameInExpression {
  name: string
  /** character (from 0) where it starts */
  position: number
}

const NUMBER = /(?:\d+(?:\.\d*)?|\.\d+)(?:e[+-]?\d+)?/iy
const NAME = /[a-z_]\w*/iy
const CHANNEL = /\s*\[[^\]]*\]?/y
const OWN_MEANING = new Set(['s', 'z', 'exp', 'pi'])

/**
 * Every name of a block or parameter in an expression, in the order they stand there, one that stands twice twice. It reads expressions that are not
 * finished too, and refuses nothing: which of the names are known is for `parseExpression` to say.
 */
export function namesInExpression(text: string): NameInExpression[] {
  const names: NameInExpression[] = []
  let at = 0
  while (at < text.length) {
    NUMBER.lastIndex = at
    NAME.lastIndex = at
    const number = NUMBER.exec(text)
    const name = number ? null : NAME.exec(text)
    if (name && !OWN_MEANING.has(name[0])) names.push({ name: name[0], position: at })
    at += number?.[0].length ?? name?.[0].length ?? 1
    if (!name) continue
    CHANNEL.lastIndex = at
    at += CHANNEL.exec(text)?.[0].length ?? 0
  }
  return names
}
