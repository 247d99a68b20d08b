import { describe, expect, it } from 'vitest'
import { defaultCriteria } from '#shared/analysis/criteria/defaultCriteria'
import type { MeasuredDefinition } from '#shared/types/source'
import { engine } from '~/workers/engine'

const request = { title: 'SL-P', name: 'C1', criteria: [...defaultCriteria], facts: { frequencyUnit: 'rad/s' as const, parameters: { k: 2 } } }
const mapping = { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'real and imaginary', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' } as const
const sweep: MeasuredDefinition = { kind: 'measured', uploadId: 0, mapping, stayedStable: true, openLoopUnstablePoles: 0, openLoopOriginPoles: 1 }

describe('what the screens ask of the engine', () => {
  it('answers a fault of the input with its field, not with an exception', () => {
    expect(engine.analyse({ ...request, definition: { kind: 'coefficients', numerator: [1], denominator: [0] } })).toMatchObject({ failure: { path: 'denominator' } })
  })

  it('tells a parameter that has no value in this condition', () => {
    const reply = engine.analyse({ ...request, definition: { kind: 'expression', expression: 'gone/s' } })
    expect(reply).toMatchObject({ failure: { message: expect.stringContaining('gone') } })
  })

  it('analyses k/s with k = 2: |L| = 1 at 2 rad/s with 90 deg of phase margin (closed form), judged and drawn', () => {
    const reply = engine.analyse({ ...request, definition: { kind: 'expression', expression: 'k/s' } })
    expect(reply).toMatchObject({ judgement: { verdict: 'met' }, figures: { title: 'SL-P', requiredVectorMargin: 0.5 } })
    const { gainCrossovers } = 'analysis' in reply ? reply.analysis : { gainCrossovers: [] }
    expect(gainCrossovers).toHaveLength(1)
    expect(gainCrossovers[0]!.frequency).toBeCloseTo(2, 9)
    expect(gainCrossovers[0]!.phaseMargin).toBeCloseTo(90, 6)
  })

  it('stores nothing of a file with a bad row, and says which line', async () => {
    await engine.openFile(new Blob(['Hz,re,im\n1,0.5,-0.2\n2,oops,0\n3,0.1,0\n']))
    expect(engine.analyseFile({ ...request, definition: sweep })).toEqual({ problems: [{ line: 3, message: expect.stringContaining('oops') }] })
  })

  it('analyses a file that is right throughout, its frequencies in the unit of the system', async () => {
    // L = 1/(jw) sampled from 0.05 to 5 Hz: the gain crossover is at 1 rad/s.
    const rows = Array.from({ length: 60 }, (_, index) => 0.05 * 100 ** (index / 59)).map(f => `${f},0,${-1 / (2 * Math.PI * f)}`)
    const preview = await engine.openFile(new Blob([['Frequency (Hz),Real,Imag', ...rows].join('\n')]))
    expect(preview).toMatchObject({ rowCount: 60, guess: mapping })
    const reply = engine.analyseFile({ ...request, definition: sweep })
    expect('analysis' in reply && reply.analysis.gainCrossovers[0]!.frequency).toBeCloseTo(1, 6)
  })
})
