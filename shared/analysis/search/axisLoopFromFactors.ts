import type { FactorList, FactoredLoop } from '../FactoredLoop'
import type { AxisLoop } from './AxisLoop'
import { mapUnitCircleRoot } from './mapUnitCircleRoot'

const UNIT_ROUNDOFF = 2 ** -53
/** A pole and a zero are partners when they are nearer to each other than this part of their distance from the axis. */
const PARTNERSHIP = 0.02
/** Relative distance within which a pole and a zero are told as a hidden cancellation. */
const CANCELLATION = 1e-9

/** A root in the upper half plane or on the real axis; a complex one stands for its conjugate pair. */
interface Root {
  re: number
  im: number
  kind: 1 | -1
  correction: number
  onBoundary: boolean
  beyond: boolean
  cancelled: boolean
}

/**
 * Puts a factored loop on the imaginary axis: origin and undamped roots apart, exact pole-zero cancellations taken
 * out (and remembered where they hide a pole on or beyond the boundary), a sampled loop mapped bilinearly.
 */
export function axisLoopFromFactors(loop: FactoredLoop): AxisLoop {
  const roots = [...listRoots(loop.zeros, 1, loop), ...listRoots(loop.poles, -1, loop)]
  const unstablePoles = roots.reduce((sum, root) => sum + (root.kind < 0 && root.beyond ? (root.im > 0 ? 2 : 1) : 0), 0)
  const cancelled = cancelPairs(roots)
  const rest = roots.filter(root => !root.cancelled)
  return loop.sampleTime === undefined
    ? assemble(loop, rest, loop.gain, 0, unstablePoles, cancelled)
    : assembleSampled(loop, loop.sampleTime, rest, unstablePoles, cancelled)
}

function listRoots(list: FactorList, kind: 1 | -1, loop: FactoredLoop): Root[] {
  const roots: Root[] = []
  for (let k = 0; k < list.re.length; k++) {
    const re = list.re[k]!
    const im = list.im[k]!
    // The conjugate is made from this one.
    if (im < 0) continue
    const onBoundary = list.onBoundary[k] === 1
    const beyond = !onBoundary && (loop.sampleTime === undefined ? re > 0 : excessOfModulus(re, im) > 0)
    roots.push({ re, im, kind, correction: list.correction[k]!, onBoundary, beyond, cancelled: false })
  }
  return roots
}

/** |r|^2 - 1 without cancellation for r near the unit circle. */
function excessOfModulus(re: number, im: number): number {
  return (re - 1) * (re + 1) + im * im
}

/** Marks poles and zeros that are the same, and lists the hidden poles on or beyond the boundary. */
function cancelPairs(roots: Root[]): AxisLoop['cancelled'] {
  const hidden: AxisLoop['cancelled'] = []
  const zeros = roots.filter(root => root.kind > 0)
  const taken = new Set<Root>()
  for (const pole of roots) {
    if (pole.kind > 0) continue
    const twin = zeros.find(zero => !taken.has(zero) && zero.re === pole.re && zero.im === pole.im)
    const size = Math.hypot(pole.re, pole.im)
    const near = twin ?? (pole.beyond || pole.onBoundary
      ? zeros.find(zero => !taken.has(zero) && Math.hypot(zero.re - pole.re, zero.im - pole.im) <= CANCELLATION * size)
      : undefined)
    if (!near) continue
    taken.add(near)
    if (twin) pole.cancelled = twin.cancelled = true
    if (pole.beyond || pole.onBoundary) hidden.push({ re: pole.re, im: pole.im, onBoundary: pole.onBoundary })
  }
  return hidden
}

function assembleSampled(loop: FactoredLoop, sampleTime: number, roots: Root[], unstablePoles: number,
  cancelled: AxisLoop['cancelled']): AxisLoop {
  let gain = loop.gain
  let excess = 0
  const mapped: Root[] = []
  for (const root of roots) {
    const pair = root.im > 0
    excess -= pair ? 2 * root.kind : root.kind
    if (root.re === -1 && root.im === 0) {
      gain *= root.kind > 0 ? 2 : 0.5
      continue
    }
    const size = pair ? (1 + root.re) * (1 + root.re) + root.im * root.im : 1 + root.re
    gain = root.kind > 0 ? gain * size : gain / size
    const image = mapUnitCircleRoot(root.re, root.im)
    if (root.onBoundary) image.re = 0
    const modulus = pair ? Math.sqrt(size) : Math.abs(size)
    // The images are right to 4 units in the last place of either part: a shift of the root, told as a correction.
    const rounding = root.onBoundary && root.im === 0 ? 0 : 4 * UNIT_ROUNDOFF * Math.hypot(image.re, image.im)
    mapped.push({ ...root, re: image.re, im: image.im, correction: root.correction / modulus + rounding })
  }
  if (excess % 2 !== 0) gain = -gain
  return assemble(loop, mapped, gain, excess, unstablePoles, cancelled)
}

function assemble(loop: FactoredLoop, roots: Root[], gain: number, excess: number, unstablePoles: number,
  cancelled: AxisLoop['cancelled']): AxisLoop {
  const sampled = loop.sampleTime !== undefined
  const delayInSamples = sampled ? wholeWhereMeant(loop.deadTime / loop.sampleTime!) : 0
  const re: number[] = []
  const im: number[] = []
  const weight: number[] = []
  const correction: number[] = []
  const reals: number[] = []
  const realKinds: number[] = []
  const pairs = roots.filter(root => root.im > 0)
  const boundary = new Map<number, number>()
  let originWeight = 0
  const add = (a: number, b: number, w: number, error: number) => {
    re.push(a)
    im.push(b)
    weight.push(w)
    correction.push(error)
  }
  for (const root of roots) {
    if (root.im > 0) {
      add(root.re, root.im, root.kind, root.correction)
      add(root.re, -root.im, root.kind, root.correction)
      if (root.re === 0) boundary.set(root.im, (boundary.get(root.im) ?? 0) + root.kind)
    }
    else if (root.re === 0) {
      originWeight += root.kind
    }
    else {
      add(root.re, 0, root.kind, root.correction)
      reals.push(root.re)
      realKinds.push(root.kind)
    }
  }
  // The factor (1 - s)^excess, and the dead time of a sampled loop as ((1 - s)/(1 + s))^(deadTime/T).
  if (excess !== 0) add(1, 0, excess, 0)
  const delayStart = re.length
  if (delayInSamples !== 0) {
    add(1, 0, delayInSamples, 0)
    add(-1, 0, -delayInSamples, 0)
  }
  for (let i = 0; i < Math.abs(excess); i++) {
    reals.push(1)
    realKinds.push(Math.sign(excess))
  }
  let smallestRoot = Number.POSITIVE_INFINITY
  let largestRoot = 0
  for (let k = 0; k < re.length; k++) {
    const size = Math.hypot(re[k]!, im[k]!)
    smallestRoot = Math.min(smallestRoot, size)
    largestRoot = Math.max(largestRoot, size)
  }
  if (re.length === 0) smallestRoot = largestRoot = loop.deadTime > 0 && !sampled ? 1 / loop.deadTime : 1
  return {
    gain, originWeight,
    count: re.length,
    re: Float64Array.from(re),
    im: Float64Array.from(im),
    weight: Float64Array.from(weight),
    correction: Float64Array.from(correction),
    hasCorrection: correction.some(value => value > 0),
    partner: findPartners(re, im, weight, delayStart),
    reals: Float64Array.from(reals),
    realKinds: Int8Array.from(realKinds),
    pairsRe: Float64Array.from(pairs, root => root.re),
    pairsIm: Float64Array.from(pairs, root => root.im),
    pairKinds: Int8Array.from(pairs, root => root.kind),
    deadTime: sampled ? 0 : loop.deadTime,
    delayInSamples,
    delayStart,
    sampleTime: loop.sampleTime,
    degree: originWeight + weight.slice(0, delayStart).reduce((sum, value) => sum + value, 0),
    boundary: [...boundary].filter(([, w]) => w !== 0).map(([v, w]) => ({ v, weight: w })).sort((x, y) => x.v - y.v),
    unstablePoles, cancelled, smallestRoot, largestRoot,
  }
}

/** A number of samples, whole where the quotient of two decimal fractions misses that by rounding only (0.3/0.1). */
function wholeWhereMeant(samples: number): number {
  const whole = Math.round(samples)
  return Math.abs(samples - whole) <= 8 * Number.EPSILON * whole ? whole : samples
}

/** Pairs poles with zeros close by, each with at most one; conjugates come out paired alike because the lists are symmetric. */
function findPartners(re: number[], im: number[], weight: number[], count: number): Int32Array {
  const partner = new Int32Array(re.length).fill(-1)
  for (let k = 0; k < count; k++) {
    if (weight[k] !== -1 || partner[k] !== -1) continue
    let nearest = PARTNERSHIP * Math.abs(re[k]!)
    let found = -1
    for (let i = 0; i < count; i++) {
      if (weight[i] !== 1 || partner[i] !== -1) continue
      const gap = Math.hypot(re[i]! - re[k]!, im[i]! - im[k]!)
      if (gap < nearest) {
        nearest = gap
        found = i
      }
    }
    if (found < 0) continue
    partner[k] = found
    partner[found] = k
  }
  return partner
}
