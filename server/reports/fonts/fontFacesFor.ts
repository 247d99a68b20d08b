import type { ReportAssets } from '../ReportAssets'
import type { FontFile } from './fontFiles'
import { fontFiles } from './fontFiles'

const hex = (value: number) => value.toString(16).toUpperCase()

function holdsAny(font: FontFile, characters: ReadonlySet<number>): boolean {
  for (const character of characters) {
    if (font.ranges.some(([from, to]) => character >= from && character <= to)) return true
  }
  return false
}

/**
 * The @font-face rules, fonts inside as base64, of every file that holds a character of the document.
 * A document in plain Latin letters carries the Latin subsets only.
 */
export async function fontFacesFor(text: string, assets: ReportAssets): Promise<string> {
  const characters = new Set(Array.from(text, character => character.codePointAt(0) ?? 0))
  const needed = fontFiles.filter(font => holdsAny(font, characters))
  const rules = await Promise.all(needed.map(async (font) => {
    const bytes = await assets.font(font.package, font.file)
    const range = font.ranges.map(([from, to]) => (from === to ? `U+${hex(from)}` : `U+${hex(from)}-${hex(to)}`)).join(',')
    return `@font-face{font-family:'${font.family}';font-style:${font.style};font-weight:${font.weight};src:url(data:font/woff2;base64,${bytes.toString('base64')}) format('woff2');unicode-range:${range}}`
  }))
  return rules.join('\n')
}
