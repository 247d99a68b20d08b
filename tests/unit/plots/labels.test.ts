import { describe, expect, it } from 'vitest'
import { renderFigure } from '#server/adapters/svgdom/renderFigure'
import { LabelField } from '#shared/plots/labels/LabelField'
import { spreadLabels } from '#shared/plots/labels/spreadLabels'
import type { FontFace } from '#shared/plots/text/notoSansWidths'
import { textWidth } from '#shared/plots/text/textWidth'
import { crossingRows, crowded, delayed, measured, overlaid, slewPosition, unstable } from './figureCases'

interface Box { text: string, x: number, y: number, width: number, height: number }

/** Boxes of all texts of a figure, from their attributes and the width table. */
function boxesOf(svg: string): Box[] {
  return [...svg.matchAll(/<text ([^>]*)>([^<]*)<\/text>/g)].map(([, attributes, text]) => {
    const value = (name: string) => attributes!.match(new RegExp(` ?${name}="([^"]*)"`))?.[1]
    const size = Number(value('font-size'))
    const face: FontFace = value('font-style') ? 'semiboldItalic' : value('font-weight') ? 'semibold' : 'regular'
    const width = textWidth(text!.replaceAll('&amp;', '&'), size, face)
    const anchor = value('text-anchor') ?? 'start'
    const x = Number(value('x')) - (anchor === 'middle' ? width / 2 : anchor === 'end' ? width : 0)
    // from the height of capitals to the baseline
    return { text: text!, x, y: Number(value('y')) - size * 0.72, width, height: size * 0.72 }
  })
}

const overlap = (a: Box, b: Box) => a.x < b.x + b.width - 0.5 && b.x < a.x + a.width - 0.5 && a.y < b.y + b.height - 0.5 && b.y < a.y + a.height - 0.5

function overlaps(svg: string): string[] {
  const boxes = boxesOf(svg)
  return boxes.flatMap((a, i) => boxes.slice(i + 1).filter(b => overlap(a, b)).map(b => `${a.text} | ${b.text}`))
}

describe('labels of a figure', () => {
  const loops = { slewPosition, crowded, unstable, measured, overlaid, delayed }
  const names = ['berthChart', 'returnDifferenceProfile', 'magnitudePhase', 'gainOverPhase'] as const
  it.each(Object.keys(loops) as (keyof typeof loops)[])('never lie over each other, %s', (loop) => {
    for (const name of names) {
      for (const width of [360, 642, 900]) expect(overlaps(renderFigure(name, loops[loop](), { id: 'a', width }))).toEqual([])
    }
  })

  it('never lie over each other in the crossing chart, however narrow', () => {
    for (const width of [340, 480, 642, 1180]) expect(overlaps(renderFigure('crossingChart', crossingRows(), { id: 'a', width }))).toEqual([])
  })

  it('stay inside the figure', () => {
    for (const name of names) {
      for (const { text, x, y, width, height } of boxesOf(renderFigure(name, crowded(), { id: 'a', width: 400 }))) {
        expect(x, text).toBeGreaterThanOrEqual(-0.5)
        expect(x + width, text).toBeLessThanOrEqual(400.5)
        expect(y + height, text).toBeGreaterThan(0)
      }
    }
  })
})

describe('the field of free places', () => {
  const field = () => new LabelField({ x: 0, y: 0, width: 200, height: 100 })

  it('gives no place where everything is taken, but one when it must', () => {
    const full = field()
    full.blockRectangle({ x: 0, y: 0, width: 200, height: 100 })
    expect(full.place({ x: 50, y: 50, width: 30, height: 10 })).toBeNull()
    expect(full.place({ x: 50, y: 50, width: 30, height: 10 }, true)).not.toBeNull()
  })

  it('gives no place to a label wider than the figure, even when it must', () => {
    expect(field().place({ x: 50, y: 50, width: 300, height: 10 }, true)).toBeNull()
  })

  it('never gives a place twice', () => {
    const shared = field()
    const places = Array.from({ length: 12 }, () => shared.place({ x: 100, y: 50, width: 24, height: 10 })).filter(place => place !== null)
    expect(places.length).toBeGreaterThan(4)
    places.forEach((a, i) => places.slice(i + 1).forEach(b => expect(overlap({ ...a, text: '' }, { ...b, text: '' })).toBe(false)))
  })

  it('keeps off a line', () => {
    const crossed = field()
    crossed.blockPolylines([[0, 45, 200, 45]])
    const place = crossed.place({ x: 100, y: 50, width: 40, height: 10, prefer: 90 })!
    expect(place.y > 45 || place.y + place.height < 45).toBe(true)
  })
})

describe('spreading labels along a line', () => {
  it('leaves labels that do not meet where they are', () => {
    expect(spreadLabels([{ x: 10, width: 10, weight: 1 }, { x: 50, width: 10, weight: 1 }], 0, 100, 2, 20)).toEqual([10, 50])
  })

  it('moves two that meet apart by the same way', () => {
    expect(spreadLabels([{ x: 50, width: 10, weight: 1 }, { x: 50, width: 10, weight: 2 }], 0, 100, 2, 20)).toEqual([44, 56])
  })

  it('drops the lightest where there is no room for all', () => {
    const labels = [3, 1, 2].map(weight => ({ x: 50, width: 20, weight }))
    expect(spreadLabels(labels, 0, 100, 2, 15)).toEqual([39, null, 61])
  })

  it('finds room for the few of ten thousand that fit, the weightiest among them', () => {
    const labels = Array.from({ length: 10_000 }, (_, index) => ({ x: 600 * index / 10_000, width: 24, weight: index === 5000 ? 2 : 1 }))
    const middles = spreadLabels(labels, 0, 600, 4, 20)
    const kept = middles.flatMap((x, index) => (x === null ? [] : [{ x, moved: Math.abs(x - labels[index]!.x) }]))
    expect(middles[5000]).not.toBeNull()
    expect(kept.length).toBeGreaterThan(10)
    expect(Math.max(...kept.map(({ moved }) => moved))).toBeLessThanOrEqual(20)
    const places = kept.map(({ x }) => x).sort((a, b) => a - b)
    expect(Math.min(...places.slice(1).map((x, index) => x - places[index]!))).toBeGreaterThan(24 + 4 - 1e-9)
  })

  it('keeps labels between the ends', () => {
    expect(spreadLabels([{ x: 0, width: 20, weight: 1 }], 0, 100, 2, 20)).toEqual([10])
  })

  it('gives nothing for nothing', () => {
    expect(spreadLabels([], 0, 100, 2, 20)).toEqual([])
  })
})
