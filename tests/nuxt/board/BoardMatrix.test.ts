import { mountSuspended } from '@nuxt/test-utils/runtime'
import { describe, expect, it } from 'vitest'
import BoardMatrix from '~/components/board/BoardMatrix.vue'
import { buildAnalysis, unstable } from '../builders/buildAnalysis'
import { buildCell, buildCondition, buildLoop } from '../builders/buildCell'

const loops = [buildLoop(1, 'SL-P'), buildLoop(2, 'TE-P')]
const conditions = [buildCondition(1, 'C1'), buildCondition(2, 'C2')]
const cells = [buildCell(1, 1, buildAnalysis()), buildCell(1, 2, buildAnalysis(unstable)), buildCell(2, 1, buildAnalysis())]
const mount = (given: typeof cells | null) => mountSuspended(BoardMatrix, {
  props: { systemId: 7, loops, conditions, cells: given, quantity: 'vectorMargin', conditionId: 1 },
  attachTo: document.body,
})

describe('the matrix of the board', () => {
  it('shows its frame at once, and says that the values are being computed', async () => {
    const matrix = await mount(null)
    expect(matrix.find('table').attributes('aria-busy')).toBe('true')
    expect(matrix.findAll('[role=gridcell]').map(cell => cell.text())).toEqual(Array(4).fill('computing …'))
  })

  it('says in words what stands in each cell', async () => {
    const texts = (await mount(cells)).findAll('[role=gridcell]').map(cell => cell.text())
    expect(texts[0]).toContain('0.700')
    expect(texts[0]).toContain('1 gain · 1 phase')
    expect(texts[0]).toContain('met')
    expect(texts[1]).toContain('unstable')
    expect(texts[3]).toBe('no data')
  })

  it('flags both cells of break points that disagree', async () => {
    const words = 'Opened here the closed loop is stable, opened at TE-P the same closed loop is unstable.'
    const matrix = await mount([buildCell(1, 1, buildAnalysis(), { disagreement: words }), buildCell(2, 1, buildAnalysis(unstable), { disagreement: words })])
    const cellsShown = matrix.findAll('[role=gridcell]')
    expect(cellsShown.map(cell => cell.text().includes('break points disagree'))).toEqual([true, false, true, false])
    expect(cellsShown[0]!.find('[title]').attributes('title')).toBe(words)
  })

  it('is one stop of the tab key; arrow keys walk it and stay inside', async () => {
    const matrix = await mount(cells)
    const links = matrix.findAll<HTMLElement>('[role=gridcell] a')
    expect(links.map(link => link.attributes('tabindex'))).toEqual(['0', '-1', '-1', '-1'])
    links[0]!.element.focus()
    await matrix.find('table').trigger('keydown', { key: 'ArrowUp' })
    expect(document.activeElement).toBe(links[0]!.element)
    await matrix.find('table').trigger('keydown', { key: 'ArrowRight' })
    await matrix.find('table').trigger('keydown', { key: 'ArrowDown' })
    expect(document.activeElement).toBe(links[3]!.element)
    expect(links.map(link => link.attributes('tabindex'))).toEqual(['-1', '-1', '-1', '0'])
  })

  it('leads from a cell to the loop in that condition', async () => {
    const links = (await mount(cells)).findAll('[role=gridcell] a')
    expect(links[3]!.attributes('href')).toBe('/systems/7/loops/2?condition=2')
  })

  it('hands on the condition whose heading is chosen', async () => {
    const matrix = await mount(cells)
    await matrix.findAll('thead button')[1]!.trigger('click')
    expect(matrix.emitted('choose')).toEqual([[2]])
  })
})
