import { describe, expect, it } from 'vitest'
import { engine } from '~/workers/engine'
import type { LookRequest } from '~/workers/blockLook'

const ask = (fields: Partial<LookRequest>) => engine.lookAtBlock({
  name: 'G', definition: { kind: 'expression', expression: '1/(s+1)' }, channel: { input: 0, output: 0 }, others: {}, parameters: {}, frequencyUnit: 'rad/s', ...fields,
})
const look = (fields: Partial<LookRequest>) => {
  const answer = ask(fields)
  if (!('look' in answer)) throw new Error(JSON.stringify(answer))
  return answer.look
}
/** |G| in dB at the sample nearest to a frequency */
const decibelsAt = ({ response }: ReturnType<typeof look>, frequency: number) => {
  const { frequency: list, re, im } = response!.response
  const index = [...list].reduce((best, value, place) => Math.abs(value - frequency) < Math.abs(list[best]! - frequency) ? place : best, 0)
  return 20 * Math.log10(Math.hypot(re[index]!, im[index]!))
}

describe('what a block does by itself, as it is drafted', () => {
  it('is refused at its place where the expression has a fault', () => {
    expect(ask({ definition: { kind: 'expression', expression: '1/(s+wn)' } })).toMatchObject({ failure: { path: 'expression', position: 5 } })
  })

  it('is refused where it names itself', () => {
    expect(ask({ definition: { kind: 'expression', expression: '1/(s+G)' } })).toMatchObject({ failure: { message: expect.stringContaining('names itself') } })
  })

  it('tells a fault of another block that it needs with its name', () => {
    expect(ask({ definition: { kind: 'expression', expression: 'H/s' }, others: { H: { kind: 'stateSpace', uploadId: 99, set: null, states: null, inputs: [], outputs: [] } } }))
      .toMatchObject({ failure: { path: 'blocks.H.uploadId', message: expect.stringContaining('The block H') } })
  })

  it('reads only those of the others that it needs', () => {
    const found = look({ definition: { kind: 'expression', expression: 'k*H' }, others: { H: { kind: 'coefficients', numerator: [2], denominator: [1, 4] }, bad: { kind: 'coefficients', numerator: [], denominator: [] } }, parameters: { k: 10, unused: 1 } })
    expect(found.poles).toEqual(['4.000 rad/s, real'])
    // 20/(s + 4) far below 4 rad/s is 5: 13.98 dB, closed form
    expect(decibelsAt(found, 0)).toBeCloseTo(13.98, 0)
  })

  it('shows each pair of channels of a modal table', () => {
    const definition = { kind: 'modal' as const, frequencyUnit: 'rad/s' as const, derivative: 0 as const, rigid: [], inputs: [], outputs: ['rate', 'angle'], modes: [{ name: 'a', frequency: 10, damping: 0.01, gainIn: [100], gainOut: [1, 10] }] }
    const [rate, angle] = [0, 1].map(output => look({ definition, channel: { input: 0, output } }))
    expect(rate!.response!.title).toBe('G[rate, 1]')
    expect(rate!.poles).toEqual(['10.00 rad/s, damping 0.0100'])
    // static: 100/100 = 0 dB and 20 dB
    expect(decibelsAt(rate!, 0)).toBeCloseTo(0, 0)
    expect(decibelsAt(angle!, 0)).toBeCloseTo(20, 0)
  })

  it('shows a sampled filter up to half its sample rate, and a hold as the plant sees it', () => {
    const filter = look({ definition: { kind: 'sections', rows: [['1', '0', '0', '1', '-1/2', '0']], gain: '1/2', sampleTime: 0.1 } })
    expect(filter.response!.range.to).toBeCloseTo(Math.PI / 0.1, 9)
    expect(filter.poles[0]).toBe(`${(Math.log(2) / 0.1).toFixed(3)} rad/s, real`)
    const hold = look({ definition: { kind: 'hold', hold: 'zeroOrder', sampleTime: 0.1 } })
    // sin(pi/2)/(pi/2) = 2/pi at half the sample rate: -3.92 dB
    expect(decibelsAt(hold, Math.PI / 0.1)).toBeCloseTo(-3.92, 1)
  })

  it('has no response by itself where it only counts samples', () => {
    expect(look({ definition: { kind: 'deadTime', deadTime: 1.5, unit: 'samples' } })).toMatchObject({ response: null, reason: expect.stringContaining('samples of the loop') })
  })

  it('reads a file of matrices once it is kept, and tells a wrong row by its line', () => {
    engine.keepUpload(7, 'A\n0,1\n-100\nB\n0\n1\nC\n1,0\nD\n0\n')
    expect(engine.readMatrices(7, null)).toMatchObject({ sets: [], problems: [{ line: 3 }] })
    engine.keepUpload(8, 'A\n0,1\n-100,-0.2\nB\n0\n1\nC\n1,0\nD\n0\n')
    expect(engine.readMatrices(8, null)).toMatchObject({ sets: [{ states: 2, inputCount: 1, outputCount: 1 }], problems: [] })
  })
})
