import type { FontFace } from './notoSansWidths'
import { notoSansWidths } from './notoSansWidths'

/** Width assumed for a character the table lacks: that of a wide letter, so that a label is never thought narrower than it is. */
const unknownWidth = 900

const tables = new Map<FontFace, Map<number, number>>()

function tableOf(face: FontFace): Map<number, number> {
  let table = tables.get(face)
  if (!table) {
    table = new Map()
    for (const run of notoSansWidths[face]) {
      run.widths.forEach((width, i) => {
        if (width > 0) table!.set(run.from + i, width)
      })
    }
    tables.set(face, table)
  }
  return table
}

/**
 * Width of a text set in Noto Sans, without kerning, in the unit of `size` (px).
 * Figures need it without a browser, and asking a drawing surface for a bounding box is slow and differs from place to place.
 */
export function textWidth(text: string, size: number, face: FontFace = 'regular'): number {
  const table = tableOf(face)
  let thousandths = 0
  for (const character of text) thousandths += table.get(character.codePointAt(0)!) ?? unknownWidth
  return thousandths * size / 1000
}
