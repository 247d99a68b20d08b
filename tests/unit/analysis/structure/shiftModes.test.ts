import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { shiftModes } from '#shared/analysis/structure/shiftModes'
import type { ExpressionInput, LoopAnalysis } from '#shared/types/analysis'
import type { BlockGain, BlockRole, ModalGain } from '#shared/types/block'
import type { MarginsThere } from '#shared/types/structure'

const roles: Record<string, BlockRole> = { C: 'controller', F: 'filter', G: 'plant', A: 'actuator', S: 'sensor', H0: 'hold' }
const expression = (text: string): BlockGain => ({ kind: 'expression', expression: text })

/** Positions per unit of force: a rigid body and modes of unit modal mass. */
function table(modes: [name: string, frequency: number, damping: number, gain: number][], more: Partial<ModalGain> = {}): ModalGain {
  return {
    kind: 'modal', frequencyUnit: 'rad/s', derivative: 0, inputs: [], outputs: [],
    rigid: [{ power: -2, gainIn: [1], gainOut: [1] }],
    modes: modes.map(([name, frequency, damping, gain]) => ({ name, frequency, damping, gainIn: [gain], gainOut: [1] })),
    ...more,
  }
}

function expectSameMargins(found: MarginsThere, analysis: Pick<LoopAnalysis, 'stability' | 'summary' | 'vectorMargin'>, digits = 9) {
  expect(found.failure).toBeNull()
  expect(found.verdict).toBe(analysis.stability.verdict)
  expect(found.vectorMargin!.distance).toBeCloseTo(analysis.vectorMargin!.distance, digits)
  expect(found.summary === null).toBe(analysis.summary === null)
  for (const [name, value] of Object.entries(analysis.summary ?? {})) {
    const there = found.summary![name as keyof NonNullable<MarginsThere['summary']>]
    if (value === null) expect(there).toBeNull()
    else expect(there! / value).toBeCloseTo(1, digits - 1)
  }
}

describe('loops without a table of mode shifts', () => {
  it('a typed loop gain cannot tell its modes from its notches', () => {
    const found = shiftModes({ expression: '1/(s*(s^2+0.1*s+100))' }, roles)
    expect(found).toMatchObject({ modes: [], reason: 'The loop gain is not built from blocks: its flexible modes cannot be told from its notches.', notes: [] })
    expect(found.nominal.failure).toBeNull()
    expect(shiftModes({ numerator: [1], denominator: [1, 1], frequencyUnit: 'Hz' }, {}).frequencyUnit).toBe('Hz')
  })

  it('a loop that cannot be analysed says why in its nominal margins', () => {
    const { nominal, reason } = shiftModes({ expression: 'C*G', blocks: { C: expression('1/(s+'), G: table([]) } }, roles)
    expect(reason).toBe('The loop cannot be analysed.')
    expect(nominal.failure).toMatch(/missing after/)
  })

  it('blocks without a flexible mode, and modes in filters and in blocks without a role', () => {
    const notch = expression('(s^2+0.02*s+1)/(s^2+0.2*s+1)')
    for (const name of ['C', 'F', 'H', 'constructor']) {
      expect(shiftModes({ expression: `G*${name}`, blocks: { G: expression('1/(s*(s+1))'), [name]: notch } }, roles))
        .toMatchObject({ modes: [], reason: 'No block of role plant, actuator or sensor has a mode of damping below 0.2.' })
    }
    expect(shiftModes({ expression: 'G', blocks: { G: table([['well damped', 10, 0.2, 1]]) } }, roles).modes).toEqual([])
  })

  it('sampled blocks are told of', () => {
    const sampled: BlockGain = { kind: 'coefficients', numerator: [0.1], denominator: [1, -0.9], sampleTime: 0.1 }
    expect(shiftModes({ expression: 'G', blocks: { G: sampled } }, roles).notes).toEqual(['G is given in z: its modes are not moved, their continuous form is not known.'])
  })
})

describe('loops over a measured block', () => {
  it('its own modes are not moved, those of a modelled sensor beside it are', () => {
    const points = Array.from({ length: 200 }, (_, k) => {
      const frequency = 0.1 * 1.04 ** k
      return { frequency, re: 0, im: -1 / frequency }
    })
    const G: BlockGain = { kind: 'measured', points }
    expect(shiftModes({ expression: 'G', blocks: { G } }, roles)).toMatchObject({ modes: [], notes: ['G is measured: its modes are not moved.'] })
    const sensor = (w: number) => expression(`${w}^2/(s^2+2*0.1*${w}*s+${w}^2)`)
    const { modes, notes } = shiftModes({ expression: 'G*S', blocks: { G, S: sensor(20) } }, roles)
    expect([modes.map(({ block }) => block), notes[0]]).toEqual([['S'], 'G is measured: its modes are not moved.'])
    // beta is kept, so a moved sensor has the gain (20/w)^2 of its own form
    for (const { change, ...margins } of modes[0]!.shifts) {
      const w = 20 * (1 + change)
      expectSameMargins(margins, analyseLoop({ expression: `${(20 / w) ** 2}*G*S`, blocks: { G, S: sensor(w) } }))
    }
  })
})

describe('a mode and its notch', () => {
  // rigid body 1/s^2 under a lead, one mode at 20 rad/s, its notch: typed out by hand with the mode at w
  const controller = '3*(s+0.5)/(0.02*s+1)^2'
  const notch = '(s^2+2*0.02*20*s+400)/(s^2+2*0.5*20*s+400)'
  const byHand = (w: number) => analyseLoop({ expression: `${controller}*${notch}*(1/s^2+0.8/(s^2+2*0.01*${w}*s+${w}^2))` })
  const blocks = { C: expression(controller), F: expression(notch), G: table([['bending 1', 20, 0.01, 0.8]]) }

  it('moves the mode and leaves the notch: the margins are those of the loop typed out with the mode elsewhere', () => {
    const { modes, nominal, reason, notes, frequencyUnit } = shiftModes({ expression: 'C*F*G', blocks }, roles)
    expect([reason, notes, frequencyUnit]).toEqual([null, [], 'rad/s'])
    expect(modes.map(({ block, mode, frequency, damping }) => [block, mode, frequency, damping])).toEqual([['G', 'bending 1', 20, 0.01]])
    expect(modes[0]!.shifts.map(({ change }) => change)).toEqual([-0.2, -0.1, 0.1, 0.2])
    expectSameMargins(nominal, byHand(20))
    modes[0]!.shifts.forEach(shift => expectSameMargins(shift, byHand(20 * (1 + shift.change))))
    // the notch no longer meets it: the margins do change
    expect(Math.abs(modes[0]!.shifts[0]!.vectorMargin!.distance - nominal.vectorMargin!.distance)).toBeGreaterThan(0.01)
  })

  it('the same plant by an expression, by coefficients and by zeros and poles moves alike', () => {
    // 1/s^2 + 0.8/(s^2 + 0.4 s + 400) = (1.8 s^2 + 0.4 s + 400)/(s^2 (s^2 + 0.4 s + 400))
    const numerator = [1.8, 0.4, 400]
    const root = (a: number, b: number, c: number): [number, number][] => {
      const im = Math.sqrt(4 * a * c - b * b) / (2 * a)
      return [[-b / (2 * a), im], [-b / (2 * a), -im]]
    }
    const others: BlockGain[] = [
      expression('1/s^2+0.8/(s^2+2*0.01*20*s+20^2)'),
      { kind: 'coefficients', numerator, denominator: [1, 0.4, 400, 0, 0] },
      { kind: 'zerosPoles', zeros: root(1.8, 0.4, 400), poles: [[0, 0], [0, 0], ...root(1, 0.4, 400)], gain: 1.8 },
    ]
    for (const G of others) {
      const { modes, notes } = shiftModes({ expression: 'C*F*G', blocks: { ...blocks, G } }, roles)
      expect(modes.map(({ block, mode }) => [block, mode])).toEqual([['G', 'mode at 20 rad/s']])
      expect(modes[0]!.frequency).toBeCloseTo(20, 10)
      expect(modes[0]!.damping).toBeCloseTo(0.01, 10)
      expect(notes).toHaveLength(1)
      expect(notes[0]).toMatch(/^G \(.*\): where one of its modes moves it is taken by zeros, poles and gain/)
      modes[0]!.shifts.forEach(shift => expectSameMargins(shift, byHand(20 * (1 + shift.change))))
    }
  })

  it('in Hz the table stands in Hz, whatever unit the modal table has', () => {
    const { modes, frequencyUnit } = shiftModes({ expression: 'C*F*G', frequencyUnit: 'Hz', blocks }, roles)
    expect(frequencyUnit).toBe('Hz')
    expect(modes[0]!.frequency).toBeCloseTo(20 / (2 * Math.PI), 12)
    const inHz = { ...blocks, G: table([['bending 1', 20 / (2 * Math.PI), 0.01, 0.8]], { frequencyUnit: 'Hz' }) }
    const there = shiftModes({ expression: 'C*F*G', blocks: inHz }, roles).modes[0]!
    expect(there.frequency).toBeCloseTo(20, 12)
    there.shifts.forEach(shift => expectSameMargins(shift, byHand(20 * (1 + shift.change))))
  })

  it('a plant with dead time keeps it', () => {
    const G: BlockGain = { kind: 'coefficients', numerator: [1.8, 0.4, 400], denominator: [1, 0.4, 400, 0, 0], deadTime: 0.01 }
    const { modes } = shiftModes({ expression: 'C*F*G', blocks: { ...blocks, G } }, roles)
    modes[0]!.shifts.forEach((shift) => {
      const w = 20 * (1 + shift.change)
      expectSameMargins(shift, analyseLoop({ expression: `${controller}*${notch}*(1/s^2+0.8/(s^2+2*0.01*${w}*s+${w}^2))*exp(-0.01*s)` }))
    })
  })
})

describe('which modes are moved', () => {
  const C = expression('2*(s+0.3)/(0.01*s+1)^2')

  it('modes in inner expressions, in actuators and sensors, in order of frequency', () => {
    const blocks: Record<string, BlockGain> = {
      C, P: expression('A*G'), S: expression('2500/(s^2+2*0.1*50*s+2500)'), A: expression('90000/(s^2+2*0.19*300*s+90000)'), G: table([['first', 8, 0.02, 0.1], ['second', 90, 0.005, 0.2]]),
    }
    const { modes } = shiftModes({ expression: 'C*P*S', blocks }, { ...roles, P: 'plant' })
    expect(modes.map(({ block, mode }) => [block, mode])).toEqual([['G', 'first'], ['S', 'mode at 50 rad/s'], ['G', 'second'], ['A', 'mode at 300 rad/s']])
  })

  it('an expression over other blocks moves only a mode of its own, with its part in the whole', () => {
    const blocks: Record<string, BlockGain> = { C, A: expression('1/(0.01*s+1)'), P: expression('A*(1/s^2+0.5/(s^2+0.2*s+100))') }
    const { modes } = shiftModes({ expression: 'C*P', blocks }, { ...roles, P: 'plant' })
    expect(modes.map(({ block, mode }) => [block, mode])).toEqual([['P', 'mode at 10 rad/s']])
    // by hand: the part of 0.5/((0.01 s + 1) q) that belongs to q is 0.5 (alpha s + beta)/q + 0.5 c/(0.01 s + 1) with c = 1e-4/(0.01^2 q(-100)) ...
    // 1/((0.01 s + 1) q): at s = -100, q = 10080, so c = 1/10080; alpha = -0.01 c ... from (alpha s + beta)(0.01 s + 1) + c q = 1
    const c = 1 / 10080
    const [alpha, beta] = [-c / 0.01, 1 - 100 * c]
    for (const { change, ...margins } of modes[0]!.shifts) {
      const w = 10 * (1 + change)
      const moved = `(1/((0.01*s+1)*s^2)+0.5*${c}/(0.01*s+1)+0.5*(${alpha}*s+${beta})/(s^2+2*0.01*${w}*s+${w}^2))`
      expectSameMargins(margins, analyseLoop({ expression: `2*(s+0.3)/(0.01*s+1)^2*${moved}` }), 8)
    }
  })

  it('modes that do not act in the channel used are none of this loop', () => {
    const G: ModalGain = {
      kind: 'modal', frequencyUnit: 'rad/s', derivative: 0, inputs: ['force', 'torque'], outputs: ['x', 'phi'], rigid: [{ power: -2, gainIn: [1, 0], gainOut: [1, 0] }],
      modes: [
        { name: 'bending', frequency: 10, damping: 0.01, gainIn: [1, 0.1], gainOut: [0.1, 0.5] },
        { name: 'torsion', frequency: 15, damping: 0.01, gainIn: [0, 1], gainOut: [0.1, 0.5] },
      ],
    }
    const { modes } = shiftModes({ expression: 'C*G[x, force]', blocks: { C, G } }, roles)
    expect(modes.map(({ mode }) => mode)).toEqual(['bending'])
  })

  it('a mode that a zero of its own block cancels is none', () => {
    const G = expression('(s^2+0.02*s+1)/((s^2+0.02*s+1)*s*(s+1))')
    expect(shiftModes({ expression: 'C*G', blocks: { C, G } }, roles)).toMatchObject({ modes: [], notes: [] })
  })

  it('a block that the loop does not need may be broken', () => {
    const G = expression('1/s^2+0.1/(s^2+0.02*s+100)')
    const { modes } = shiftModes({ expression: 'C*G', blocks: { C, G, X: expression('G[3, 4]*(') } }, roles)
    expect(modes[0]!.shifts.map(({ failure }) => failure)).toEqual([null, null, null, null])
  })

  it('a mode without a name is counted', () => {
    expect(shiftModes({ expression: 'C*G', blocks: { C, G: table([['', 9, 0.01, 0.1], [' ', 10, 0.01, 0.1]]) } }, roles).modes.map(({ mode }) => mode)).toEqual(['mode 1', 'mode 2'])
  })

  it('two modes at one place cannot be told apart outside a table, and that is the failure of each shift', () => {
    const G = expression('1/s^2+0.01*s/(s^2+0.02*s+100)^2')
    const { modes } = shiftModes({ expression: 'C*G', blocks: { C, G } }, roles)
    expect(modes).toHaveLength(1)
    expect(modes[0]!.shifts.map(({ failure }) => failure)).toEqual(Array(4).fill('The poles of this mode lie together with others: its part cannot be told from theirs.'))
  })

  it('of more than 20 modes those felt most are moved, and how many are left out is said', () => {
    const many = Array.from({ length: 23 }, (_, k): [string, number, number, number] => [`m${k + 1}`, 5 * 1.3 ** k, 0.01, k === 4 || k === 6 || k === 8 ? 1e-9 : 0.02])
    const { modes, notes } = shiftModes({ expression: 'C*G', blocks: { C, G: table(many) } }, roles)
    expect(modes).toHaveLength(20)
    expect(notes).toEqual(['3 of 23 modes are left out, those felt least in the loop gain.'])
  })
})

describe('sampled loops', () => {
  it('a continuous block behind a hold is moved before it is discretised', () => {
    const hold: BlockGain = { kind: 'hold', hold: 'zeroOrder', sampleTime: 0.01 }
    const C: BlockGain = { kind: 'coefficients', numerator: [2, -1.98], denominator: [1, -0.6], sampleTime: 0.01 }
    const input: ExpressionInput = { expression: 'C*H0*G', blocks: { C, H0: hold, G: table([['bending', 60, 0.01, 0.05]]) } }
    const { modes } = shiftModes(input, roles)
    expect(modes.map(({ mode, frequency }) => [mode, frequency])).toEqual([['bending', 60]])
    modes[0]!.shifts.forEach(shift => expectSameMargins(shift, analyseLoop({ ...input, blocks: { ...input.blocks, G: table([['bending', 60 * (1 + shift.change), 0.01, 0.05]]) } })))
    const asExpression = shiftModes({ ...input, blocks: { ...input.blocks, G: expression('1/s^2+0.05/(s^2+1.2*s+3600)') } }, roles).modes[0]!
    asExpression.shifts.forEach((shift, k) => expect(shift.vectorMargin!.distance).toBeCloseTo(modes[0]!.shifts[k]!.vectorMargin!.distance, 8))
  })
})
