export interface FontFile {
  family: 'Noto Sans' | 'Noto Sans Mono' | 'Noto Sans Math'
  package: 'noto-sans' | 'noto-sans-mono' | 'noto-sans-math'
  file: string
  weight: 400 | 600
  style: 'normal' | 'italic'
  /** the characters it holds, as the font packages state them; inclusive */
  ranges: readonly (readonly [number, number])[]
  /** a family whose characters are looked for only in texts of its own class */
  only?: 'mono'
}

type Ranges = FontFile['ranges']

/** Unicode ranges of the subsets, as @fontsource/noto-sans states them. */
const subsets: Record<string, Ranges> = {
  'latin': [[0x0, 0xFF], [0x131, 0x131], [0x152, 0x153], [0x2BB, 0x2BC], [0x2C6, 0x2C6], [0x2DA, 0x2DA], [0x2DC, 0x2DC], [0x304, 0x304], [0x308, 0x308], [0x329, 0x329], [0x2000, 0x206F], [0x20AC, 0x20AC], [0x2122, 0x2122], [0x2191, 0x2191], [0x2193, 0x2193], [0x2212, 0x2212], [0x2215, 0x2215], [0xFEFF, 0xFEFF], [0xFFFD, 0xFFFD]],
  'latin-ext': [[0x100, 0x2BA], [0x2BD, 0x2C5], [0x2C7, 0x2CC], [0x2CE, 0x2D7], [0x2DD, 0x2FF], [0x1D00, 0x1DBF], [0x1E00, 0x1E9F], [0x1EF2, 0x1EFF], [0x2020, 0x2020], [0x20A0, 0x20AB], [0x20AD, 0x20C0], [0x2113, 0x2113], [0x2C60, 0x2C7F], [0xA720, 0xA7FF]],
  'greek': [[0x370, 0x377], [0x37A, 0x37F], [0x384, 0x38A], [0x38C, 0x38C], [0x38E, 0x3A1], [0x3A3, 0x3FF]],
  'greek-ext': [[0x1F00, 0x1FFF]],
  'cyrillic': [[0x301, 0x301], [0x400, 0x45F], [0x490, 0x491], [0x4B0, 0x4B1], [0x2116, 0x2116]],
  'cyrillic-ext': [[0x460, 0x52F], [0x1C80, 0x1C8A], [0x20B4, 0x20B4], [0x2DE0, 0x2DFF], [0xA640, 0xA69F], [0xFE2E, 0xFE2F]],
  'vietnamese': [[0x300, 0x301], [0x303, 0x304], [0x309, 0x309], [0x323, 0x323], [0x1EA0, 0x1EF9], [0x20AB, 0x20AB]],
}

/** Relations, operators, arrows, super- and subscripts: what Noto Sans itself lacks. */
const mathematical: Ranges = [[0x2070, 0x209F], [0x2100, 0x2112], [0x2114, 0x2115], [0x2117, 0x2121], [0x2123, 0x2190], [0x2192, 0x2192], [0x2194, 0x2211], [0x2213, 0x2214], [0x2216, 0x23FF], [0x25A0, 0x25FF], [0x27C0, 0x27FF], [0x2900, 0x2AFF], [0x1D400, 0x1D7FF]]

const faces = [[400, 'normal'], [600, 'normal'], [400, 'italic'], [600, 'italic']] as const

/** Every font file a report may carry, in the order they are looked at. */
export const fontFiles: readonly FontFile[] = [
  ...Object.entries(subsets).flatMap(([subset, ranges]) => faces.map(([weight, style]): FontFile => (
    { family: 'Noto Sans', package: 'noto-sans', file: `noto-sans-${subset}-${weight}-${style}.woff2`, weight, style, ranges }
  ))),
  ...['latin', 'greek'].map((subset): FontFile => (
    { family: 'Noto Sans Mono', package: 'noto-sans-mono', file: `noto-sans-mono-${subset}-400-normal.woff2`, weight: 400, style: 'normal', ranges: subsets[subset] ?? [], only: 'mono' }
  )),
  { family: 'Noto Sans Math', package: 'noto-sans-math', file: 'noto-sans-math-latin-400-normal.woff2', weight: 400, style: 'normal', ranges: mathematical },
]
