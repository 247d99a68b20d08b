import { describe, expect, it } from 'vitest'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { lowerExpression } from '#shared/analysis/expressions/lowerExpression'
import { parseExpression } from '#shared/analysis/expressions/parseExpression'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { plainEvaluation } from './plainEvaluation'

const modes = Array.from({ length: 10 }, (_, i) => `exp(-${(i + 1) / 100}*s)/(s^2+2*0.01*${i + 1.3}*s+${i + 1.3}^2)`).join('+')
const predictor = (controller: string, plant: string) => `(${controller})*(${plant})*exp(-s*T)/(1+(${controller})*(${plant})*(1-exp(-s*T)))`

const analyse = (expression: string, parameters: Record<string, number> = {}) => analyseLoop({ expression, parameters })

describe('loop gains with several dead times', () => {
  it.each([
    ['two paths', '5/(s+1)*exp(-s)+2/(s+3)*exp(-2*s)', {}, 1e-3, 200],
    ['ten modes with ten dead times', modes, {}, 1e-2, 1e3],
    ['a predictor around two lags', predictor('2*(1+1/(3*s))', '1/(s+1)^2'), { T: 1.5 }, 1e-3, 1e3],
    ['a predictor around an integrator', predictor('2', '1/s'), { T: 0.5 }, 1e-3, 500],
    ['a held sample', '10/(s+1)/(0.1*s+1)*(1-exp(-s*T))/(s*T)', { T: 0.2 }, 1e-3, 1e3],
    ['a delayed inner loop', '0.5/(s+1)/(1+3/s*exp(-s))', {}, 1e-3, 1e3],
    ['terms that cancel at zero frequency', '5/(s+1)*exp(-0.1*s)-5/(s+1)', {}, 1e-4, 300],
    ['deep notches of two equal paths', '1e6/(s+1)^2*exp(-0.1*s)+1e6/(s+2)^2*exp(-0.2*s)', {}, 10, 150],
    ['undamped modes in one path only', '1/(s^2+1)*exp(-s)+1/(s^2+2)', {}, 1e-3, 1e3],
  ])('misses none of the crossings and minima that a dense grid happens to show (no oracle, a check): %s', (_, expression, parameters: Record<string, number>, low, high) => {
    const result = analyse(expression, parameters)
    expect(result.coverage.exceptions).toEqual([])
    const tree = parseExpression(expression, { variable: 's', parameterNames: Object.keys(parameters) })
    const count = 60_000
    const seen = { gain: [] as number[], phase: [] as number[], least: [] as number[] }
    let before: { w: number, re: number, im: number, size: number, distance: number } | null = null
    let falling = false
    for (let i = 0; i <= count; i++) {
      const w = low * (high / low) ** (i / count)
      const [re, im] = plainEvaluation(tree, parameters, w)
      const here = { w, re, im, size: Math.hypot(re, im), distance: Math.hypot(1 + re, im) }
      if (before) {
        if ((before.size - 1) * (here.size - 1) < 0) seen.gain.push(w)
        if (before.im * im < 0 && before.re < 0 && re < 0 && here.size > 1.001e-3) seen.phase.push(w)
        const rising = here.distance >= before.distance
        // a minimum that stands out of rounding
        if (falling && rising && before.size > 1.001e-3) seen.least.push(before.w)
        falling = !rising
      }
      before = here
    }
    const step = (high / low) ** (3 / count) - 1
    const inRange = (list: number[]) => list.filter(w => w > low && w < high)
    const agree = (found: number[], grid: number[]) => {
      expect(found).toHaveLength(grid.length)
      found.forEach((w, k) => expect(Math.abs(w / (grid[k] as number) - 1)).toBeLessThan(step))
    }
    agree(inRange(result.gainCrossovers.map(find => find.frequency)), seen.gain)
    agree(inRange(result.phaseCrossovers.map(find => find.frequency as number)), seen.phase)
    agree(inRange(result.closestApproaches.map(find => find.frequency)), seen.least)
  })

  it('finds a crossing right beside a deep notch, where nothing can be told of the phase from afar', () => {
    // two paths that nearly cancel: |L| = 0.017 at the crossing, w = 8.358 (by bisection of the sign of Im L in doubles)
    const notch = '9.978/(s^2+2*0.3670*0.3008*s+0.3008^2)*exp(-0.4032*s)+1.364/(s+1.787)*exp(-0.9865*s)'
    const { phaseCrossovers } = analyse(notch)
    const tree = parseExpression(notch, { variable: 's', parameterNames: [] })
    let [low, high] = [8.358, 8.359]
    for (let step = 0; step < 60; step++) {
      const middle = (low + high) / 2
      if (plainEvaluation(tree, {}, middle)[1] < 0) low = middle
      else high = middle
    }
    const found = phaseCrossovers.map(find => find.frequency as number).filter(w => w > 8 && w < 9)
    expect(found).toEqual([expect.closeTo(low, 8)])
  })

  it('gives the very values of L at its finds, to 1e-9', () => {
    for (const [expression, parameters] of [[modes, {}], [predictor('2*(1+1/(3*s))', '1/(s+1)^2'), { T: 1.5 }]] as const) {
      const result = analyse(expression, parameters)
      const tree = parseExpression(expression, { variable: 's', parameterNames: Object.keys(parameters) })
      for (const { frequency, phaseMargin } of result.gainCrossovers) {
        const [re, im] = plainEvaluation(tree, parameters, frequency)
        expect(Math.hypot(re, im)).toBeCloseTo(1, 9)
        expect(Math.cos((phaseMargin - 180) * Math.PI / 180)).toBeCloseTo(re, 9)
      }
      for (const { frequency, gainMargin } of result.phaseCrossovers) {
        const [re, im] = plainEvaluation(tree, parameters, frequency as number)
        expect(Math.abs(im / re)).toBeLessThan(1e-8)
        expect(-20 * Math.log10(-re)).toBeCloseTo(gainMargin, 6)
      }
    }
  })

  it('agrees with the factors of one dead time when the second path is too small to matter', () => {
    const one = analyse('25*(s+2)/(s*(s+10)*(s^2+0.02*s+4))*exp(-0.01*s)')
    const two = analyse('25*(s+2)/(s*(s+10)*(s^2+0.02*s+4))*exp(-0.01*s)+1e-16/(s+1)^3*exp(-s)')
    expect(lowerExpression({ expression: '1/s*exp(-s)+1/s' }).kind).toBe('general')
    expect(two.stability).toEqual(one.stability)
    expect(two.gainCrossovers).toHaveLength(one.gainCrossovers.length)
    two.gainCrossovers.forEach((find, k) => {
      expect(find.frequency / (one.gainCrossovers[k]?.frequency as number)).toBeCloseTo(1, 11)
      expect(find.phaseMargin).toBeCloseTo(one.gainCrossovers[k]?.phaseMargin as number, 8)
    })
    two.phaseCrossovers.forEach((find, k) => expect(find.gainMargin).toBeCloseTo(one.phaseCrossovers[k]?.gainMargin as number, 8))
    expect(two.closestApproaches).toHaveLength(one.closestApproaches.length)
    expect(two.vectorMargin?.distance).toBeCloseTo(one.vectorMargin?.distance as number, 11)
  })

  it.each([
    [1.5, 0], [3, 2], [7.8, 2], [8, 4], [14.2, 6],
  ])('counts the unstable poles of an inner loop: s + %d exp(-s) = 0 has %d roots on the right (a pair more past each pi/2 + 2 pi n, closed form)', (k, unstable) => {
    const { stability } = analyse('0.1/(s+1)/(1+k/s*exp(-s))', { k })
    expect(stability.openLoopUnstablePoles).toBe(unstable)
  })

  it('takes a predictor on the exact model as stable whatever the dead time: its closed loop is C G exp(-sT)/(1 + C G) (O. J. M. Smith, 1957, closed form)', () => {
    for (const T of [0.1, 1, 5]) {
      expect(analyse(predictor('2*(1+1/(3*s))', '1/(s+1)^2'), { T }).stability).toMatchObject({ verdict: 'stable', openLoopUnstablePoles: 0 })
    }
  })

  it('finds the crossover of a held integrator: |L| = k/w |sin(wT/2)|/(wT/2), its phase -90 - wT/2 (closed form)', () => {
    const { gainCrossovers, stability } = analyse('k/s*(1-exp(-s*T))/(s*T)', { k: 2, T: 0.2 })
    expect(gainCrossovers).toHaveLength(1)
    const { frequency, phaseMargin } = gainCrossovers[0] as { frequency: number, phaseMargin: number }
    expect(2 / frequency * Math.sin(0.1 * frequency) / (0.1 * frequency)).toBeCloseTo(1, 12)
    expect(phaseMargin).toBeCloseTo(90 - 0.1 * frequency * 180 / Math.PI, 9)
    expect(stability.verdict).toBe('stable')
  })

  it('never takes the jump of the phase at a zero of L on the axis as a crossing', () => {
    // (1 + exp(-s))/(s + 1) is 2 cos(w/2) exp(-jw/2)/(1 + jw): zero at odd multiples of pi, phase never at -180 but by the jump
    const { phaseCrossovers } = analyse('(1+exp(-s))/(s+1)')
    expect(phaseCrossovers).toEqual([])
  })

  it('shows |1 + L| clear of 1 to infinity where nothing dips below, and finds the dips where there are some', () => {
    const clear = analyse('1/(s+1)/(1+1/(s+2)*exp(-0.3*s)/(1+0.5/(s+3)*exp(-0.7*s)))')
    expect(clear.coverage.exceptions).toEqual([])
    expect(clear.vectorMargin).toEqual({ distance: 1, frequency: 'infinity' })
    // 1/s (1 + exp(-1e-6 s)): below 1 only beyond the floor's frequency, by 1e-6
    const dips = analyse('1/s+1/s*exp(-1e-6*s)')
    expect(dips.coverage.exceptions).toEqual([])
    expect(dips.vectorMargin?.distance).toBeLessThan(1)
    expect(dips.vectorMargin?.distance).toBeGreaterThan(1 - 2e-6)
  })

  it('tells an open far end, and gives no count where L is not small there', () => {
    const open = analyse('1-exp(-s)')
    expect(open.coverage.exceptions.map(exception => exception.code)).toContain('open end')
    expect(open.stability.verdict).toBe('undetermined')
    expect(analyse('0.1*(s+0.2)/(s-1)/(1+3/(s-1)*exp(-0.1*s))').stability).toMatchObject({ verdict: 'stable', openLoopUnstablePoles: 0 })
  })

  it('tells poles of a comb on the axis as exceptions and leaves the verdict undetermined, in bounded time', () => {
    const comb = analyse('1/(1-exp(-s))/(s+1)')
    expect(comb.stability.verdict).toBe('undetermined')
    expect(comb.coverage.proven).toBe(false)
  })

  it('evaluates what it analyses, zero frequency included', () => {
    const gain = prepareLoopGain({ expression: '10/(s+1)*(1-exp(-s*0.2))/(s*0.2)' })
    const out = new Float64Array(2)
    expect(gain.evaluate(0, out)).toBe(true)
    expect([out[0], out[1]]).toEqual([expect.closeTo(10, 12), 0])
    expect(gain.evaluate(1e-7, out)).toBe(true)
    expect(out[0]).toBeCloseTo(10, 12)
    const tree = parseExpression('10/(s+1)*(1-exp(-s*0.2))/(s*0.2)', { variable: 's', parameterNames: [] })
    for (const w of [0.3, 3, 30, 300]) {
      gain.evaluate(w, out)
      const [re, im] = plainEvaluation(tree, {}, w)
      expect(out[0]).toBeCloseTo(re, 12)
      expect(out[1]).toBeCloseTo(im, 12)
    }
  })
})
