/**
 * Writes shared/plots/text/notoSansWidths.ts: the advance widths of Noto Sans, from the font files that the application ships.
 * Run it again only when the font package changes: `node scripts/makeNotoSansWidths.mjs`.
 */
import { writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { openSync } from 'fontkit'

const path = relative => fileURLToPath(new URL(`../${relative}`, import.meta.url))

const faces = { regular: '400-normal', semibold: '600-normal', semiboldItalic: '600-italic' }
const ranges = [
  ['latin', 0x20, 0x7E], ['latin', 0xA0, 0xFF], ['latin-ext', 0x100, 0x17F], ['greek', 0x384, 0x3CE],
  ['cyrillic', 0x401, 0x45F], ['latin', 0x2013, 0x2014], ['latin', 0x2018, 0x201E], ['latin', 0x2026, 0x2026],
  ['latin', 0x20AC, 0x20AC], ['latin', 0x2122, 0x2122], ['latin', 0x2212, 0x2212],
]

const lines = [
  '/**',
  ' * Advance widths of Noto Sans in thousandths of the font size, 0 where the face has no such character.',
  ' * Made by scripts/makeNotoSansWidths.mjs from the shipped font files; not to be edited by hand.',
  ' */',
  'export type FontFace = \'regular\' | \'semibold\' | \'semiboldItalic\'',
  '',
  '/** Runs of neighbouring code points, the first of which is `from`. */',
  'export const notoSansWidths: Record<FontFace, { from: number, widths: number[] }[]> = {',
]
for (const [face, suffix] of Object.entries(faces)) {
  lines.push(`  ${face}: [`)
  for (const [subset, from, to] of ranges) {
    const font = openSync(path(`node_modules/@fontsource/noto-sans/files/noto-sans-${subset}-${suffix}.woff2`))
    const widths = []
    for (let code = from; code <= to; code++) {
      widths.push(font.hasGlyphForCodePoint(code) ? Math.round(1000 * font.glyphForCodePoint(code).advanceWidth / font.unitsPerEm) : 0)
    }
    lines.push(`    { from: 0x${from.toString(16).toUpperCase()}, widths: [`)
    for (let i = 0; i < widths.length; i += 28) lines.push(`      ${widths.slice(i, i + 28).join(', ')},`)
    lines.push('    ] },')
  }
  lines.push('  ],')
}
lines.push('}', '')
writeFileSync(path('shared/plots/text/notoSansWidths.ts'), lines.join('\n'))
