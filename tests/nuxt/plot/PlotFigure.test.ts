import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import { readFileSync } from 'node:fs'
import { SVG } from '@svgdotjs/svg.js'
import PlotFigure from '~/components/plot/PlotFigure.vue'
import { drawFigure } from '#shared/plots/drawFigure'
import { plotThemes } from '#shared/plots/theme'
import { crossingRows, slewPosition } from '../../unit/plots/figureCases'

const data = slewPosition()
const mount = (props: Record<string, unknown> = {}) => mountSuspended(PlotFigure, { props: { name: 'berthChart', data, ...props }, attachTo: document.body })

describe('a figure on the screen', () => {
  it('has its caption in words and its title as its name', async () => {
    const figure = await mount()
    expect(figure.find('figcaption').text()).toContain('comes nearest to −1 at 79.91 rad/s, at a distance of 0.466')
    expect(figure.find('svg.plot').attributes('aria-label')).toBe('Berth around the critical point')
    expect(figure.find('svg.plot').attributes('role')).toBe('group')
  })

  it('lights the crossing that it is given, and no other', async () => {
    const figure = await mount({ litCrossing: 'gain-2' })
    expect(figure.findAll('.is-lit').map(mark => mark.attributes('data-mark'))).toEqual(['gain-2'])
    await figure.setProps({ litCrossing: 'approach-1' })
    expect(figure.findAll('.is-lit').map(mark => mark.attributes('data-mark'))).toEqual(['approach-1'])
    await figure.setProps({ litCrossing: 'gain-99' })
    expect(figure.findAll('.is-lit')).toEqual([])
  })

  it('shows where a crossing lies on its curve when it has no mark for it', async () => {
    const figure = await mount({ name: 'returnDifferenceProfile', litCrossing: 'gain-2' })
    expect(figure.findAll('.is-lit')).toEqual([])
    expect(figure.findAll('svg[aria-hidden] circle')).toHaveLength(1)
    expect(figure.find('p').text()).toBe('gain crossover at 77.92 rad/s, falling, lag 32.7 deg')
  })

  it('tells the crossing under the pointer, in words too, and forgets it when the pointer leaves', async () => {
    const figure = await mount()
    await figure.find('[data-mark="gain-2"]').trigger('pointermove')
    expect(figure.emitted('update:litCrossing')?.at(-1)).toEqual(['gain-2'])
    expect(figure.find('p').text()).toBe('gain crossover at 77.92 rad/s, falling, lag 32.7 deg')
    await figure.find('svg.plot').trigger('pointerleave')
    expect(figure.emitted('update:litCrossing')?.at(-1)).toEqual([null])
  })

  it('has one stop for the tab key, and the arrow keys go from mark to mark in order of frequency', async () => {
    const figure = await mount()
    const stops = () => figure.findAll('[data-mark][tabindex="0"]').map(mark => mark.attributes('data-mark'))
    const order = figure.findAll('[data-mark]').map(mark => mark.attributes('data-mark'))
    expect(stops()).toEqual([order[0]])
    const first = figure.find<SVGGElement>(`[data-mark="${order[0]}"]`)
    first.element.focus()
    await first.trigger('keydown', { key: 'ArrowRight' })
    expect(figure.emitted('update:litCrossing')?.at(-1)).toEqual([order[1]])
    await figure.find(`[data-mark="${order[1]}"]`).trigger('keydown', { key: 'End' })
    expect(figure.emitted('update:litCrossing')?.at(-1)).toEqual([order.at(-1)])
  })

  it('tells the crossing that is chosen by key or by click', async () => {
    const figure = await mount()
    await figure.find('[data-mark="approach-1"]').trigger('keydown', { key: 'Enter' })
    await figure.find('[data-mark="phase-0"]').trigger('click')
    expect(figure.emitted('chooseCrossing')).toEqual([['approach-1'], ['phase-0']])
  })

  it('draws anew when its data change', async () => {
    const figure = await mount()
    await figure.setProps({ data: { ...data, requiredVectorMargin: null } })
    expect(figure.html()).not.toContain('required')
  })

  it('gives each row of the crossing chart ids of its own', async () => {
    const figure = await mountSuspended(PlotFigure, { props: { name: 'crossingChart', data: crossingRows() } })
    expect(figure.find('[data-mark="SL-P/gain-0"]').attributes('aria-label')).toBe('gain crossover at 16.53 rad/s, falling, lag 75.1 deg')
  })
})

describe('a figure drawn in a page', () => {
  it('is the same as that drawn on the server', () => {
    const drawing = SVG(document.createElementNS('http://www.w3.org/2000/svg', 'svg'))
    drawFigure(drawing, 'gainOverPhase', data, { width: 642, theme: plotThemes.print })
    const onServer = readFileSync('tests/golden/plots/gain-over-phase-plain.svg', 'utf8')
    const elements = (svg: string) => svg.replace(/\s*\n/g, '').replace(/^.*?<\/desc>|^<svg[^>]*>/, '').replaceAll('/>', '>').replace(/<\/(?:path|rect|circle)>/g, '')
    expect(elements(onServer).length).toBeGreaterThan(5000)
    expect(elements(drawing.node.outerHTML)).toBe(elements(onServer))
  })
})
