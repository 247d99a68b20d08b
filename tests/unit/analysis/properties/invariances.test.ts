import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { ComplexPair, LoopAnalysis, ZerosPolesInput } from '#shared/types/analysis'
import { generateLoop, type LoopFamily } from '../../../oracle/generateLoop'

const analyse = (input: ZerosPolesInput) => analyseLoop(readLoopInput(input))

function seeded(family: LoopFamily, count: number): [string, ZerosPolesInput][] {
  return Array.from({ length: count }, (_, seed) => {
    const { input, gainFloor } = generateLoop(family, 1000 + seed)
    return [`${family} ${1000 + seed}`, { ...input as ZerosPolesInput, gainFloor }]
  })
}

const LOOPS = [
  ...seeded('mixed', 6), ...seeded('light damping', 4), ...seeded('integrators', 4), ...seeded('undamped modes', 4), ...seeded('unstable poles', 4), ...seeded('biproper', 4),
  ...seeded('dead time', 6), ...seeded('sampled', 6), ...seeded('sampled dead time', 4),
]

const listed = (list: { frequency: number | 'infinity' }[]) => list.map(f => f.frequency === 'infinity' ? Number.POSITIVE_INFINITY : f.frequency)

function expectScaled(found: LoopAnalysis, base: LoopAnalysis, factor: number, why: string) {
  for (const name of ['gainCrossovers', 'phaseCrossovers', 'closestApproaches'] as const) {
    const a = listed(found[name])
    const b = listed(base[name])
    expect(a.length, `${why}, ${name}`).toBe(b.length)
    a.forEach((w, i) => {
      if (w !== b[i]! * factor) expect(Math.abs(w / (b[i]! * factor) - 1), `${why}, ${name}[${i}]`).toBeLessThan(2e-9)
    })
  }
  found.gainCrossovers.forEach((g, i) => {
    expect(Math.abs(g.phaseMargin - base.gainCrossovers[i]!.phaseMargin) % 360, why).toBeLessThan(2e-6)
    expect(g.slope).toBe(base.gainCrossovers[i]!.slope)
  })
  found.phaseCrossovers.forEach((p, i) => {
    expect(Math.abs(p.gainMargin - base.phaseCrossovers[i]!.gainMargin), why).toBeLessThan(2e-6)
    expect(p.slope).toBe(base.phaseCrossovers[i]!.slope)
  })
  found.closestApproaches.forEach((m, i) => expect(Math.abs(m.distance - base.closestApproaches[i]!.distance), why).toBeLessThan(2e-9 * Math.max(1, m.distance)))
  expect(Math.abs(found.vectorMargin!.distance - base.vectorMargin!.distance), why).toBeLessThan(2e-9)
  expect(found.stability.verdict, why).toBe(base.stability.verdict)
}

const times = (list: ComplexPair[], factor: number) => list.map(([re, im]): ComplexPair => [re * factor, im * factor])

describe('what must not change', () => {
  for (const factor of [2 ** 20, 2 ** -33, Math.PI * 1e5]) {
    it(`scaling time by 1/${factor} scales every frequency by it and leaves every margin`, () => {
      for (const [name, loop] of LOOPS) {
        const scaled: ZerosPolesInput = loop.sampleTime === undefined
          ? {
              ...loop, zeros: times(loop.zeros, factor), poles: times(loop.poles, factor), gain: loop.gain * factor ** (loop.poles.length - loop.zeros.length),
              ...loop.deadTime === undefined ? {} : { deadTime: loop.deadTime / factor },
            }
          : { ...loop, sampleTime: loop.sampleTime / factor, ...loop.deadTime === undefined ? {} : { deadTime: loop.deadTime / factor } }
        expectScaled(analyse(scaled), analyse(loop), factor, name)
      }
    })
  }

  it('Hz in place of rad/s divides every frequency by 2 pi and leaves margins and delays', () => {
    for (const [name, loop] of LOOPS) {
      const base = analyse(loop)
      const inHertz = analyse({ ...loop, frequencyUnit: 'Hz' })
      expect(inHertz.frequencyUnit).toBe('Hz')
      expectScaled(inHertz, base, 1 / (2 * Math.PI), name)
      inHertz.gainCrossovers.forEach((g, i) => {
        const delay = base.gainCrossovers[i]!.delayMargin
        expect(Math.abs(g.delayMargin - delay), name).toBeLessThanOrEqual(1e-9 * delay + 1e-12)
      })
      expect(inHertz.coverage.proven).toBe(base.coverage.proven)
    }
  })

  it('the other sign keeps the gain crossovers and turns their phase margins by 180 degrees', () => {
    for (const [name, loop] of LOOPS) {
      const base = analyse(loop)
      const turned = analyse({ ...loop, gain: -loop.gain })
      expect(turned.gainCrossovers.map(g => g.frequency.toPrecision(9)), name).toEqual(base.gainCrossovers.map(g => g.frequency.toPrecision(9)))
      turned.gainCrossovers.forEach((g, i) => {
        const apart = Math.abs(g.phaseMargin - base.gainCrossovers[i]!.phaseMargin)
        expect(Math.abs(apart - 180), name).toBeLessThan(2e-6)
      })
    }
  })

  it('the order in which roots are given does not matter', () => {
    for (const [name, loop] of LOOPS) expectScaled(analyse({ ...loop, zeros: loop.zeros.slice().reverse(), poles: loop.poles.slice().reverse() }), analyse(loop), 1, name)
  })

  it('a band lists what the whole axis lists inside it', () => {
    for (const [name, loop] of LOOPS) {
      const whole = analyse(loop)
      const at = whole.gainCrossovers[0]?.frequency
      if (at === undefined) continue
      const end = loop.sampleTime === undefined ? Number.POSITIVE_INFINITY : Math.PI / loop.sampleTime
      const band: [number, number] = [at * 0.83, Math.min(at * 7.1, end)]
      const part = analyse({ ...loop, band })
      const inside = (list: { frequency: number | 'infinity' }[]) => listed(list).filter(w => w >= band[0] && w <= band[1]).map(w => w.toPrecision(8))
      for (const list of ['gainCrossovers', 'phaseCrossovers', 'closestApproaches'] as const) {
        expect(listed(part[list]).map(w => w.toPrecision(8)), `${name}, ${list}`).toEqual(inside(whole[list]))
      }
      expect(part.stability.verdict, name).toBe(whole.stability.verdict)
      expect(part.vectorMargin!.distance, name).toBeGreaterThan(whole.vectorMargin!.distance - 1e-9)
    }
  })
})
