import { ComplexResolvent } from '../../numeric/linear/ComplexResolvent'
import { factoredValue } from './factoredValue'
import { responseUncertainty } from './perturbationAt'
import type { PreciseRoot } from './rootList'
import type { StateSpaceModel } from './StateSpaceModel'

/** A pole that a channel does not show. */
export interface HiddenMode {
  pole: PreciseRoot
  kind: 'unreachable' | 'unobservable'
  /** false where only the rounding of the matrices hides it */
  exact: boolean
}

/** Beside a pole to about the rounding of the reduction: the zero is the pole. */
const SAME = 1e-22
/** Nearer than this it is asked whether the matrices can tell them apart. */
const NEAR = 1e-9

/**
 * Finds the zeros of a channel that stand on one of its visible poles, exactly or as far as the numbers of the matrices tell (`perturbationAt`), and
 * puts them exactly there, so that pole and zero stay in the loop as one hidden mode.
 */
export function cancelHiddenModes(model: StateSpaceModel, output: number, input: number, gain: number, zeros: PreciseRoot[], poles: readonly PreciseRoot[]): HiddenMode[] {
  const hidden: HiddenMode[] = []
  const used = new Set<number>()
  zeros.forEach((zero) => {
    if (zero.im < 0) return
    let nearest = -1
    let smallest = Infinity
    poles.forEach((pole, k) => {
      if (used.has(k) || Math.sign(pole.im) !== Math.sign(zero.im)) return
      const distance = Math.hypot((pole.re - zero.re) + (pole.reLow - zero.reLow), (pole.im - zero.im) + (pole.imLow - zero.imLow))
      if (distance >= smallest) return
      smallest = distance
      nearest = k
    })
    if (nearest < 0) return
    const pole = poles[nearest]!
    const size = Math.hypot(pole.re, pole.im)
    if (smallest > NEAR * size) return
    const exact = smallest <= SAME * size
    const kind = exact ? 'unobservable' : hiddenByRounding(model, output, input, gain, zeros, poles, pole, smallest)
    if (!kind) return
    for (const [root, other] of conjugates(zeros, zero, poles, pole)) Object.assign(root, other)
    poles.forEach((other, k) => {
      if (other === pole || (other.re === pole.re && other.im === -pole.im && pole.im !== 0)) used.add(k)
    })
    hidden.push({ pole, kind, exact })
  })
  return hidden
}

/** The pair of zero and pole, and that of their conjugates. */
function conjugates(zeros: PreciseRoot[], zero: PreciseRoot, poles: readonly PreciseRoot[], pole: PreciseRoot): [PreciseRoot, PreciseRoot][] {
  const own: [PreciseRoot, PreciseRoot] = [zero, { ...pole }]
  if (pole.im === 0) return [own]
  const zeroPartner = zeros.find(root => root.re === zero.re && root.im === -zero.im && root.reLow === zero.reLow && root.imLow === -zero.imLow)!
  return [[zeroPartner, { ...pole, im: -pole.im, imLow: -pole.imLow }], own]
}

/**
 * How the mode of a pole is hidden where the response a little beside it changes less by leaving pole and zero out than by rounding of the matrices; null where it changes more. The
 * eigenvectors (two steps of inverse iteration, J. H. Wilkinson 1965) tell whether the input or the output does not meet it (PBH test, V. M. Popov, V. Belevitch, M. L. J. Hautus).
 */
function hiddenByRounding(
  model: StateSpaceModel, output: number, input: number, gain: number, zeros: readonly PreciseRoot[], poles: readonly PreciseRoot[], pole: PreciseRoot, distance: number,
): HiddenMode['kind'] | null {
  const n = model.states
  const away = Math.max(4 * distance, 1e-7 * Math.hypot(pole.re, pole.im))
  const s = { re: pole.re + away, im: pole.im }
  const resolvent = new ComplexResolvent(model.a, s.re, s.im)
  const matrices = model.matrices(output, input)
  const { b, c } = matrices
  const zero = new Float64Array(n)
  const x = magnitudes(resolvent.solve(b, zero))
  const y = magnitudes(resolvent.solveTransposed(c))
  const value = factoredValue(gain, zeros, poles, s.re, s.im)
  const uncertainty = responseUncertainty(matrices, x, y) / Math.hypot(value.re, value.im)
  if (!(distance / away <= uncertainty)) return null
  const start = Float64Array.from({ length: n }, (_, i) => 1 + 0.5 * Math.cos(7 * i))
  const right = eigenvector(resolvent, start, n)
  const left = magnitudesOfLeft(model, s, start, n)
  return meeting(left, b) <= meeting(right, c) ? 'unreachable' : 'unobservable'
}

function eigenvector(resolvent: ComplexResolvent, start: Float64Array, n: number): { re: Float64Array, im: Float64Array } {
  const once = normalised(resolvent.solve(start, new Float64Array(n)))
  return normalised(resolvent.solve(once.re, once.im))
}

function magnitudesOfLeft(model: StateSpaceModel, s: { re: number, im: number }, start: Float64Array, n: number): { re: Float64Array, im: Float64Array } {
  const transposed = new Float64Array(n * n)
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) transposed[j * n + i] = model.a[i * n + j]!
  return eigenvector(new ComplexResolvent(transposed, s.re, s.im), start, n)
}

function normalised({ re, im }: { re: Float64Array, im: Float64Array }): { re: Float64Array, im: Float64Array } {
  let most = 0
  for (let i = 0; i < re.length; i++) most = Math.max(most, Math.abs(re[i]!), Math.abs(im[i]!))
  return { re: re.map(value => value / most), im: im.map(value => value / most) }
}

/** |v'u| over |v|'|u|, the part of the sizes that does not cancel. */
function meeting(v: { re: Float64Array, im: Float64Array }, u: Float64Array): number {
  let re = 0
  let im = 0
  let vv = 0
  let uu = 0
  for (let i = 0; i < u.length; i++) {
    re += v.re[i]! * u[i]!
    im += v.im[i]! * u[i]!
    vv += v.re[i]! ** 2 + v.im[i]! ** 2
    uu += u[i]! ** 2
  }
  return vv * uu === 0 ? 0 : Math.hypot(re, im) / Math.sqrt(vv * uu)
}

function magnitudes({ re, im }: { re: Float64Array, im: Float64Array }): Float64Array {
  return re.map((value, i) => Math.hypot(value, im[i]!))
}
