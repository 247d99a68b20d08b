import { describe, expect, it } from 'vitest'
import { closedLoopPoles } from '#shared/analysis/structure/closedLoopPoles'
import { shiftModes } from '#shared/analysis/structure/shiftModes'
import type { BlockGain, BlockRole, ModalGain, StateSpaceGain } from '#shared/types/block'
import type { ModeShiftTable } from '#shared/types/structure'

const roles: Record<string, BlockRole> = { C: 'controller', K: 'filter', G: 'plant' }
const C: BlockGain = { kind: 'expression', expression: '2*(s+0.5)/(0.01*s+1)^2' }

const twoAxes: ModalGain = {
  kind: 'modal', frequencyUnit: 'rad/s', derivative: 0, inputs: ['force', 'torque'], outputs: ['x', 'phi'],
  rigid: [{ power: -2, gainIn: [1, 0.3], gainOut: [1, 0.2] }],
  modes: [
    { name: 'bending', frequency: 9, damping: 0.01, gainIn: [0.5, -0.2], gainOut: [0.4, 0.3] },
    { name: 'torsion', frequency: 14, damping: 0.02, gainIn: [0.1, 0.6], gainOut: [-0.2, 0.5] },
    { name: 'second bending', frequency: 40, damping: 0.005, gainIn: [0.7, 0.1], gainOut: [0.6, -0.1] },
  ],
}

/** The same gains as matrices: two states a mode and a rigid axis, position and rate. */
function matricesOf({ rigid, modes, inputs, outputs }: ModalGain): StateSpaceGain {
  const pairs = [...rigid.map(({ gainIn, gainOut }) => ({ w: 0, zeta: 0, gainIn, gainOut })), ...modes.map(({ frequency, damping, gainIn, gainOut }) => ({ w: frequency, zeta: damping, gainIn, gainOut }))]
  const n = 2 * pairs.length
  const row = (fill: (entries: number[]) => void) => {
    const entries = Array<number>(n).fill(0)
    fill(entries)
    return entries
  }
  return {
    kind: 'stateSpace', inputs, outputs,
    a: pairs.flatMap(({ w, zeta }, k) => [row(r => (r[2 * k + 1] = 1)), row((r) => {
      r[2 * k] = -w * w
      r[2 * k + 1] = -2 * zeta * w
    })]),
    b: pairs.flatMap(({ gainIn }) => [gainIn.map(() => 0), gainIn]),
    c: outputs.map((_, output) => pairs.flatMap(({ gainOut }) => [gainOut[output]!, 0])),
    d: outputs.map(() => inputs.map(() => 0)),
  }
}

function expectSameTables(found: ModeShiftTable, expected: ModeShiftTable) {
  expect(found.modes.map(({ frequency }) => Number(frequency.toPrecision(9)))).toEqual(expected.modes.map(({ frequency }) => Number(frequency.toPrecision(9))))
  found.modes.forEach(({ damping, shifts }, k) => {
    expect(damping).toBeCloseTo(expected.modes[k]!.damping, 9)
    shifts.forEach((shift, i) => {
      const there = expected.modes[k]!.shifts[i]!
      expect([shift.failure, shift.verdict, shift.change]).toEqual([null, there.verdict, there.change])
      expect(shift.vectorMargin!.distance).toBeCloseTo(there.vectorMargin!.distance, 8)
      for (const name of ['phaseLag', 'gainIncrease', 'delay'] as const) {
        expect(shift.summary?.[name] ?? -1).toBeCloseTo(there.summary?.[name] ?? -1, 5)
      }
    })
  })
}

describe('modes of a state space', () => {
  it('move as those of the modal table it was made of, channels by name', () => {
    const of = (G: BlockGain) => shiftModes({ expression: 'C*G[x, force]', blocks: { C, G } }, roles)
    const found = of(matricesOf(twoAxes))
    expectSameTables(found, of(twoAxes))
    expect(found.notes).toHaveLength(1)
    expect(found.notes[0]).toMatch(/^G \(state space\): /)
  })

  it('move in every channel that a loop uses, in blocks that are expressions too', () => {
    const of = (G: BlockGain) => shiftModes({
      expression: 'C*(G[1, 1] + K*G[phi,force])*P', blocks: { C, G, K: { kind: 'expression', expression: '0.2/(0.1*s+1)' }, P: { kind: 'expression', expression: '1+0.1*G[1,2]' } },
    }, roles)
    expectSameTables(of(matricesOf(twoAxes)), of(twoAxes))
  })

  it('that the channel used does not show are not moved, and stand among the closed-loop poles as hidden', () => {
    const blind = { ...twoAxes, modes: twoAxes.modes.map((mode, k) => k === 1 ? { ...mode, gainOut: [0, 0.5] } : mode) }
    const input = { expression: 'C*G[x, force]', blocks: { C, G: matricesOf(blind) } }
    expect(shiftModes(input, roles).modes.map(({ frequency }) => Number(frequency.toPrecision(9)))).toEqual([9, 40])
    const { poles } = closedLoopPoles(input)
    expect(poles.find(({ frequency }) => Math.abs(frequency - 14) < 1e-9)!.mode).toBe('pole of G at 14 rad/s, damping 0.02, hidden: a zero cancels it')
    expect(poles.filter(({ mode }) => mode?.includes('of G at') && !mode.includes('hidden'))).toHaveLength(2)
  })

  it('sixty states in 29 modes: closed-loop poles as those of the modal table', () => {
    const many: ModalGain = {
      ...twoAxes, inputs: ['force'], outputs: ['x'], rigid: [{ power: -2, gainIn: [1], gainOut: [1] }],
      modes: Array.from({ length: 29 }, (_, k) => ({ name: `mode ${k + 1}`, frequency: 18 * 1.17 ** k, damping: 0.005, gainIn: [0.003 * (k % 3 === 1 ? 0.5 : k % 3 - 1)], gainOut: [1] })),
    }
    const of = (G: BlockGain) => closedLoopPoles({ expression: 'C*G', blocks: { C, G } }).poles
    const [table, matrices] = [of(many), of(matricesOf(many))]
    expect(matrices).toHaveLength(table.length)
    matrices.forEach((pole, k) => {
      expect(pole.frequency / table[k]!.frequency).toBeCloseTo(1, 10)
      expect(pole.damping / table[k]!.damping).toBeCloseTo(1, 7)
    })
    expect(table.filter(({ mode }) => /^mode \d+ of G /.test(mode ?? ''))).toHaveLength(29)
    expect(matrices.filter(({ mode }) => mode?.startsWith('pole of G at '))).toHaveLength(29)
  })
})
