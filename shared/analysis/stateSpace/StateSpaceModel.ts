import { controllerHessenberg, type ControllerHessenberg } from '../../numeric/doubleDouble/controllerHessenberg'
import { DoubleDoubleMatrix } from '../../numeric/doubleDouble/DoubleDoubleMatrix'
import { balanceSystem } from '../../numeric/linear/balanceSystem'
import type { StateSpaceGain } from '../../types/block'
import { blockEigenvalues, blockRoots } from './blockRoots'
import { channelZeros } from './channelZeros'
import { factoredValue } from './factoredValue'
import { channelAccuracy, type ChannelAccuracy } from './channelAccuracy'
import { cancelHiddenModes, type HiddenMode } from './cancelHiddenModes'
import { perturbationAt, type ChannelMatrices, type Perturbation } from './perturbationAt'
import type { PreciseRoot } from './rootList'
import { snapCluster } from './snapCluster'

/** One channel as gain prod(s - zero) / prod(s - pole), every pole of the block among its poles. */
export interface ChannelFactors {
  gain: { high: number, low: number }
  zeros: PreciseRoot[]
  poles: readonly PreciseRoot[]
  /** Poles that this channel does not show; each stands among the zeros too. */
  hidden: HiddenMode[]
}

/** Far from a root counts what is this many times as far away as the farthest pole. */
const FAR = 8
/** Relative change of the response that leaving a far zero out may make up to the frequencies of the poles. */
const HARMLESS = 1e-10
/** A pole known from a trailing block in doubles is the same pole within this. */
const SAME_POLE = 1e-5

/**
 * A state space prepared for its channels: balanced, reduced input by input, its poles (one list for all channels) and, on demand, the zeros and the gain of a
 * channel. Method and what is proven: README.md of the analysis.
 */
export class StateSpaceModel {
  readonly states: number
  readonly sampled: boolean
  /** Balanced, row by row. */
  readonly a: Float64Array
  /** Largest sum of magnitudes in a row of the balanced A: no pole is larger. */
  readonly norm: number
  /** see ChannelMatrices */
  private readonly sizes: Float64Array
  private readonly columns: Float64Array[]
  private readonly rows: Float64Array[]
  private readonly direct: readonly (readonly number[])[]
  private readonly outputMatrix: DoubleDoubleMatrix
  private readonly stateMatrix: DoubleDoubleMatrix
  private readonly forms = new Map<number, ControllerHessenberg>()
  private poleList: PreciseRoot[] | undefined
  private readonly accuracies = new Map<string, ChannelAccuracy>()
  private readonly channels = new Map<string, ChannelFactors | null>()

  constructor({ a, b, c, d, sampleTime }: Pick<StateSpaceGain, 'a' | 'b' | 'c' | 'd' | 'sampleTime'>) {
    const balanced = balanceSystem(a, b, c)
    this.states = a.length
    this.sampled = sampleTime !== undefined
    this.a = Float64Array.from(balanced.a.flat())
    this.norm = balanced.a.reduce((most, row) => Math.max(most, row.reduce((sum, value) => sum + Math.abs(value), 0)), 0)
    const magnitudes = balanced.a.map(row => row.map(value => Math.abs(value)))
    const rowSizes = magnitudes.map(row => row.reduce((most, value) => Math.max(most, value), 0))
    const columnSizes = magnitudes.map((_, j) => magnitudes.reduce((most, row) => Math.max(most, row[j]!), 0))
    this.sizes = Float64Array.from(rowSizes.flatMap(row => columnSizes.map(column => Math.min(row, column))))
    const inputs = d[0]?.length ?? 0
    this.columns = Array.from({ length: inputs }, (_, j) => Float64Array.from(balanced.b, row => row[j]!))
    this.rows = balanced.c.map(row => Float64Array.from(row))
    this.direct = d
    this.stateMatrix = DoubleDoubleMatrix.fromNumbers(balanced.a, this.states)
    this.outputMatrix = DoubleDoubleMatrix.fromNumbers(balanced.c, this.states)
  }

  matrices(output: number, input: number): ChannelMatrices {
    return { a: this.a, b: this.columns[input]!, c: this.rows[output]!, d: this.direct[output]![input]!, sizes: this.sizes, norm: this.norm }
  }

  /** Largest pole in size. */
  get reach(): number {
    return this.poles().reduce((most, { re, im }) => Math.max(most, Math.hypot(re, im)), 0)
  }

  form(input: number): ControllerHessenberg {
    const known = this.forms.get(input)
    if (known) return known
    const column = DoubleDoubleMatrix.fromNumbers(Array.from(this.columns[input]!, value => [value]), 1)
    const form = controllerHessenberg(this.stateMatrix, column, this.outputMatrix)
    this.forms.set(input, form)
    return form
  }

  /** All eigenvalues of A, the blocks of the reduction from the first input one after the other, those that count as on the stability boundary exactly on it. */
  poles(): readonly PreciseRoot[] {
    if (this.poleList) return this.poleList
    const form = this.form(0)
    const poles = form.starts.slice(1).flatMap((to, k) => blockRoots(form, form.starts[k]!, to))
    this.poleList = poles
    const zero = new Float64Array(this.states)
    const alone = { a: this.a, b: zero, c: zero, d: 0, sizes: this.sizes, norm: this.norm }
    this.snap(poles, s => perturbationAt(alone, s).determinant)
    return poles
  }

  /** The factors of a channel (numbers from 0); null where it is zero. @throws RangeError when roots do not settle */
  channel(output: number, input: number): ChannelFactors | null {
    const key = `${output},${input}`
    const known = this.channels.get(key)
    if (known !== undefined) return known
    const factors = this.channelFactors(output, input)
    this.channels.set(key, factors)
    return factors
  }

  /** How far the factors of a channel may be from the matrices. */
  accuracyOf(output: number, input: number, factors: ChannelFactors): ChannelAccuracy {
    const key = `${output},${input}`
    const accuracy = this.accuracies.get(key) ?? channelAccuracy(this, output, input, factors)
    this.accuracies.set(key, accuracy)
    return accuracy
  }

  private channelFactors(output: number, input: number): ChannelFactors | null {
    let direct = this.direct[output]![input]!
    const shortest = this.shortestPath(output, input)
    if (direct === 0 && shortest === null) return null
    const poles = this.poles()
    const form = this.form(input)
    const size = this.states === 0 || form.beta.high === 0 ? 0 : form.starts[1]!
    const unreachable = this.unreachable(form, input, size)
    const visible = poles.filter((_, k) => !unreachable.has(k))
    const rest = poles.filter((_, k) => unreachable.has(k))
    const perturbation = this.perturbations(output, input)
    const weightsHigh = form.c.high.slice(output * this.states, output * this.states + size)
    const weightsLow = form.c.low.slice(output * this.states, output * this.states + size)
    // a path through k states has no part faster than s^-k: what rounding left there is nothing
    const leading = shortest === null ? size : Math.min(size, shortest)
    weightsHigh.fill(0, 0, leading)
    weightsLow.fill(0, 0, leading)
    let numerator = channelZeros(form, size, weightsHigh, weightsLow, direct)
    const far = FAR * Math.max(this.reach, 1e-3 * this.norm)
    for (;;) {
      if (!numerator) return null
      const { zeros, gain, excess } = numerator
      const drop = this.spurious(zeros, visible, gain.high, far, perturbation)
      if (drop === 0) break
      if (direct !== 0) direct = 0
      const from = excess === 0 ? 0 : excess - 1
      const count = excess === 0 ? drop - 1 : drop
      weightsHigh.fill(0, from, from + count)
      weightsLow.fill(0, from, from + count)
      numerator = channelZeros(form, size, weightsHigh, weightsLow, direct)
    }
    const { zeros, gain } = numerator
    if (this.isNothing(zeros, visible, gain.high, perturbation)) return null
    this.snap(zeros, (s) => {
      const { response, determinant } = perturbation(s)
      return response / this.size(gain.high, zeros, visible, s) + determinant
    })
    const hidden = cancelHiddenModes(this, output, input, gain.high, zeros, visible)
    return {
      gain, poles,
      zeros: [...zeros, ...rest.map(root => ({ ...root }))],
      hidden: [...rest.map((pole): HiddenMode => ({ pole, kind: 'unreachable', exact: true })), ...hidden],
    }
  }

  private perturbations(output: number, input: number): (s: number) => Perturbation {
    const known = new Map<number, Perturbation>()
    const matrices = this.matrices(output, input)
    return (s) => {
      let found = known.get(s)
      if (!found) {
        found = perturbationAt(matrices, s)
        known.set(s, found)
      }
      return found
    }
  }

  private size(gain: number, zeros: readonly PreciseRoot[], poles: readonly PreciseRoot[], s: number): number {
    const { re, im } = factoredValue(gain, zeros, poles, s, 0)
    return Math.hypot(re, im)
  }

  /** How many of the farthest zeros the matrices cannot tell from zeros at infinity. */
  private spurious(zeros: readonly PreciseRoot[], poles: readonly PreciseRoot[], gain: number, far: number, perturbation: (s: number) => Perturbation): number {
    const sizes = zeros.map(({ re, im }) => Math.hypot(re, im)).sort((p, q) => q - p)
    let most = 0
    while (most < sizes.length && sizes[most]! >= far) most++
    for (let m = most; m > 0; m--) {
      const nearest = sizes[m - 1]!
      if (m < sizes.length && sizes[m]! > nearest / 2) continue
      const members = zeros.filter(({ re, im }) => Math.hypot(re, im) >= nearest)
      // where the poles are nothing may change that the analysis could show
      if ([1, -1, 0].some(part => changeBy(members, part * this.norm, part === 0 ? this.norm : 0) > HARMLESS)) continue
      const within = [1, -1].every((side) => {
        const s = side * nearest / 4
        const { response, determinant } = perturbation(s)
        return changeBy(members, s, 0) <= response / this.size(gain, zeros, poles, s) + determinant
      })
      if (within) return m
    }
    return 0
  }

  /** True where the response is no larger than what rounding of the matrices makes, at points of several sizes. */
  private isNothing(zeros: readonly PreciseRoot[], poles: readonly PreciseRoot[], gain: number, perturbation: (s: number) => Perturbation): boolean {
    if (this.states === 0) return false
    const scale = this.reach > 0 ? this.reach : Math.max(this.norm, 2 ** -300)
    return [1, 0.1, 10, 0.01, 0.001].every(factor => this.size(gain, zeros, poles, factor * scale) <= perturbation(factor * scale).response)
  }

  private snap(roots: PreciseRoot[], uncertainty: (s: number) => number): void {
    if (!this.sampled) snapCluster(roots, 0, 1e-2 * this.norm, uncertainty)
    else for (const point of [1, -1]) snapCluster(roots, point, 1e-2, uncertainty)
  }

  /** Poles (by their place in `poles`) of the part that the input does not reach. */
  private unreachable(form: ControllerHessenberg, input: number, size: number): Set<number> {
    const poles = this.poles()
    const found = new Set<number>()
    if (input === 0) {
      for (let k = size; k < poles.length; k++) found.add(k)
      return found
    }
    const edges = size === 0 ? form.starts : form.starts.slice(1)
    for (let block = 0; block + 1 < edges.length; block++) {
      const { re, im } = blockEigenvalues(form, edges[block]!, edges[block + 1]!)
      for (let j = 0; j < re.length; j++) {
        let nearest = -1
        let smallest = Infinity
        poles.forEach((pole, k) => {
          const distance = Math.hypot(pole.re - re[j]!, pole.im - im[j]!)
          if (found.has(k) || distance >= smallest) return
          smallest = distance
          nearest = k
        })
        if (!(smallest <= SAME_POLE * Math.max(this.norm, Number.MIN_VALUE))) throw new RangeError('the modes that an input does not reach cannot be told from the others')
        found.add(nearest)
      }
    }
    return found
  }

  /** States that the shortest path from the input to the output passes; null where there is none. */
  private shortestPath(output: number, input: number): number | null {
    const { states: n, a } = this
    const { b: column, c: row } = this.matrices(output, input)
    const seen = new Uint8Array(n)
    let level: number[] = []
    for (let i = 0; i < n; i++) if (column[i] !== 0) level.push(i)
    for (let length = 0; level.length > 0; length++) {
      for (const i of level) seen[i] = 1
      if (level.some(i => row[i] !== 0)) return length
      const next = new Set<number>()
      for (const j of level) for (let i = 0; i < n; i++) if (!seen[i] && a[i * n + j] !== 0) next.add(i)
      level = [...next]
    }
    return null
  }
}

/** |prod(1 - s / zero) - 1| at s = x + j y. */
function changeBy(zeros: readonly PreciseRoot[], x: number, y: number): number {
  let p = 1
  let q = 0
  for (const { re, im } of zeros) {
    const square = re * re + im * im
    const a = 1 - (x * re + y * im) / square
    const b = (x * im - y * re) / square
    const t = p * a - q * b
    q = p * b + q * a
    p = t
  }
  return Math.hypot(p - 1, q)
}
