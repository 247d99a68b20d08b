import { describe, expect, it } from 'vitest'
import { boardValue } from '~/utils/boardValue'
import { sortWorstFirst } from '~/utils/sortWorstFirst'
import { buildAnalysis, unstable } from '../builders/buildAnalysis'
import { buildCell, buildLoop } from '../builders/buildCell'

describe('what a cell of the board shows', () => {
  it('says unstable and gives no value where the closed loop is unstable', () => {
    const value = boardValue(buildCell(1, 1, buildAnalysis(unstable)), 'vectorMargin')
    expect(value).toMatchObject({ text: 'unstable', verdict: 'unstable', bar: null, ratio: null })
  })

  it('says undetermined, not unstable, where the verdict is open', () => {
    const open = buildAnalysis({ summary: null, stability: { verdict: 'undetermined', basis: 'observed', openLoopUnstablePoles: null, encirclements: null, closedLoopUnstablePoles: null } })
    expect(boardValue(buildCell(1, 1, open), 'gainMargin')).toMatchObject({ text: 'undetermined', standing: 'not shown' })
  })

  it('tells no source from a source that cannot be analysed', () => {
    expect(boardValue(buildCell(1, 1, null, { source: null }), 'vectorMargin').text).toBe('no data')
    expect(boardValue(buildCell(1, 1, null, { failure: { message: 'improper', path: 'numerator' } }), 'vectorMargin').text).toBe('cannot be analysed')
  })

  it('names the quantity that is not met when it is another than the one shown', () => {
    const analysis = buildAnalysis({ gainCrossovers: [{ frequency: 10, phaseMargin: -12, delayMargin: 0.5, slope: 'rising' }] })
    const value = boardValue(buildCell(1, 1, analysis), 'vectorMargin')
    expect(value).toMatchObject({ text: '0.700', verdict: 'met', overall: 'not met', standing: 'not met: phase' })
  })

  it('shows the worse direction of a margin, with its direction as a word', () => {
    const analysis = buildAnalysis({ phaseCrossovers: [{ frequency: 1, gainMargin: -7, slope: 'rising' }, { frequency: 40, gainMargin: 12, slope: 'falling' }] })
    expect(boardValue(buildCell(1, 1, analysis), 'gainMargin').text).toBe('fall 7.0 dB')
  })

  it('tells lists that are not proven, and the untrusted gaps of a measured loop', () => {
    const exceptions = [{ from: 1, to: 2, reason: 'too wide' }, { from: 3, to: 4, reason: 'too wide' }]
    const analysis = buildAnalysis({ coverage: { proven: false, from: 0, to: 'infinity', exceptions } })
    expect(boardValue(buildCell(1, 1, analysis), 'vectorMargin').caution).toBe('not proven')
    expect(boardValue(buildCell(1, 1, analysis, { source: { id: 1, name: 'sweep', kind: 'measured' } }), 'vectorMargin').caution).toBe('2 untrusted gaps')
    expect(boardValue(buildCell(1, 1, buildAnalysis()), 'vectorMargin').caution).toBeNull()
  })

  it('cautions briefly where falling gain reaches -1, unless the value shown says it', () => {
    const analysis = buildAnalysis({ phaseCrossovers: [{ frequency: 1, gainMargin: -6.1, slope: 'rising' }], summary: { ...buildAnalysis().summary!, gainDecrease: -6.1 } })
    expect(boardValue(buildCell(1, 1, analysis), 'vectorMargin').gainFall).toEqual({ brief: 'if gain falls: 6.1 dB left', full: 'gain falls in saturation or at start-up: 6.1 dB left' })
    expect(boardValue(buildCell(1, 1, analysis), 'gainMargin').gainFall).toBeNull()
    expect(boardValue(buildCell(1, 1, buildAnalysis()), 'vectorMargin').gainFall).toBeNull()
    expect(boardValue(buildCell(1, 1, buildAnalysis(unstable)), 'vectorMargin').gainFall).toBeNull()
  })

  it('says so where no crossing limits the margin', () => {
    expect(boardValue(buildCell(1, 1, buildAnalysis({ phaseCrossovers: [] })), 'gainMargin').text).toBe('no crossing')
  })
})

describe('the order worst first', () => {
  it('puts the unstable loop first, then the smallest value against its limit, then the order of the list', () => {
    const loops = [buildLoop(1, 'A'), buildLoop(2, 'B'), buildLoop(3, 'C'), buildLoop(4, 'D')]
    const near = buildAnalysis({ vectorMargin: { distance: 0.51, frequency: 20 }, closestApproaches: [{ frequency: 20, distance: 0.51, gainChange: 4, phaseChange: -20 }] })
    const cells = [buildCell(1, 1, buildAnalysis()), buildCell(2, 1, near), buildCell(3, 1, buildAnalysis(unstable)), buildCell(4, 1, buildAnalysis())]
    expect(sortWorstFirst(loops, cells, 'vectorMargin').map(loop => loop.code)).toEqual(['C', 'B', 'A', 'D'])
  })
})
