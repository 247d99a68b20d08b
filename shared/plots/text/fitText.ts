import type { FontFace } from './notoSansWidths'
import { textWidth } from './textWidth'

/** The text, cut with an ellipsis where it is wider than `width` (px). */
export function fitText(text: string, width: number, size: number, face: FontFace = 'regular'): string {
  if (textWidth(text, size, face) <= width) return text
  const characters = [...text]
  while (characters.length > 0) {
    characters.pop()
    const cut = `${characters.join('').trimEnd()}…`
    if (textWidth(cut, size, face) <= width) return cut
  }
  return ''
}
