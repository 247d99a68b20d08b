import { createRequire } from 'node:module'
import { openSync } from 'fontkit'
import { describe, expect, it } from 'vitest'
import { fitText } from '#shared/plots/text/fitText'
import { formatTick } from '#shared/plots/text/formatTick'
import { textWidth } from '#shared/plots/text/textWidth'
import { plotThemes } from '#shared/plots/theme'
import { linearTicks } from '#shared/plots/scales/linearTicks'
import { logTicks } from '#shared/plots/scales/logTicks'

describe('width of a text', () => {
  it.each([['regular', '400-normal'], ['semibold', '600-normal'], ['semiboldItalic', '600-italic']] as const)('is that of the shipped font, %s', (face, file) => {
    const font = openSync(createRequire(import.meta.url).resolve(`@fontsource/noto-sans/files/noto-sans-latin-${file}.woff2`))
    if (!('layout' in font)) throw new Error('one font was expected')
    for (const text of ['closest approach 0.435 at 81.5 rad/s', 'critical point −1', 'µ × ° · 0123456789']) {
      const advance = [...text].reduce((sum, character) => sum + font.glyphForCodePoint(character.codePointAt(0)!).advanceWidth, 0)
      expect(textWidth(text, font.unitsPerEm, face)).toBeCloseTo(advance, 6)
    }
  })
  it('is never thought too small for a character the font lacks', () => {
    expect(textWidth('漢', 10)).toBe(9)
    expect(textWidth('', 10)).toBe(0)
  })
  it('cuts a name that does not fit with an ellipsis, or to nothing', () => {
    expect(fitText('Telescope position', 60, 12)).toMatch(/^Telesc.*…$/)
    expect(textWidth(fitText('Telescope position', 60, 12), 12)).toBeLessThanOrEqual(60)
    expect(fitText('Telescope', 3, 12)).toBe('')
    expect(fitText('Telescope', 300, 12)).toBe('Telescope')
  })
})

describe('numbers of an axis', () => {
  it.each([[0, '0'], [-0, '0'], [-180, '−180'], [0.05, '0.05'], [20000, '20000'], [1e6, '1e6'], [2e-5, '2e−5'], [0.30000000000000004, '0.3']])('%s is %s', (value, text) => {
    expect(formatTick(value)).toBe(text)
  })
})

describe('ticks of a logarithmic axis', () => {
  const majors = (from: number, to: number, most: number) => logTicks(from, to, most).filter(tick => tick.major).map(tick => tick.value)
  it('are 1, 2, 5 over a few decades', () => {
    expect(majors(1, 1000, 12)).toEqual([1, 2, 5, 10, 20, 50, 100, 200, 500, 1000])
  })
  it('are decades over many, and every other one over very many', () => {
    expect(majors(1e-3, 1e3, 7)).toEqual([1e-3, 1e-2, 0.1, 1, 10, 100, 1000])
    expect(majors(1e-12, 1e12, 13)).toHaveLength(13)
  })
  it('are even steps within less than an octave', () => {
    expect(majors(281, 284, 8)).toEqual([281, 281.5, 282, 282.5, 283, 283.5, 284])
  })
  it('are never more than asked for', () => {
    for (const [from, to] of [[1, 3], [0.7, 90], [3e-7, 5e8], [10, 11]] as const) {
      for (const most of [2, 3, 5, 9, 20]) expect(majors(from, to, most).length).toBeLessThanOrEqual(most + 1)
    }
  })
})

describe('ticks of a linear axis', () => {
  it('take the smallest step that gives no more than asked for', () => {
    expect(linearTicks(-80, 40, 7, [5, 10, 20, 40])).toEqual([-80, -60, -40, -20, 0, 20, 40])
    expect(linearTicks(-5000, 0, 4, [90, 180, 360])).toEqual([-4320, -2880, -1440, 0])
  })
})

describe('colours of the figures', () => {
  /** Contrast ratio of WCAG 2.2 (W3C Recommendation, 2023), section on relative luminance. */
  function contrast(a: string, b: string): number {
    const luminance = (colour: string) => {
      const [r, g, b] = [1, 3, 5].map(i => Number.parseInt(colour.slice(i, i + 2), 16) / 255).map(c => c <= 0.04045 ? c / 12.92 : ((c + 0.055) / 1.055) ** 2.4) as [number, number, number]
      return 0.2126 * r + 0.7152 * g + 0.0722 * b
    }
    const [high, low] = [luminance(a), luminance(b)].sort((x, y) => y - x) as [number, number]
    return (high + 0.05) / (low + 0.05)
  }
  it.each(Object.values(plotThemes))('let every text be read where it may stand, $name', (theme) => {
    for (const text of [theme.ink, theme.slate, theme.sea, theme.magenta, theme.met, theme.unmet, theme.unshown]) expect(contrast(text, theme.paper)).toBeGreaterThanOrEqual(4.5)
    for (const text of [theme.ink, theme.sea, theme.magenta, theme.unmet]) {
      for (const ground of [theme.shoal[0], theme.shoal[1], theme.buff]) expect(contrast(text, ground), `${text} on ${ground}`).toBeGreaterThanOrEqual(4.5)
    }
    expect(contrast(theme.ink, theme.shoal[2])).toBeGreaterThanOrEqual(4.5)
  })
})
