import { describe, expect, it } from 'vitest'
import { compareSnapshots } from '#shared/comparison/compareSnapshots'
import { buildAnalysis, buildCell, buildSnapshot } from '../../factories/buildSnapshot'

describe('comparison of two frozen states', () => {
  it('finds nothing between a snapshot and itself read again', () => {
    const snapshot = buildSnapshot()
    const comparison = compareSnapshots(snapshot, JSON.parse(JSON.stringify(snapshot)) as typeof snapshot)
    expect(comparison.cells.map(cell => [cell.changed, cell.verdictChanged])).toEqual(Array(4).fill([false, false]))
    expect(comparison.cells[0]?.differences).toEqual({ gainIncrease: 0, gainDecrease: null, phaseLag: 0, phaseLead: null, delay: 0, vectorMargin: 0 })
    expect([...comparison.criteriaChanges, ...comparison.parameterChanges, ...comparison.loopsAdded, ...comparison.conditionsRemoved]).toEqual([])
  })

  it('does not take the order of keys for a change', () => {
    const before = buildSnapshot()
    const after = buildSnapshot({ cells: before.cells.map(cell => ({ ...cell, input: { parameters: { wz: 2 }, expression: '25*(s+wz)/(s*(s+10))*exp(-0.01*s)' } })) })
    expect(compareSnapshots(before, after).cells.every(cell => !cell.changed)).toBe(true)
  })

  it('takes a difference in the last digit for a change', () => {
    const before = buildSnapshot()
    const moved = buildAnalysis({ vectorMargin: { distance: 0.846 + Number.EPSILON, frequency: 158.2 } })
    const after = buildSnapshot({ cells: [buildCell('SL-R', 'C1', moved), ...before.cells.slice(1)] })
    expect(compareSnapshots(before, after).cells.map(cell => cell.changed)).toEqual([true, false, false, false])
  })

  it('gives the difference as after less before, and the verdict that changed', () => {
    const before = buildSnapshot()
    const sound = buildAnalysis()
    const weaker = buildAnalysis({
      gainCrossovers: [{ frequency: 30, phaseMargin: 20, delayMargin: 0.0116, slope: 'falling', distance: 0.35 }],
      summary: sound.summary && { ...sound.summary, phaseLag: 20 },
    })
    const after = buildSnapshot({ cells: [...before.cells.slice(0, 3), buildCell('SL-P', 'C2', weaker)] })
    const cell = compareSnapshots(before, after).cells.find(({ loopCode, conditionCode }) => loopCode === 'SL-P' && conditionCode === 'C2')
    expect(cell?.differences.phaseLag).toBeCloseTo(-75.1, 10)
    expect(cell).toMatchObject({ verdictChanged: true, before: { verdict: 'met' }, after: { verdict: 'not met' } })
  })

  it('gives no difference where a closed loop became unstable', () => {
    const before = buildSnapshot()
    const unstable = buildAnalysis({ summary: null, stability: { verdict: 'unstable', basis: 'counted', openLoopUnstablePoles: 0, encirclements: -2, closedLoopUnstablePoles: 2 } })
    const after = buildSnapshot({ cells: [buildCell('SL-R', 'C1', unstable), ...before.cells.slice(1)] })
    const cell = compareSnapshots(before, after).cells[0]
    expect(cell?.after).toMatchObject({ verdict: 'unstable', closedLoop: 'unstable', summary: null, vectorMargin: null })
    expect(Object.values(cell?.differences ?? { none: 0 })).toEqual([null, null, null, null, null, null])
  })

  it('tells a parameter that has no value as none, whatever the condition is called', () => {
    const { conditions, parameters } = buildSnapshot()
    const before = buildSnapshot({ conditions: [conditions[0]!, { ...conditions[1]!, code: 'constructor' }], cells: [] })
    const after = { ...before, parameters: [{ ...parameters[0]!, values: { constructor: 3 } }] } as typeof before
    expect(compareSnapshots(before, after).parameterChanges).toEqual(['parameter wz in C1: 2 to none', 'parameter wz in constructor: none to 3'])
  })

  it('names loops and conditions that only one of them covers, and lists what only the earlier one has last', () => {
    const before = buildSnapshot()
    const after = buildSnapshot({
      loops: [before.loops[0]!, { ...before.loops[1]!, code: 'LU-R' }],
      cells: [...before.cells.slice(0, 2), buildCell('LU-R', 'C1'), buildCell('LU-R', 'C2')],
    })
    const comparison = compareSnapshots(before, after)
    expect([comparison.loopsAdded, comparison.loopsRemoved]).toEqual([['LU-R'], ['SL-P']])
    expect(comparison.cells.map(cell => cell.loopCode)).toEqual(['SL-R', 'SL-R', 'LU-R', 'LU-R', 'SL-P', 'SL-P'])
    expect(comparison.cells.at(-1)).toMatchObject({ after: null, changed: true, verdictChanged: true })
  })

  it('tells changed criteria and parameter values in words', () => {
    const before = buildSnapshot()
    const after = buildSnapshot({
      criteria: before.criteria.map(criterion => (criterion.quantity === 'delayMargin' ? { ...criterion, limit: 0.01 } : criterion)),
      parameters: [{ name: 'wz', unit: 'rad/s', notes: '', values: { C1: 2, C2: 2.5 } }],
    })
    const comparison = compareSnapshots(before, after)
    expect(comparison.criteriaChanges).toEqual(['delay margin: no limit to 0.01 s'])
    expect(comparison.parameterChanges).toEqual(['parameter wz in C2: 2 to 2.5'])
  })
})
