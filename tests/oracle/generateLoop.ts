import { angleOnAxis, axisFactors, logGainOnAxis } from './axisFactors'
import type { OracleCoefficients, OracleRoots } from './ExactLoop'
import { exactStationaryGains } from './exactStationaryGains'
import { seededRandom } from './seededRandom'

type Pair = [number, number]

/** The kinds of loop the oracle is run on. */
export const LOOP_FAMILIES = [
  'mixed', 'light damping', 'twelve decades', 'near-cancelling pairs', 'tuned hump', 'integrators', 'undamped modes', 'unstable poles',
  'biproper', 'sampled', 'sampled hump', 'coefficients', 'sampled coefficients', 'dead time', 'dead time with light damping', 'sampled dead time',
  'repeated roots', 'sampled whole numbers', 'whole numbers with dead time', 'sampled whole numbers with dead time',
  'tuned phase',
] as const
/** Families of exact whole numbers: ties of structure (a phase that leaves an end with no linear term, say) are common in them. */
export const FAMILIES_WITH_TIES: readonly LoopFamily[] = [
  'repeated roots', 'sampled whole numbers', 'whole numbers with dead time', 'sampled whole numbers with dead time',
]
export type LoopFamily = typeof LOOP_FAMILIES[number]

export interface GeneratedLoop {
  family: LoopFamily
  seed: number
  gainFloor: number
  input: OracleRoots | OracleCoefficients
}

interface Draw {
  between: (low: number, high: number) => number
  logBetween: (low: number, high: number) => number
  whole: (low: number, high: number) => number
  chance: (p: number) => boolean
}

function draw(seed: number): Draw {
  const random = seededRandom(seed * 2654435761 + 12345)
  const between = (low: number, high: number) => low + (high - low) * random()
  return {
    between,
    logBetween: (low, high) => Math.exp(between(Math.log(low), Math.log(high))),
    whole: (low, high) => low + Math.floor(random() * (high - low + 1)),
    chance: p => random() < p,
  }
}

/** `count` roots, in pairs where drawn so, with frequencies and dampings spread evenly on a log scale; `right`: chance to lie on the right. */
function roots(d: Draw, count: number, frequencies: Pair, dampings: Pair, right = 0): Pair[] {
  const list: Pair[] = []
  while (list.length < count) {
    const w = d.logBetween(...frequencies)
    const side = d.chance(right) ? 1 : -1
    if (count - list.length >= 2 && d.chance(0.7)) {
      const zeta = d.logBetween(...dampings)
      const re = side * zeta * w
      const im = w * Math.sqrt(Math.max(0, 1 - zeta * zeta))
      list.push([re, im], [re, -im])
    }
    else list.push([side * w, 0])
  }
  return list
}

/** The same loop with |L| = 1 at t on its axis. */
function withUnitGainAt(input: OracleRoots, t: number): OracleRoots {
  return { ...input, gain: input.gain * Math.exp(-logGainOnAxis(axisFactors({ ...input, deadTime: 0 }), t)) }
}

/** Gain set so that an extreme of |L| lies at 1 +- 10^-3 .. 10^-10 (a hair over: two crossings, a hair under: none). */
function withTunedHump(d: Draw, input: OracleRoots): OracleRoots {
  const gains = exactStationaryGains(input)
  if (gains.length === 0) return input
  const hair = (d.chance(0.5) ? 1 : -1) * d.logBetween(1e-10, 1e-3)
  return { ...input, gain: input.gain * Math.exp(-gains[d.whole(0, gains.length - 1)]! + Math.log1p(hair)) }
}

/** About the highest frequency (at most 1e12) at which |L| is above the floor (dB). */
function lastAbove(input: OracleRoots, gainFloor: number): number {
  const factors = axisFactors({ ...input, deadTime: 0 })
  let t = 1e12
  while (t > 1e-6 && logGainOnAxis(factors, t) < gainFloor * Math.LN10 / 20) t /= 1.1
  return t
}

/**
 * A dead time and one zero set so that the phase is stationary at w and comes within 10^-3 .. 10^-7 rad of the negative real axis there: a hair over
 * it gives two phase crossovers, a hair short of it none. Null where no such zero is found.
 */
function withTunedPhase(d: Draw, loop: OracleRoots, w: number): OracleRoots | null {
  const hair = (d.chance(0.5) ? 1 : -1) * d.logBetween(1e-7, 1e-3)
  const poles: Pair[] = [...loop.poles, [-30 * w, 0]]
  const candidate = (a: number): OracleRoots => {
    const rational = { ...loop, poles, zeros: [...loop.zeros, [-a, 0] as Pair] }
    const { factors } = axisFactors(rational)
    const slope = factors.reduce((sum, { re, im, weight }) => sum - weight * re / ((w - im) ** 2 + re ** 2), 0)
    return { ...rational, deadTime: slope }
  }
  const miss = (a: number) => {
    const tuned = candidate(a)
    if (!(tuned.deadTime! > 0)) return Number.NaN
    const turned = angleOnAxis(axisFactors(tuned), w) - Math.PI - hair
    return turned - 2 * Math.PI * Math.round(turned / (2 * Math.PI))
  }
  const places = Array.from({ length: 80 }, (_, i) => w * 10 ** (-2 + i / 20))
  for (let i = 1; i < places.length; i += 1) {
    let [low, high] = [places[i - 1]!, places[i]!]
    if (!(Math.abs(miss(low)) < 1 && Math.abs(miss(high)) < 1 && miss(low) * miss(high) < 0)) continue
    for (let step = 0; step < 60; step += 1) {
      const middle = (low + high) / 2
      if (miss(middle) * miss(low) > 0) low = middle
      else high = middle
    }
    return { ...candidate(low), gain: loop.gain * d.logBetween(0.2, 5) }
  }
  return null
}

function discRoots(d: Draw, count: number, dampings: Pair, outside = 0, lowest = 1e-3): Pair[] {
  // poles of sampled modes: z = exp(sT) with |sT| up to 3
  return roots(d, count, [lowest, 3], dampings, outside).map(([re, im]) => {
    const radius = Math.exp(Math.max(-3, re))
    return [radius * Math.cos(im), radius * Math.sin(im)]
  })
}

function times(p: number[], q: number[]): number[] {
  const product = new Array<number>(p.length + q.length - 1).fill(0)
  p.forEach((a, i) => q.forEach((b, j) => {
    product[i + j]! += a * b
  }))
  return product
}

function expand(list: Pair[], gain: number): number[] {
  return list.reduce((p, [re, im]) => im === 0 ? times(p, [1, -re]) : im > 0 ? times(p, [1, -2 * re, re * re + im * im]) : p, [gain])
}

/** A product of factors with small whole coefficients, drawn and raised to powers: exact in doubles, with repeated roots and roots on the boundary. */
function wholeNumbers(d: Draw, factors: number[][], degree: number): number[] {
  let p = [1]
  while (p.length <= degree) {
    const factor = factors[d.whole(0, factors.length - 1)]!
    for (let power = d.whole(1, 3); power > 0 && p.length - 1 + factor.length - 1 <= degree; power -= 1) p = times(p, factor)
    if (p.length - 1 === degree - 1 && d.chance(0.5)) break
  }
  return p
}

const CONTINUOUS_FACTORS = [[1, 0], [1, 1], [1, 2], [2, 1], [1, 5], [1, 1, 1], [1, 1, 4], [1, 0, 4], [1, 0, 9], [8, 1, 32], [1, -1], [1, -1, 3]]
const SAMPLED_FACTORS = [[1, -1], [1, 0], [2, -1], [4, -3], [4, 3], [1, 1], [2, -2, 1], [4, -4, 3], [1, -1, 1], [1, 0, 1], [2, -3], [16, -31, 16]]

/** The seed-th loop of a family: the same on every machine up to the last bit of the runtime's exp, log and trigonometric functions. */
export function generateLoop(family: LoopFamily, seed: number, orders: Pair = [2, 9]): GeneratedLoop {
  const d = draw(seed * 16 + LOOP_FAMILIES.indexOf(family))
  const order = d.whole(...orders)
  const gainFloor = -10 * d.whole(2, 9)
  const sign = () => d.chance(0.15) ? -1 : 1
  const make = (poles: Pair[], zeros: Pair[], extra: Partial<OracleRoots> = {}): OracleRoots => ({ zeros, poles, gain: sign(), ...extra })
  const band: Pair = family === 'twelve decades' ? [1e-6, 1e6] : [0.03, 30]
  const dampings: Pair = family.includes('light damping') ? [1e-6, 1e-2] : [1e-3, 1]
  const continuous = (right = 0): OracleRoots => {
    const zeroCount = d.whole(0, order - 1)
    return make(roots(d, order, band, dampings, right), roots(d, zeroCount, band, dampings, 0.2))
  }
  const crossover = () => d.logBetween(band[0], band[1])
  const sampled = (extra: Partial<OracleRoots> = {}): OracleRoots => {
    const poles = discRoots(d, order, d.chance(0.5) ? [1e-5, 1e-1] : [1e-2, 1], 0.1)
    if (d.chance(0.4)) poles[poles.findIndex(p => p[1] === 0)] = [1, 0]
    const zeros = discRoots(d, d.whole(0, order), [1e-3, 1], 0.2)
    const real = zeros.findIndex(p => p[1] === 0)
    if (real >= 0 && d.chance(0.3)) zeros[real] = [d.chance(0.5) ? -1 : 0, 0]
    return withUnitGainAt(make(poles.filter(p => p !== undefined), zeros, { sampleTime: d.logBetween(1e-4, 10), ...extra }), Math.tan(d.logBetween(1e-3, 3) / 2))
  }
  const input = ((): OracleRoots | OracleCoefficients => {
    switch (family) {
      case 'mixed':
      case 'light damping':
      case 'twelve decades':
        return withUnitGainAt(continuous(), crossover())
      case 'near-cancelling pairs': {
        const loop = continuous()
        const apart = d.logBetween(1e-7, 1e-3)
        const near = (list: Pair[]) => list.map(([re, im]): Pair => [re * (1 + apart), im * (1 - apart)])
        const shared = roots(d, d.whole(1, 4), band, [1e-4, 1], 0.1)
        return withUnitGainAt({ ...loop, poles: [...loop.poles, ...shared], zeros: [...loop.zeros, ...near(shared)] }, crossover())
      }
      case 'tuned hump':
        return withTunedHump(d, withUnitGainAt(continuous(), crossover()))
      case 'integrators': {
        const loop = continuous()
        const count = d.whole(1, 3)
        return withUnitGainAt({ ...loop, poles: [...loop.poles, ...Array.from({ length: count }, (): Pair => [0, 0])] }, crossover())
      }
      case 'undamped modes': {
        const loop = continuous()
        const b = crossover()
        const pair: Pair[] = [[0, b], [0, -b]]
        const asZeros = loop.zeros.length <= loop.poles.length - 3 && d.chance(0.4)
        return withUnitGainAt(asZeros ? { ...loop, zeros: [...loop.zeros, ...pair] } : { ...loop, poles: [...loop.poles, ...pair] }, crossover())
      }
      case 'unstable poles':
        return withUnitGainAt(continuous(0.5), crossover())
      case 'biproper':
        return withUnitGainAt(make(roots(d, order, band, dampings, 0.1), roots(d, order, band, dampings, 0.2)), crossover())
      case 'sampled':
        return sampled()
      case 'sampled hump':
        return withTunedHump(d, sampled())
      case 'coefficients': {
        const { zeros, poles, gain } = withUnitGainAt(continuous(0.1), crossover())
        const integrators = d.chance(0.4) ? new Array<number>(d.whole(1, 2)).fill(0) : []
        return { numerator: expand(zeros, gain), denominator: [...expand(poles, 1), ...integrators] }
      }
      case 'sampled coefficients': {
        // nearer to z = 1 the rounded coefficients could not tell a cluster of poles from one on the boundary
        const poles = discRoots(d, Math.min(order, 6), [1e-2, 1], 0.1, 0.1)
        const zeros = discRoots(d, d.whole(0, poles.length), [1e-2, 1], 0.2, 0.1)
        const loop = withUnitGainAt(make(poles, zeros, { sampleTime: 1 }), Math.tan(d.logBetween(1e-2, 3) / 2))
        return { numerator: expand(zeros, loop.gain), denominator: expand(poles, 1), sampleTime: d.logBetween(1e-4, 10) }
      }
      case 'tuned phase': {
        // beside a damped zero the phase rises, which a dead time can level out
        const w = crossover()
        for (let attempt = 0; attempt < 12; attempt += 1) {
          const zeta = d.logBetween(0.02, 0.3)
          const loop = continuous()
          loop.poles.push([-3 * w, 0], [-5 * w, 0])
          loop.zeros.push([-zeta * w, w], [-zeta * w, -w])
          const tuned = withTunedPhase(d, loop, w)
          if (!tuned) continue
          const scaled = withUnitGainAt(tuned, w)
          const loudness = d.logBetween(0.1, 10)
          if (tuned.deadTime! * lastAbove(scaled, gainFloor - 20) < 1000) return { ...scaled, gain: scaled.gain * loudness }
        }
        const plain = withUnitGainAt(continuous(), w)
        return { ...plain, deadTime: Math.min(0.1 / w, 1000 / lastAbove(plain, gainFloor)) }
      }
      case 'repeated roots':
      case 'sampled whole numbers': {
        const sampledLoop = family === 'sampled whole numbers'
        const factors = sampledLoop ? SAMPLED_FACTORS : CONTINUOUS_FACTORS
        const denominator = wholeNumbers(d, factors, Math.min(order, 8))
        // zeros away from the boundary: an undamped pole and zero at the same place is another matter
        const zeros = factors.filter((_, i) => sampledLoop ? i > 0 && i < 8 && i !== 5 : i > 0 && i < 7)
        const numerator = wholeNumbers(d, zeros, d.whole(0, denominator.length - 2))
        const gain = Math.round(d.logBetween(1, 1000)) / 64 * sign()
        return { numerator: numerator.map(c => c * gain), denominator, ...sampledLoop ? { sampleTime: 0.5 } : {} }
      }
      case 'whole numbers with dead time':
      case 'sampled whole numbers with dead time': {
        const sampledLoop = family === 'sampled whole numbers with dead time'
        const places: Pair[][] = sampledLoop
          ? [[[1, 0]], [[0, 0]], [[0.5, 0]], [[-0.5, 0]], [[0.75, 0]], [[-1, 0]], [[0, 1], [0, -1]], [[0.5, 0.5], [0.5, -0.5]], [[0.5, 0.75], [0.5, -0.75]], [[1.5, 0]]]
          : [[[0, 0]], [[-1, 0]], [[-2, 0]], [[-0.25, 0]], [[0, 2], [0, -2]], [[-1, 2], [-1, -2]], [[-0.125, 3], [-0.125, -3]], [[1, 0]], [[0.5, 1], [0.5, -1]]]
        const pick = (count: number, from: Pair[][]) => {
          const list: Pair[] = []
          while (list.length < count) list.push(...from[d.whole(0, from.length - 1)]!)
          return list
        }
        const poles = pick(Math.min(order, 5), places)
        const inner = places.filter(([first]) => sampledLoop ? Math.abs(first![0]) < 1 && first![1] !== 1 : first![0] < 0)
        const zeros = pick(d.whole(0, poles.length - 2), inner).slice(0, poles.length - 1)
        // a pair must not be cut in half
        if (zeros.length > 0 && zeros.at(-1)![1] > 0) zeros.pop()
        const gain = Math.round(d.logBetween(1, 300)) / 32 * sign()
        return { zeros, poles, gain, deadTime: d.whole(1, 8) / 8, ...sampledLoop ? { sampleTime: 0.25 } : {} }
      }
      case 'dead time':
      case 'dead time with light damping': {
        const loop = continuous(0.1)
        const poles: Pair[] = [...loop.poles, ...Array.from({ length: d.whole(0, 2) }, (): Pair => [0, 0])]
        const scaled = withUnitGainAt({ ...loop, poles }, crossover())
        // at most some hundreds of turns above the floor
        return { ...scaled, deadTime: Math.min(d.logBetween(1e-3, 10), 2000 / lastAbove(scaled, gainFloor)) }
      }
      case 'sampled dead time': {
        const period = d.logBetween(1e-4, 10)
        return sampled({ sampleTime: period, deadTime: period * d.between(0.1, 12) })
      }
    }
  })()
  return { family, seed, gainFloor, input }
}
