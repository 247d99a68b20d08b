import { describe, expect, it } from 'vitest'
import { loopInputFromDefinition } from '#shared/sources/loopInputFromDefinition'
import type { BlockGain } from '#shared/types/block'
import type { MeasuredDefinition } from '#shared/types/source'

const facts = { frequencyUnit: 'rad/s', parameters: { wz: 2 } } as const

describe('the way from a stored definition to the engine', () => {
  it('refuses a dead time beside an expression in z, where it has to be powers of z', () => {
    expect(() => loopInputFromDefinition({ kind: 'expression', expression: '0.1/(z-1)', sampleTime: 0.001, deadTime: 0.002 }, facts)).toThrow('z^-n')
  })

  it('multiplies the whole of an expression by its dead time, not its last term', () => {
    expect(loopInputFromDefinition({ kind: 'expression', expression: '1/s + wz/s^2', deadTime: 0.01 }, facts))
      .toEqual({ frequencyUnit: 'rad/s', expression: '(1/s + wz/s^2)*exp(-s*0.01)', parameters: { wz: 2 } })
  })

  it('hands on the blocks an expression needs, by its blocks too, and the parameters any of them names; nothing else', () => {
    const blocks = {
      C: { kind: 'expression', expression: 'k*F' }, F: { kind: 'expression', expression: '1/(s/wF+1)' }, P: { kind: 'coefficients', numerator: [1], denominator: [1, 0] },
      idle: { kind: 'expression', expression: 'wIdle' },
    } as const
    const parameters = { k: 2, wF: 3, wIdle: 4, angle: 5 }
    const plain = JSON.parse(JSON.stringify(blocks)) as Record<string, BlockGain>
    expect(loopInputFromDefinition({ kind: 'expression', expression: 'C*P[angle,1]' }, { frequencyUnit: 'rad/s', parameters, blocks: plain }))
      .toEqual({ frequencyUnit: 'rad/s', expression: 'C*P[angle,1]', parameters: { k: 2, wF: 3 }, blocks: { C: blocks.C, F: blocks.F, P: blocks.P } })
  })

  it('has no blocks where an expression names none, so that it is read as before there were any', () => {
    const input = loopInputFromDefinition({ kind: 'expression', expression: 'wz/s' }, { ...facts, blocks: { G: { kind: 'expression', expression: '1/s' } } })
    expect(input).toEqual({ frequencyUnit: 'rad/s', expression: 'wz/s', parameters: { wz: 2 } })
  })

  it('goes round a circle of blocks once', () => {
    const blocks = { G: { kind: 'expression', expression: 'H' }, H: { kind: 'expression', expression: 'G' } } as const
    expect(loopInputFromDefinition({ kind: 'expression', expression: 'G' }, { ...facts, blocks })).toMatchObject({ blocks })
  })

  it('leaves an expression as it was typed where there is no dead time, so that places of errors stay true', () => {
    expect(loopInputFromDefinition({ kind: 'expression', expression: ' 1/s', deadTime: 0 }, facts)).toMatchObject({ expression: ' 1/s' })
  })

  it('refuses a measured response without points', () => {
    expect(() => loopInputFromDefinition(sweep('Hz'), facts)).toThrow('No points')
  })

  it('turns measured frequencies into the unit of the system: 1 Hz is 2 pi rad/s, by definition', () => {
    const points = [{ frequency: 1, re: 1, im: 0, coherence: 0.99 }]
    expect(loopInputFromDefinition(sweep('Hz'), { ...facts, points })).toMatchObject({ measured: { points: [{ frequency: 2 * Math.PI, coherence: 0.99 }] } })
    expect(loopInputFromDefinition(sweep('rad/s'), { ...facts, frequencyUnit: 'Hz', points })).toMatchObject({ measured: { points: [{ frequency: 1 / (2 * Math.PI) }] } })
    expect(loopInputFromDefinition(sweep('rad/s'), { ...facts, points })).toMatchObject({ measured: { points: [{ frequency: 1 }] } })
  })

  it('hands on what the closed loop did and what is known of the poles, and nothing of the file', () => {
    const input = loopInputFromDefinition({ ...sweep('Hz'), averages: 16, stayedStable: true, openLoopOriginPoles: 1, amplitude: '2 deg' }, { ...facts, points: [{ frequency: 1, re: 0, im: -1 }] })
    expect(input).toEqual({
      frequencyUnit: 'rad/s',
      measured: { quantity: 'loopGain', points: [{ frequency: 2 * Math.PI, re: 0, im: -1 }], averages: 16, stayedStable: true },
      openLoopOriginPoles: 1,
    })
  })
})

function sweep(frequencyUnit: 'Hz' | 'rad/s'): MeasuredDefinition {
  return { kind: 'measured', uploadId: 1, mapping: { frequencyColumn: 0, frequencyUnit, form: 'dB and degrees', firstColumn: 1, secondColumn: 2, coherenceColumn: 3, quantity: 'loopGain' } }
}
