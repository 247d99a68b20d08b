/** A key that must not stand where it does, and in words why. */
export interface FaultyKey {
  message: string
  /** character (from 0) where the key begins */
  position: number
}

/**
 * The first key of a JSON text that stands twice in its object, or is `__proto__`: parsers take the last of the two, and drop that name, without a word.
 *
 * @param text one that JSON.parse has read
 */
export function findFaultyKey(text: string): FaultyKey | null {
  const open: (Set<string> | null)[] = []
  for (let at = 0; at < text.length; at++) {
    const character = text[at]
    if (character === '{') open.push(new Set())
    else if (character === '[') open.push(null)
    else if (character === '}' || character === ']') open.pop()
    else if (character === '"') {
      const end = endOfString(text, at)
      const keys = open.at(-1)
      if (keys && isFollowedByColon(text, end)) {
        const key = keyOf(text.slice(at, end))
        if (key === '__proto__') return { message: '"__proto__" is no name that is read: choose another.', position: at }
        if (keys.has(key)) return { message: `"${key.slice(0, 40)}" stands twice in one object, and only one of them could be read: take one away.`, position: at }
        keys.add(key)
      }
      at = end - 1
    }
  }
  return null
}

/** The place behind the closing quotation mark of the string that begins at `start`. */
function endOfString(text: string, start: number): number {
  for (let quote = text.indexOf('"', start + 1); quote >= 0; quote = text.indexOf('"', quote + 1)) {
    let slashes = 0
    while (text[quote - 1 - slashes] === '\\') slashes++
    if (slashes % 2 === 0) return quote + 1
  }
  return text.length
}

function isFollowedByColon(text: string, from: number): boolean {
  let at = from
  while (/\s/.test(text[at] ?? '')) at++
  return text[at] === ':'
}

const keyOf = (quoted: string): string => quoted.includes('\\') ? JSON.parse(quoted) as string : quoted.slice(1, -1)
