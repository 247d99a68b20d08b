import { existsSync, readFileSync, writeFileSync } from 'node:fs'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import type { RenderOptions } from '#server/adapters/svgdom/renderFigure'
import { renderFigure } from '#server/adapters/svgdom/renderFigure'
import type { FigureDataOf, FigureName } from '#shared/plots/figures'
import { plotThemes } from '#shared/plots/theme'
import { compared, conditional, crossingRows, crowded, delayed, measured, measuredWithModel, overlaid, slewPosition, unstable } from './figureCases'

/**
 * Each figure against a reviewed file, byte by byte. To renew them after a wanted change: delete the files, run with RENEW_GOLDEN=1, and look at every one
 * before committing it.
 */
const golden = (name: string) => fileURLToPath(new URL(`../../golden/plots/${name}.svg`, import.meta.url))

function expectGolden<Name extends FigureName>(file: string, name: Name, data: FigureDataOf[Name], options: Partial<RenderOptions> = {}): void {
  // One element a line, so that a difference is readable.
  const svg = `${renderFigure(name, data, { id: file, ...options }).replace(/></g, '>\n<')}\n`
  if (!existsSync(golden(file)) && process.env.RENEW_GOLDEN === '1') writeFileSync(golden(file), svg)
  expect(svg).toBe(readFileSync(golden(file), 'utf8'))
}

describe('figures as reviewed', () => {
  it('crossing chart: unstable, measured, crowded and empty rows, on paper', () => {
    expectGolden('crossing-chart-paper', 'crossingChart', crossingRows())
  })
  it('crossing chart on a telephone, names over their rows', () => {
    expectGolden('crossing-chart-narrow', 'crossingChart', crossingRows(), { width: 374, theme: plotThemes.screen })
  })
  it('crossing chart without a loop', () => {
    expectGolden('crossing-chart-empty', 'crossingChart', { ...crossingRows(), rows: [] })
  })

  it.each([
    ['berth-chart', 'berthChart'],
    ['return-difference-profile', 'returnDifferenceProfile'],
    ['magnitude-phase', 'magnitudePhase'],
    ['gain-over-phase', 'gainOverPhase'],
  ] as const)('%s of a plain, a crowded, an unstable, a measured and an overlaid loop', (file, name) => {
    expectGolden(`${file}-plain`, name, slewPosition())
    expectGolden(`${file}-crowded`, name, crowded())
    expectGolden(`${file}-unstable`, name, unstable())
    expectGolden(`${file}-measured`, name, measured(), { theme: plotThemes.greyscale })
    expectGolden(`${file}-overlaid`, name, overlaid(), { width: 560, theme: plotThemes.screen })
  })

  it.each([
    ['berth-chart', 'berthChart'],
    ['return-difference-profile', 'returnDifferenceProfile'],
    ['magnitude-phase', 'magnitudePhase'],
    ['gain-over-phase', 'gainOverPhase'],
  ] as const)('%s of a model with its approximation and two sweeps over it, and of a sweep with its model, on paper', (file, name) => {
    expectGolden(`${file}-compared`, name, compared())
    expectGolden(`${file}-measured-with-model`, name, measuredWithModel())
  })

  it('berth chart and gain over phase of a long dead time, too closely wound to be drawn', () => {
    expectGolden('berth-chart-delayed', 'berthChart', delayed())
    expectGolden('gain-over-phase-delayed', 'gainOverPhase', delayed())
    expectGolden('magnitude-phase-delayed', 'magnitudePhase', delayed())
  })

  it('gain over phase of a conditionally stable loop, the critical point between two phase crossovers', () => {
    expectGolden('gain-over-phase-conditional', 'gainOverPhase', conditional())
  })
})
