import { describe, expect, it } from 'vitest'
import { closedLoopPoles } from '#shared/analysis/structure/closedLoopPoles'
import type { ComplexPair, LoopInput } from '#shared/types/analysis'
import type { BlockGain } from '#shared/types/block'

const modesOf = (input: LoopInput) => closedLoopPoles(input).poles.map(({ mode }) => mode)

describe('closed loops without a list of poles', () => {
  it.each<[string, LoopInput, RegExp]>([
    ['measured', { measured: { quantity: 'loopGain', points: [{ frequency: 1, re: -0.5, im: 0 }, { frequency: 2, re: -0.2, im: 0 }] } }, /measured/],
    ['a measured block', { expression: 'G/s', blocks: { G: { kind: 'measured', points: [{ frequency: 1, re: -0.5, im: 0 }, { frequency: 2, re: -0.2, im: 0 }] } } }, /measured/],
    ['dead time', { numerator: [1], denominator: [1, 0], deadTime: 0.1 }, /endlessly many/],
    ['dead time in an expression', { expression: 'exp(-0.1*s)/s' }, /endlessly many/],
    ['several dead times', { expression: '(1+exp(-0.1*s))/s' }, /several dead times/],
    ['half a sample', { numerator: [1], denominator: [1, -1], sampleTime: 0.1, deadTime: 0.05 }, /no whole number of samples/],
    ['a thousand samples', { numerator: [1], denominator: [1, -1], sampleTime: 0.1, deadTime: 100 }, /up to 100/],
    ['gain -1 at infinity', { numerator: [-1, 0], denominator: [1, 1] }, /-1 at high frequency/],
  ])('%s: the reason is told', (_, input, reason) => {
    const { poles, reason: told } = closedLoopPoles(input)
    expect(poles).toEqual([])
    expect(told).toMatch(reason)
  })

  it('an input that cannot be read is refused as in the analysis', () => {
    expect(() => closedLoopPoles({ expression: '1/(s+' })).toThrow('Something is missing after "+".')
  })
})

describe('frequency, damping and time constant', () => {
  it.each([[0.02, 12.3], [0.5, 3], [0.999, 100]])('second order of damping %d at %d rad/s', (damping, w) => {
    // closed form: w^2/(s (s + 2 d w)) closes to s^2 + 2 d w s + w^2
    const { poles } = closedLoopPoles({ numerator: [w * w], denominator: [1, 2 * damping * w, 0] })
    expect(poles).toHaveLength(1)
    expect(poles[0]!.frequency / w).toBeCloseTo(1, 12)
    expect(poles[0]!.damping).toBeCloseTo(damping, 12)
    expect(poles[0]!.timeConstant! * damping * w).toBeCloseTo(1, 12)
    expect(poles[0]!.im).toBeGreaterThan(0)
  })

  it('a double closed-loop pole is listed twice and exactly: 1/(s (s + 2)) closes to (s + 1)^2', () => {
    expect(closedLoopPoles({ numerator: [1], denominator: [1, 2, 0] }).poles.map(({ re, im }) => [re, im])).toEqual([[-1, 0], [-1, 0]])
  })

  it('frequencies in Hz are |s|/(2 pi), s itself in rad/s', () => {
    const { frequencyUnit, poles } = closedLoopPoles({ numerator: [100], denominator: [1, 2, 0], frequencyUnit: 'Hz' })
    expect(frequencyUnit).toBe('Hz')
    expect(poles[0]!.frequency).toBeCloseTo(10 / (2 * Math.PI), 12)
    expect(Math.hypot(poles[0]!.re, poles[0]!.im)).toBeCloseTo(10, 12)
  })

  it('on the boundary there is no time constant, beyond it a negative one', () => {
    // 1/(s^2 + 1) closes to s^2 + 2; -2/(s + 1) to s - 1
    expect(closedLoopPoles({ expression: '1/(s^2+1)' }).poles[0]).toMatchObject({ timeConstant: null, damping: 0, frequency: Math.SQRT2 })
    expect(closedLoopPoles({ expression: '-2/(s+1)' }).poles[0]).toMatchObject({ re: 1, timeConstant: -1, damping: -1 })
  })

  it('a pole at the origin has frequency 0', () => {
    // -1/(s + 1) closes to s
    expect(closedLoopPoles({ expression: '-1/(s+1)' }).poles[0]).toMatchObject({ frequency: 0, damping: 0, timeConstant: null })
  })

  it('of a sampled loop by ln(z)/T, and z itself', () => {
    // 0.5/(z - 1) closes to z = 0.5
    const T = 0.01
    const [pole] = closedLoopPoles({ numerator: [0.5], denominator: [1, -1], sampleTime: T }).poles
    expect(pole!.z![0]).toBeCloseTo(0.5, 15)
    expect(pole!.z![1]).toBe(0)
    expect(pole!.re).toBeCloseTo(Math.log(0.5) / T, 10)
    expect(pole!.timeConstant).toBeCloseTo(T / Math.LN2, 12)
  })

  it('whole samples of dead time are poles at z = 0: 0.5 z^-1/(z - 1) closes to z^2 - z + 0.5', () => {
    const typed = closedLoopPoles({ numerator: [0.5], denominator: [1, -1, 0], sampleTime: 1 }).poles
    const delayed = closedLoopPoles({ numerator: [0.5], denominator: [1, -1], sampleTime: 1, deadTime: 1 }).poles
    for (const poles of [typed, delayed]) {
      expect(poles).toHaveLength(1)
      expect(poles[0]!.z![0]).toBeCloseTo(0.5, 14)
      expect(poles[0]!.z![1]).toBeCloseTo(0.5, 14)
    }
  })

  it('dead beat: a closed-loop pole at z = 0 has finite numbers', () => {
    // 1/(z - 1) closes to z
    const [pole] = closedLoopPoles({ numerator: [1], denominator: [1, -1], sampleTime: 0.1 }).poles
    expect(pole!.z).toEqual([0, 0])
    expect([pole!.re, pole!.frequency, pole!.timeConstant, pole!.damping].every(Number.isFinite)).toBe(true)
  })

  it('a negative real z lies at half the sampling frequency', () => {
    // 1.5/(z - 1) closes to z = -0.5
    const [pole] = closedLoopPoles({ numerator: [1.5], denominator: [1, -1], sampleTime: 0.1 }).poles
    expect(pole!.im).toBeCloseTo(Math.PI / 0.1, 10)
  })
})

describe('which open-loop pole a closed-loop pole goes back to', () => {
  it('the two of a rigid body meet on the real axis and are told together', () => {
    expect(modesOf({ numerator: [4], denominator: [1, 2, 0] })).toEqual(['integrator and real pole at 2 rad/s'])
  })

  it('a third that meets none keeps its own, and a triple pole is one pole', () => {
    expect(modesOf({ expression: '6/(s*(s+1)*(s+2))' })).toEqual(['integrator and real pole at 1 rad/s', 'real pole at 2 rad/s'])
    expect(modesOf({ numerator: [3], denominator: [1, 3, 3, 1] })).toEqual(['real pole at 1 rad/s', 'real pole at 1 rad/s'])
  })

  it('lightly damped modes keep their names though the closed loop moves them by more than their distance', () => {
    // G = 1/s^2 + 1/(s^2 + 0.02 s + 100) + 1/(s^2 + 0.022 s + 121), L = (10 s + 4) G: hand check of the order by root loci between the zeros
    const input: LoopInput = { expression: '(10*s+4)*(1/s^2+1/(s^2+0.02*s+100)+1/(s^2+0.022*s+121))/(0.001*s+1)' }
    const found = closedLoopPoles(input).poles.filter(({ mode }) => mode?.startsWith('pole at'))
    expect(found.map(({ mode }) => mode)).toEqual(expect.arrayContaining(['pole at 10 rad/s, damping 0.001', 'pole at 11 rad/s, damping 0.001']))
  })

  it('where more than two met on the way none is named', () => {
    // 200 (1 + s/2)/(s (10 s + 1) (s/20 + 1) (s/200 + 1)): the loci from 0 and 0.1 meet, leave the axis, come back left of the zero, and one of them meets the next
    const modes = modesOf({ numerator: [100, 200], denominator: [0.0025, 0.55025, 10.055, 1, 0] })
    expect(modes).toEqual(['integrator and real pole at 0.1 rad/s', null, 'real pole at 200 rad/s'])
  })

  it('a mode that is not driven stays, and is told as itself', () => {
    const modes = closedLoopPoles({ expression: '1/(s+1)*(1+1e-9*s/(s^2+0.004*s+4))' }).poles
    expect(modes.map(({ mode }) => mode)).toEqual(['real pole at 1 rad/s', 'pole at 2 rad/s, damping 0.001'])
    expect(modes[1]!.frequency).toBeCloseTo(2, 9)
  })

  it('poles that a zero cancels are listed and told as hidden', () => {
    const { poles } = closedLoopPoles({ expression: '4*(s^2+0.02*s+1)/((s^2+0.02*s+1)*(s+1))' })
    expect(poles.map(({ frequency, mode }) => [Number(frequency.toPrecision(12)), mode])).toEqual([
      [1, 'pole at 1 rad/s, damping 0.01, hidden: a zero cancels it'], [5, 'real pole at 1 rad/s']])
  })

  it('unstable poles are told as such, in Hz where the loop is', () => {
    expect(modesOf({ expression: '3/(s-1)', frequencyUnit: 'Hz' })).toEqual(['unstable real pole at 0.1592 Hz'])
    expect(modesOf({ expression: '0.04*s/(s^2-0.02*s+1)' })).toEqual(['unstable pole at 1 rad/s, damping minus 0.01'])
  })

  it('sixty lightly damped poles in a row are all named, each by its own', () => {
    const poles: ComplexPair[] = []
    const zeros: ComplexPair[] = []
    const names: string[] = []
    for (let k = 0; k < 30; k++) {
      const w = 5 * 1.2 ** k
      for (const side of [1, -1]) {
        poles.push([-0.005 * w, side * w * Math.sqrt(1 - 2.5e-5)])
        zeros.push([-0.005 * 1.05 * w, side * 1.05 * w * Math.sqrt(1 - 2.5e-5)])
      }
      names.push(`pole at ${Number(w.toPrecision(4))} rad/s, damping 0.005`)
    }
    const { poles: closed } = closedLoopPoles({ zeros, poles: [...poles, [-1, 0]], gain: 0.3 })
    expect(closed.filter(({ im }) => im > 0).map(({ mode }) => mode)).toEqual(names)
  })
})

describe('open-loop poles by the blocks they come from', () => {
  const modal: BlockGain = {
    kind: 'modal', frequencyUnit: 'Hz', derivative: 0, inputs: [], outputs: [], rigid: [{ power: -2, gainIn: [1], gainOut: [1] }],
    modes: [{ name: 'bending 1', frequency: 2, damping: 0.01, gainIn: [0.2], gainOut: [1] }, { name: '', frequency: 5, damping: 0.02, gainIn: [0.1], gainOut: [1] }],
  }
  const lead: BlockGain = { kind: 'expression', expression: '2*(s+0.5)/(0.001*s+1)^2' }

  it('blocks that stand alone: no block, no name; a block of the name constructor', () => {
    expect(modesOf({ expression: '1/s', blocks: {} })).toEqual(['integrator'])
    expect(modesOf({ expression: 'constructor', blocks: { constructor: { kind: 'expression', expression: '1/(s+1)' } as BlockGain } })).toEqual(['real pole of constructor at 1 rad/s'])
  })

  it('modes of a modal table go by their names, other poles by their blocks', () => {
    const modes = modesOf({ expression: 'C*G', frequencyUnit: 'Hz', blocks: { C: lead, G: modal } })
    expect(modes).toEqual([
      'integrator of G', 'integrator of G', 'bending 1 of G (2 Hz, damping 0.01)', 'mode 2 of G (5 Hz, damping 0.02)', 'real pole of C at 159.2 Hz', 'real pole of C at 159.2 Hz'])
  })

  it('an integrator of two blocks names both', () => {
    expect(modesOf({ expression: 'C*G', blocks: { C: { kind: 'expression', expression: '(s+1)/s' }, G: { kind: 'expression', expression: '1/(s*(0.01*s+1))' } } })[0])
      .toContain('integrator of C and G')
  })

  it('behind an inner closed loop the mode nearest to the pole is told beside it', () => {
    const input: LoopInput = { expression: 'C*G/(1+0.3*s/(0.001*s+1)*G)', blocks: { C: lead, G: modal } }
    expect(modesOf(input)).toEqual(expect.arrayContaining([expect.stringMatching(/^pole at 12\.\d+ rad\/s, damping 0\.\d+, nearest mode bending 1 of G$/)]))
  })

  it('what a block over others brings is told by the others, what is its own by itself', () => {
    const modes = modesOf({ expression: 'P', blocks: { P: { kind: 'expression', expression: 'A/(s+3)' }, A: { kind: 'expression', expression: '0.01/(s+1)' } } })
    expect(modes).toEqual(['real pole of A at 1 rad/s', 'real pole of P at 3 rad/s'])
  })

  it('behind a hold a mode keeps its name, and one above half the sampling frequency too', () => {
    const H0: BlockGain = { kind: 'hold', hold: 'zeroOrder', sampleTime: 0.15 }
    const C: BlockGain = { kind: 'coefficients', numerator: [0.02], denominator: [1, -0.5], sampleTime: 0.15 }
    const { poles, reason } = closedLoopPoles({ expression: 'C*H0*G', blocks: { C, H0, G: modal } })
    expect(reason).toBeNull()
    const modes = poles.map(({ mode }) => mode ?? '')
    // half the sampling frequency is 3.33 Hz: the mode of 5 Hz lies at 2 * 3.33 - 5 = 1.67 Hz of it
    expect(modes.filter(mode => mode.startsWith('bending 1 of G'))).toHaveLength(1)
    expect(modes.filter(mode => mode.startsWith('mode 2 of G'))).toHaveLength(1)
  })
})
