/** A text as a CSS string, every character but letters, digits and the space written as its number: it can end neither the string nor the style element. */
export function cssString(text: string): string {
  const escaped = Array.from(text, character => (/[A-Za-z0-9 ]/.test(character) ? character : `\\${(character.codePointAt(0) ?? 0).toString(16)} `))
  return `"${escaped.join('')}"`
}
