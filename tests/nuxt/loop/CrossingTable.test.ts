import { mountSuspended } from '@nuxt/test-utils/runtime'
import type { VueWrapper } from '@vue/test-utils'
import { describe, expect, it } from 'vitest'
import { defaultCriteria } from '#shared/analysis/criteria/defaultCriteria'
import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import CrossingTable from '~/components/loop/CrossingTable.vue'
import { listCrossings } from '~/utils/listCrossings'
import { buildAnalysis, unstable } from '../builders/buildAnalysis'

const rowsOf = (table: VueWrapper) => table.findAll('tbody tr').map(row => row.findAll('td, th').map(cell => cell.text()))

describe('the table of every crossing', () => {
  it('gives distances and no margins for a loop that is not stable', async () => {
    const table = await mountSuspended(CrossingTable, { props: { analysis: buildAnalysis(unstable) } })
    expect(table.find('caption').text()).toContain('is unstable')
    expect(table.text()).not.toMatch(/margin(?!s\.)/)
    expect(rowsOf(table)[0]).toEqual(['10.00', 'gain crossover', 'gain falling', '1.000'])
    expect(table.text()).not.toContain('change that reaches')
  })

  it('mixes the kinds in order of frequency, from 0 to infinity', () => {
    const analysis = buildAnalysis({ phaseCrossovers: [{ frequency: 0, gainMargin: -3, slope: 'falling' }, { frequency: 'infinity', gainMargin: 20, slope: 'rising' }] })
    expect(listCrossings(analysis).map(crossing => crossing.id)).toEqual(['phase-0', 'gain-0', 'approach-0', 'phase-1'])
  })

  it('gives |1 + L| of a crossing in closed form: 60 deg of phase margin at |L| = 1 is a distance of 1, a gain margin of 6.0206 dB one of 0.5', () => {
    // 2 sin(30 deg) = 1; L = -1/2 is -6.0206 dB, by definition
    const [gain, , phase] = listCrossings(buildAnalysis({ phaseCrossovers: [{ frequency: 40, gainMargin: 20 * Math.log10(2), slope: 'falling' }] }))
    expect(gain!.distance).toBeCloseTo(1, 12)
    expect(phase!.distance).toBeCloseTo(0.5, 12)
  })

  it('says signs as words and names what each crossing sets', async () => {
    const analysis = buildAnalysis({
      gainCrossovers: [{ frequency: 10, phaseMargin: -20, delayMargin: 0.1, slope: 'rising' }],
      phaseCrossovers: [{ frequency: 40, gainMargin: -6.1, slope: 'falling' }],
    })
    const table = await mountSuspended(CrossingTable, { props: { analysis, rows: judgeAnalysis(analysis, defaultCriteria).rows, requiredVectorMargin: 0.75 } })
    expect(rowsOf(table)).toEqual([
      ['10.00', 'gain crossover', 'gain rising', 'lead 20.0 deg', '100 ms', '', 'under0.347', '', 'phase may lead, delay may grow'],
      ['20.00', 'closest approach', '', '', '', '', 'under0.700', 'gain rises 4.0 dB, lag 20.0 deg', 'vector margin'],
      ['40.00', 'phase crossover', 'phase falling', '', '', 'fall 6.1 dB', '1.018', '', 'gain may fall'],
    ])
  })

  it('tells where the continuous approximation of a sampled loop is wrong, beside each crossing, and has no such column otherwise', async () => {
    const approximation = { gain: -0.2, phase: -3.4, distance: 0.02 }
    const analysis = buildAnalysis({ gainCrossovers: [{ frequency: 10, phaseMargin: 60, delayMargin: 0.1, slope: 'falling', approximation }] })
    const table = await mountSuspended(CrossingTable, { props: { analysis } })
    expect(table.findAll('thead th').map(head => head.text())).toContain('Approximation')
    expect(rowsOf(table)[0]!.map(text => text.replaceAll('\u00A0', ' '))).toContain('lag 3.40 deg more, 0.20 dB less')
    expect((await mountSuspended(CrossingTable, { props: { analysis, compact: true } })).text()).toContain('approximation: lag 3.40 deg more, 0.20 dB less')
    expect((await mountSuspended(CrossingTable, { props: { analysis: buildAnalysis() } })).text()).not.toContain('pproximation')
  })

  it('lights the mark of the row under the pointer or the focus', async () => {
    const table = await mountSuspended(CrossingTable, { props: { analysis: buildAnalysis() }, attachTo: document.body })
    await table.findAll('tbody tr')[1]!.trigger('mouseenter')
    expect(table.emitted('update:lit')?.at(-1)).toEqual(['approach-0'])
    table.findAll<HTMLElement>('tbody tr')[0]!.element.focus()
    await table.find('tbody').trigger('keydown', { key: 'ArrowDown' })
    await table.find('tbody').trigger('keydown', { key: 'ArrowDown' })
    expect(table.emitted('update:lit')?.at(-1)).toEqual(['phase-0'])
  })

  it('folds many dips that noise alone would make, and tells how many', async () => {
    const dips = Array.from({ length: 5 }, (_, index) => ({ frequency: 100 + index, distance: 0.99, gainChange: 40, phaseChange: 3, withinNoise: true }))
    const table = await mountSuspended(CrossingTable, { props: { analysis: buildAnalysis({ closestApproaches: dips }) } })
    expect(rowsOf(table)).toHaveLength(2)
    expect(table.text()).toContain('5 more are no deeper than the noise')
    await table.find('button').trigger('click')
    expect(rowsOf(table)).toHaveLength(7)
  })

  it('says that there is none, and whether that is shown', async () => {
    const none = { gainCrossovers: [], phaseCrossovers: [], closestApproaches: [] }
    const proven = await mountSuspended(CrossingTable, { props: { analysis: buildAnalysis(none) } })
    expect(proven.text()).toContain('there is none, that is shown')
    const open = await mountSuspended(CrossingTable, { props: { analysis: buildAnalysis({ ...none, coverage: { proven: false, from: 0, to: 'infinity', exceptions: [] } }) } })
    expect(open.text()).toContain('was found')
  })
})
