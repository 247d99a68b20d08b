import { describe, expect, it } from 'vitest'
import type { SourceDefinition } from '#shared/types/source'
import { emptySource, readTypedSource, typedSource } from '~/services/TypedSource'

const problemsOf = (fields: Partial<ReturnType<typeof emptySource>>) => {
  const read = readTypedSource({ ...emptySource(), ...fields })
  return 'problems' in read ? read.problems.map(problem => problem.path) : []
}

describe('a source as typed', () => {
  it.each([
    [{ kind: 'coefficients' as const, numerator: '1 x', denominator: '' }, ['numerator', 'denominator']],
    [{ kind: 'expression' as const, expression: ' ' }, ['expression']],
    [{ kind: 'expression' as const, expression: '1/s', deadTime: '-1' }, ['deadTime']],
    [{ kind: 'expression' as const, expression: '1/(z-1)', sampled: true }, ['sampleTime']],
    [{ kind: 'expression' as const, expression: '1/(z-1)', sampled: true, sampleTime: '0' }, ['sampleTime']],
    [{ kind: 'zerosPoles' as const, zeros: '?', gain: '' }, ['zeros', 'gain']],
    [{ kind: 'measured' as const, averages: '1.5' }, ['averages', 'mapping']],
  ])('%j names each field that cannot be read', (fields, paths) => {
    expect(problemsOf(fields)).toEqual(paths)
  })

  it('keeps a sample time out of a continuous loop though it was typed before', () => {
    const read = readTypedSource({ ...emptySource(), expression: '1/s', sampled: false, sampleTime: '0.001' })
    expect(read).toEqual({ definition: { kind: 'expression', expression: '1/s' } })
  })

  it.each<SourceDefinition>([
    { kind: 'expression', expression: 'k/s', deadTime: 0.01 },
    { kind: 'coefficients', numerator: [25, 50], denominator: [1, 10, 0], sampleTime: 0.001 },
    { kind: 'zerosPoles', zeros: [[-2, 0]], poles: [[0, 0], [-1, 3], [-1, -3]], gain: 25 },
    {
      kind: 'measured', uploadId: 3, averages: 16, stayedStable: false, openLoopUnstablePoles: 1, amplitude: '2 deg',
      mapping: { frequencyColumn: 0, frequencyUnit: 'Hz', form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: null, quantity: 'loopGain' },
    },
  ])('is what was stored: %j', (definition) => {
    expect(readTypedSource(typedSource('x', definition), 3)).toEqual({ definition })
  })
})
