import { describe, expect, it } from 'vitest'
import { createDrawing } from '#server/adapters/svgdom/createDrawing'
import { renderFigure } from '#server/adapters/svgdom/renderFigure'
import { alignedViews } from '#shared/plots/curves/alignedViews'
import { curveStyle } from '#shared/plots/curves/curveStyle'
import { curveViews } from '#shared/plots/curves/curveViews'
import { valueOfView } from '#shared/plots/curves/valueOfView'
import { sampleShape } from '#shared/plots/marks/drawSamples'
import { drawFigure } from '#shared/plots/drawFigure'
import type { LoopFigureData } from '#shared/plots/FigureData'
import type { FigureName } from '#shared/plots/figures'
import { figures } from '#shared/plots/figures'
import { buildBlockResponse } from '#shared/plots/buildBlockResponse'
import { buildLoopFigureData } from '#shared/plots/buildLoopFigureData'
import { chooseFrequencyRange } from '#shared/plots/sampling/chooseFrequencyRange'
import { readoutOf } from '#shared/plots/text/readoutOf'
import { plotThemes } from '#shared/plots/theme'
import { analysisByScan } from './analysisByScan'
import { compared, conditional, crossingRows, crowded, delayed, measured, overlaid, slewGain, slewPosition, unstable } from './figureCases'
import { loopGainOfRoots } from './loopGainOfRoots'

/** SVG.js writes colours in small letters. */
const unmet = plotThemes.print.unmet.toLowerCase()
const loopFigures = ['berthChart', 'returnDifferenceProfile', 'magnitudePhase', 'gainOverPhase'] as const
const draw = (name: typeof loopFigures[number], data: LoopFigureData, width = 642) => drawFigure(createDrawing(), name, data, { width, theme: plotThemes.print })

describe('every figure', () => {
  it('gives the same bytes twice, whatever was drawn between', () => {
    for (const name of loopFigures) {
      const once = renderFigure(name, slewPosition(), { id: 'a' })
      renderFigure(name, crowded(), { id: 'b', theme: plotThemes.screen })
      expect(renderFigure(name, slewPosition(), { id: 'a' })).toBe(once)
    }
  })

  it('leaves its data as they were', () => {
    const data = measured()
    const before = structuredClone(data)
    for (const name of loopFigures) renderFigure(name, data, { id: 'a' })
    expect(data).toEqual(before)
  })

  it.each(Object.entries({ slewPosition, crowded, unstable, measured, overlaid, compared, delayed, conditional }))('never writes a number that is none, %s', (_, make) => {
    for (const name of loopFigures) expect(renderFigure(name, make(), { id: 'a' })).not.toMatch(/NaN|Infinity|undefined|null/)
  })

  it('never writes a number that is none in the crossing chart', () => {
    expect(renderFigure('crossingChart', crossingRows(), { id: 'a' })).not.toMatch(/NaN|Infinity|undefined|null/)
  })

  it('is an image with a title and a caption to one who cannot see it', () => {
    const svg = renderFigure('berthChart', slewPosition(), { id: 'sl-p' })
    expect(svg).toContain('role="img"')
    expect(svg).toContain('aria-labelledby="sl-p-title sl-p-caption"')
    expect(svg).toContain('<title id="sl-p-title">Berth around the critical point</title>')
  })

  it('escapes what people typed', () => {
    const svg = renderFigure('crossingChart', { ...crossingRows(), rows: [{ ...crossingRows().rows[0]!, code: '<b>&"' }] }, { id: 'a' })
    expect(svg).not.toContain('<b>')
    expect(svg).toContain('&lt;b&gt;&amp;')
  })

  it('draws a loop without any crossing, and one whose gain is zero', () => {
    const gain = loopGainOfRoots({ gain: 0, poles: [[-1, 0]] })
    const data = buildLoopFigureData({ title: 'Z', requiredVectorMargin: 0.5, curves: [{ name: 'as given', gain, analysis: analysisByScan(gain, 0.1, 10) }] })
    for (const name of loopFigures) expect(renderFigure(name, data, { id: 'a' })).not.toMatch(/NaN|Infinity/)
  })

  it('has a mark for every crossing in sight, named by its place in the list', () => {
    const { analysis } = slewPosition().curves[0]
    const count = analysis.gainCrossovers.length + analysis.phaseCrossovers.length + analysis.closestApproaches.length
    const ids = draw('magnitudePhase', slewPosition()).marks.map(mark => mark.id)
    expect(ids).toHaveLength(count)
    expect(ids).toContain('gain-2')
    expect(new Set(ids).size).toBe(count)
  })

  it.each(loopFigures)('finds the frequency under the place where it draws it, %s', (name) => {
    const figure = draw(name, slewPosition())
    for (const frequency of [20, 41.5, 79.91, 101]) {
      for (const { x, y } of figure.pointsAt(frequency)) expect(figure.locate(x, y)!.frequency / frequency).toBeCloseTo(1, 2)
    }
    expect(figure.locate(-50, -50)).toBeNull()
  })

  it('tells the row of the crossing chart under the pointer', () => {
    const data = crossingRows()
    const figure = drawFigure(createDrawing(), 'crossingChart', data, { width: 900, theme: plotThemes.screen })
    const [panel] = figure.panels
    expect(figure.locate(panel!.x + 5, panel!.y + panel!.height * 1.5 / data.rows.length)!.row).toBe('SL-P')
  })
})

describe('several sources of one loop in one set of axes', () => {
  it('brings a sweep that begins in the middle of the band into the turn of the model', () => {
    // exp(-6 s)/(s + 1): a sweep from 1 rad/s on begins a turn further, which its slope alone does not tell
    const gain = loopGainOfRoots({ gain: 1, poles: [[-1, 0]], deadTime: 6 })
    const analysis = analysisByScan(gain, 0.01, 3)
    const { curves } = buildLoopFigureData({
      title: 'Z', requiredVectorMargin: null, range: { from: 0.01, to: 3 },
      curves: [{ name: 'model', gain, analysis }, { name: 'sweep', gain: { ...gain, axisStart: 1, axisEnd: 2 }, analysis, sampleFrequencies: [1, 1.5, 2] }],
    })
    const turned = curveViews(curves[1]!.curve)
    const [model, sweep] = alignedViews(curves)
    for (const w of [1.1, 1.5, 1.9]) {
      expect(valueOfView(curves[1]!.curve, sweep!.phase, w)).toBeCloseTo(valueOfView(curves[0].curve, model!.phase, w)!, 0)
      // closed form: -atan w - 6 w, in the drawing's accuracy
      expect(valueOfView(curves[1]!.curve, sweep!.phase, w)).toBeCloseTo(-(Math.atan(w) + 6 * w) * 180 / Math.PI, 0)
    }
    expect(valueOfView(curves[1]!.curve, turned.phase, 1.5)! - valueOfView(curves[1]!.curve, sweep!.phase, 1.5)!).toBeCloseTo(360, 6)
  })

  it('marks the samples of each sweep in a shape of its own, and none of an approximation', () => {
    const shapeOf = (index: number) => sampleShape(index, 0, 0)
    expect(new Set([1, 2, 3, 4].map(shapeOf)).size).toBe(4)
    expect(compared().curves.map(curve => curve.samples?.length ?? 0)).toEqual([0, 0, 80, 80])
  })

  it('tells lines apart without colour: the main one thick, the approximation whole and thin, the others broken each in its own way', () => {
    const styles = compared().curves.map((_, index) => curveStyle(compared().curves, index, plotThemes.greyscale))
    const dashes = styles.map(({ attributes }) => attributes['stroke-dasharray'])
    expect(dashes.slice(0, 2)).toEqual([undefined, undefined])
    expect(styles[1]!.width).toBeLessThan(styles[0]!.width * 0.6)
    expect(new Set(dashes.slice(2)).size).toBe(2)
  })

  it.each(loopFigures)('says in the caption what the other lines are, %s', (name) => {
    const caption = figures[name].caption(compared())
    expect(caption).toContain('Broken lines: sweep 1 (measured, its samples marked) and sweep 2 (measured, its samples marked); marks and words are those of design model.')
    expect(caption).toContain('Thin line: the continuous approximation.')
    expect(figures[name].caption(slewPosition())).not.toMatch(/[Bb]roken|Thin line/)
  })
})

describe('a loop that is not stable', () => {
  it('has the word and no margins in any figure or caption', () => {
    for (const name of loopFigures) {
      const svg = renderFigure(name, unstable(), { id: 'a' })
      expect(svg).toContain('unstable')
      expect(svg).not.toMatch(/may rise|may fall|lag \d|lead \d|one change/)
      expect(figures[name].caption(unstable())).toContain('unstable')
    }
  })

  it('is not judged against the criterion in the crossing chart', () => {
    const row = crossingRows().rows.find(({ standing }) => standing === 'unstable')!
    const svg = renderFigure('crossingChart', { ...crossingRows(), rows: [row] }, { id: 'a' })
    const at = svg.indexOf('>0.28<')
    const sounding = svg.slice(svg.lastIndexOf('<g>', at), at + 6)
    expect(sounding).toContain('>0.28<')
    expect(sounding).not.toContain(unmet)
  })
})

describe('a loop that is nearest to -1 at an end of its axis', () => {
  // closed form: L(0) = -0.7, so |1 + L| = 0.3 there, and L shrinks from there on
  const gain = loopGainOfRoots({ gain: -0.7, poles: [[-1, 0]] })
  const analysis = { ...analysisByScan(gain, 0.1, 100), closestApproaches: [], vectorMargin: { distance: 0.3, frequency: 0 } }
  const data = buildLoopFigureData({ title: 'E', requiredVectorMargin: 0.5, curves: [{ name: 'as given', analysis, gain }] })

  it('has its least distance told there, not at a lesser approach', () => {
    expect(renderFigure('berthChart', data, { id: 'a' })).toContain('>least distance 0.300 at zero frequency<')
    expect(renderFigure('returnDifferenceProfile', data, { id: 'a' })).toContain('>at zero frequency<')
  })

  it('has its sounding at the end of its row, under the criterion in the colour of what is not met', () => {
    const row = { ...crossingRows().rows[0]!, analysis }
    const svg = renderFigure('crossingChart', { ...crossingRows(), rows: [row] }, { id: 'a' })
    expect(svg).toMatch(new RegExp(`fill="${unmet}"[^>]*>0.30<`))
  })
})

describe('an approach no deeper than the noise of its measurement', () => {
  it('is marked, but not numbered, and its caption says so', () => {
    const data = measured()
    const [main] = data.curves
    const noisy = { ...data, curves: [{ ...main, analysis: { ...main.analysis, closestApproaches: main.analysis.closestApproaches.map((approach, i) => i === 0 ? { ...approach, withinNoise: true } : approach) } }] } satisfies LoopFigureData
    expect(renderFigure('returnDifferenceProfile', data, { id: 'a' })).toContain('>0.85<')
    expect(renderFigure('returnDifferenceProfile', noisy, { id: 'a' })).not.toContain('>0.85<')
    expect(draw('returnDifferenceProfile', noisy).marks.map(mark => mark.id)).toContain('approach-0')
    expect(figures.returnDifferenceProfile.caption(noisy)).toContain('within the noise')
  })
})

describe('captions', () => {
  it.each(Object.keys(figures) as FigureName[])('are whole sentences of what to see, %s', (name) => {
    const caption = name === 'crossingChart'
      ? figures.crossingChart.caption(crossingRows())
      : name === 'blockResponse' ? figures.blockResponse.caption(buildBlockResponse({ title: 'G', frequencyUnit: 'rad/s', gain: slewGain })) : figures[name].caption(slewPosition())
    expect(caption).toMatch(/^[A-Z].*\.$/)
    expect(caption).not.toMatch(/ {2}|\.\.|undefined/)
  })
  it('say how a measured response is drawn', () => {
    expect(figures.berthChart.caption(measured())).toContain('95 % confidence discs')
    expect(figures.magnitudePhase.caption(measured())).toContain('hatched')
  })
  it('count the loops of a crossing chart by their standing, the worst first', () => {
    expect(figures.crossingChart.caption(crossingRows())).toContain('Of the loops, 1 unstable, 2 not met, 1 not shown, 1 without data, 1 accepted by deviation.')
  })
})

describe('the range of frequency shown', () => {
  it('has every crossing in it', () => {
    for (const data of [slewPosition(), crowded(), conditional(), delayed()]) {
      const { analysis } = data.curves[0]
      for (const { frequency } of [...analysis.gainCrossovers, ...analysis.phaseCrossovers, ...analysis.closestApproaches]) {
        expect(frequency).toBeGreaterThan(data.range.from)
        expect(frequency).toBeLessThan(data.range.to)
      }
    }
  })
  it('ends at half the sample rate, and at the ends of measured data', () => {
    const analysis = analysisByScan(slewGain, 0.5, 3000)
    expect(chooseFrequencyRange(analysis, { ...slewGain, axisEnd: 2000 }).to).toBe(2000)
    expect(chooseFrequencyRange(analysis, { ...slewGain, axisStart: 3, axisEnd: 200 })).toEqual({ from: 3, to: 200 })
  })
  it('is in the unit of the analysis', () => {
    const hertz = chooseFrequencyRange(analysisByScan(slewGain, 0.5, 3000, 'stable', 'Hz'), { ...slewGain, axisEnd: 2 * Math.PI * 300 })
    expect(hertz.to).toBeCloseTo(300, 9)
  })
  it('is found for a loop without crossings, with or without features', () => {
    const flat = loopGainOfRoots({ gain: 0.1, poles: [] })
    expect(chooseFrequencyRange(analysisByScan(flat, 0.1, 10), flat)).toEqual({ from: 0.1, to: 10 })
    const slow = loopGainOfRoots({ gain: 0.1, poles: [[-0.003, 0]] })
    const { from, to } = chooseFrequencyRange(analysisByScan(slow, 0.0001, 10), slow)
    expect(from).toBeLessThan(0.003)
    expect(to).toBeGreaterThan(0.003)
  })
})

describe('the readout under the pointer', () => {
  it('tells gain, phase and return difference', () => {
    // closed form: an integrator of gain 10 at w = 10 is -j: 0 dB, -90 deg, |1 - j| = sqrt 2
    const gain = loopGainOfRoots({ gain: 10, poles: [[0, 0]] })
    const data = buildLoopFigureData({ title: 'I', requiredVectorMargin: null, curves: [{ name: 'as given', gain, analysis: analysisByScan(gain, 0.1, 1000) }] })
    expect(readoutOf(data, 10)).toBe('10.00 rad/s: |L| 1.00 (0.0 dB), phase −90.0 deg, |1 + L| 1.41')
    expect(readoutOf(data, 1e9)).toBe('1.000e9 rad/s: no value')
  })
})
