import { spawnSync } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import { lowerExpression } from '#shared/analysis/expressions/lowerExpression'
import type { ExpressionInput, LoopAnalysis } from '#shared/types/analysis'
import type { BlockGain } from '#shared/types/block'
import { checkLoops, type CheckLoop } from './checkLoop'
import { expectCrossings, expectDistances, expectVerdict, TIES } from './expectLoop'

const project = fileURLToPath(new URL('../..', import.meta.url))
const converter = 'tests/fixtures/converterCurrentLoop.json'
const FLOOR = -120

const typed = (expression: string, sampleTime?: number): BlockGain => ({ kind: 'expression', expression, ...sampleTime === undefined ? {} : { sampleTime } })

/** Each sampled loop of the collection as its source has it: a continuous plant, a zero-order hold, what delay and controller there are. */
function builtAs(loop: CheckLoop, plant: string, others: Record<string, BlockGain> = {}): ExpressionInput {
  const blocks: Record<string, BlockGain> = { H0: { kind: 'hold', hold: 'zeroOrder', sampleTime: loop.Ts as number }, G: typed(plant), ...others }
  return { name: loop.id, expression: Object.keys(blocks).join('*'), blocks, gainFloor: FLOOR }
}

const loopOf = (id: string) => checkLoops.find(loop => loop.id === id) as CheckLoop

const PLANTS: Record<string, ExpressionInput> = {
  'zoh-1/(s(s+1))-T0.2': builtAs(loopOf('zoh-1/(s(s+1))-T0.2'), '1/(s*(s+1))'),
  'fpw-antenna': builtAs(loopOf('fpw-antenna'), '1/(s*(10*s+1))'),
  'aw-H': builtAs(loopOf('aw-H'), '1/s', { C: typed('0.25/(z-0.5)', 1) }),
  'aw-2nd-exact': builtAs(loopOf('aw-2nd-exact'), '1/(s^2+1.4*s+1)'),
  'dt-int-k0.5': builtAs(loopOf('dt-int-k0.5'), '0.5/s'),
  'dt-int-delay1-k0.5': builtAs(loopOf('dt-int-delay1-k0.5'), '0.5/s', { D: { kind: 'deadTime', deadTime: 1, unit: 's' } }),
}

describe('the sampled textbook loops from their continuous plant, hold and delay', () => {
  for (const [id, input] of Object.entries(PLANTS)) {
    const loop = loopOf(id)
    it(`${id}: ${loop.title} (${loop.source}; ${loop.confirmation}): every crossing, distance, peak and count as computed`, () => {
      const analysis = analyseLoop(readLoopInput(input))
      expectVerdict(analysis, loop)
      expectCrossings(analysis, loop, FLOOR)
      expectDistances(analysis, loop)
      if (!(id in TIES)) expect(analysis.coverage).toMatchObject({ proven: true, exceptions: [] })
      expect(analysis.structure).toMatchObject({ sampleTime: loop.Ts, approximated: true, notes: [] })
    })
  }

  /** Numerator gain, zeros and poles to the digits printed. */
  it('the coefficients printed for 1/(s(s+1)), T = 1: (0.3679 z + 0.2642)/((z - 0.3679)(z - 1)) (K. Ogata, Discrete-Time Control Systems; from memory)', () => {
    const loop = factorsOf('1/(s*(s+1))', 1)
    expect(loop.gain.toFixed(4)).toBe('0.3679')
    expect((-loop.gain * (loop.zeros.re[0] as number)).toFixed(4)).toBe('0.2642')
    expect([...loop.poles.re].sort().map(pole => pole.toFixed(4))).toEqual(['0.3679', '1.0000'])
  })

  it('the coefficients printed for the antenna: 0.0484 (z + 0.9672)/((z - 1)(z - 0.9048)) (G. F. Franklin, J. D. Powell, M. L. Workman, Digital Control of Dynamic Systems; from memory)', () => {
    const loop = factorsOf('1/(s*(10*s+1))', 1)
    expect(loop.gain.toFixed(4)).toBe('0.0484')
    expect((loop.zeros.re[0] as number).toFixed(4)).toBe('-0.9672')
    expect([...loop.poles.re].sort().map(pole => pole.toFixed(4))).toEqual(['0.9048', '1.0000'])
  })

  it('the coefficients printed for 1/(s^2 + 1.4 s + 1), h = 0.4: (0.066 z + 0.055)/(z^2 - 1.450 z + 0.571) (K. J. Astrom, B. Wittenmark, Computer-Controlled Systems, ch. 3; from memory)', () => {
    const { gain, zeros, poles } = factorsOf('1/(s^2+1.4*s+1)', 0.4)
    expect(gain.toFixed(3)).toBe('0.066')
    expect((-gain * (zeros.re[0] as number)).toFixed(3)).toBe('0.055')
    expect((-2 * (poles.re[0] as number)).toFixed(3)).toBe('-1.450')
    expect(((poles.re[0] as number) ** 2 + (poles.im[0] as number) ** 2).toFixed(3)).toBe('0.571')
  })
})

type Complex = [number, number]
const times = ([a, b]: Complex, [c, d]: Complex): Complex => [a * c - b * d, a * d + b * c]
const over = ([a, b]: Complex, [c, d]: Complex): Complex => [(a * c + b * d) / (c * c + d * d), (b * c - a * d) / (c * c + d * d)]
const plus = ([a, b]: Complex, [c, d]: Complex): Complex => [a + c, b + d]
const turn = (angle: number): Complex => [Math.cos(angle), Math.sin(angle)]

describe('a converter: inductor current through its filter, one update an edge at half duty, one sample of computing, 1.5 samples of delay in total', () => {
  const { parameters: { kp, fi, T, L, R, ff } } = JSON.parse(readFileSync(join(project, converter), 'utf8')) as { parameters: Record<'kp' | 'fi' | 'T' | 'L' | 'R' | 'ff', number> }
  const wf = 2 * Math.PI * ff
  const a = R / L
  const controller = (z: Complex) => times([kp, 0], plus([1, 0], over([2 * Math.PI * fi * T, 0], plus(z, [-1, 0]))))

  /** Closed form: g(t) = wf/L/(wf - a) (e^(-at) - e^(-wf t)) sampled half a sample late, times T, a sample of computing and one until the next instant. */
  function exactAt(w: number): Complex {
    const z = turn(w * T)
    const mode = (rate: number): Complex => over([Math.exp(-rate * T / 2), 0], plus(z, [-Math.exp(-rate * T), 0]))
    const plant = times([T * wf / L / (wf - a), 0], plus(mode(a), times([-1, 0], mode(wf))))
    return times(controller(z), over(plant, z))
  }

  /** C(e^(jwT)) e^(-1.5 jwT) G(jw) F(jw) */
  function approximateAt(w: number): Complex {
    const plant = over(over([1, 0], [R, w * L]), [1, w / wf])
    return times(times(controller(turn(w * T)), turn(-1.5 * w * T)), plant)
  }

  const { status, stdout } = spawnSync('npm', ['run', '-s', 'analyze', converter], { cwd: project, encoding: 'utf8' })
  const analysis = JSON.parse(stdout) as LoopAnalysis
  const degrees = ([re, im]: Complex) => Math.atan2(im, re) * 180 / Math.PI
  const decibels = ([re, im]: Complex) => 20 * Math.log10(Math.hypot(re, im))

  it('the command line prints both: the margins of the exact loop gain, and what the approximation says beside them', () => {
    expect(status).toBe(0)
    expect(analysis.stability.verdict).toBe('stable')
    expect(analysis.structure).toMatchObject({ sampleTime: T, approximated: true, notes: [] })
    const all = [...analysis.gainCrossovers, ...analysis.phaseCrossovers, ...analysis.closestApproaches]
    expect(all).toHaveLength(3)
    for (const { frequency, approximation } of all) {
      const w = 2 * Math.PI * (frequency as number)
      const [exact, approximate] = [exactAt(w), approximateAt(w)]
      expect(Math.abs(approximation!.phase - degrees(over(approximate, exact)))).toBeLessThan(1e-9)
      expect(Math.abs(approximation!.gain - decibels(over(approximate, exact)))).toBeLessThan(1e-9)
      expect(Math.abs(approximation!.distance - (Math.hypot(...plus([1, 0], approximate)) - Math.hypot(...plus([1, 0], exact))))).toBeLessThan(1e-12)
    }
  })

  it('the exact margins are those of the closed form', () => {
    const [gain] = analysis.gainCrossovers
    const [phase] = analysis.phaseCrossovers
    const atGain = exactAt(2 * Math.PI * gain!.frequency)
    expect(Math.abs(decibels(atGain))).toBeLessThan(1e-9)
    expect(Math.abs(gain!.phaseMargin - (180 + degrees(atGain)))).toBeLessThan(1e-9)
    const atPhase = exactAt(2 * Math.PI * (phase!.frequency as number))
    expect(Math.abs(degrees(times([-1, 0], atPhase)))).toBeLessThan(1e-9)
    expect(Math.abs(phase!.gainMargin + decibels(atPhase))).toBeLessThan(1e-9)
  })

  it('the approximation takes more than 3 degrees of phase margin that the loop has, and nearly 6 at the phase crossover', () => {
    expect(analysis.gainCrossovers[0]!.phaseMargin).toBeCloseTo(35.9028, 4)
    expect(analysis.gainCrossovers[0]!.approximation!.phase).toBeCloseTo(-3.2288, 4)
    expect(analysis.phaseCrossovers[0]!.approximation!.phase).toBeCloseTo(-5.92, 4)
  })
})

function factorsOf(plant: string, sampleTime: number) {
  const lowered = lowerExpression({ expression: 'H0*G', blocks: { H0: { kind: 'hold', hold: 'zeroOrder', sampleTime }, G: typed(plant) } })
  if (lowered.kind !== 'factored') throw new Error('a sampled loop has factors')
  return lowered.loop
}
