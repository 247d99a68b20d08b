import type { ComplexPair } from '../../types/analysis'
import type { ZerosPolesGain } from '../../types/block'
import type { FactoredLoop, FactorList } from '../FactoredLoop'
import { preciseClosedLoopRoots } from './preciseClosedLoopRoots'

/** A coefficient of the mode's numerator below this part of the other is rounding, not a far zero. */
const ROUNDING = 1e-12

/**
 * A continuous gain G with one pair of poles moved: G - M + M', M = (alpha s + beta)/(s^2 + 2 zeta w s + w^2) the part of G that belongs to the pair by its
 * residues, M' the same alpha, beta and zeta with w times 1 + change. As zeros, poles and gain: the zeros are the roots of
 * N q' + (alpha s + beta)(q - q') D/q other than the pair itself (q the quadratic of the pair, N/D = G). Null for a pair that is not simple.
 *
 * @throws RangeError where the zeros lie closer together than doubles can hold
 */
export function shiftPolePair(loop: FactoredLoop, index: number, change: number): ZerosPolesGain | null {
  const { zeros, poles } = loop
  const [re, im] = [poles.re[index]!, poles.im[index]!]
  const rest = Array.from(poles.re, (x, k): ComplexPair => [x, poles.im[k]!]).filter((_, k) => k !== index && k !== conjugateOf(poles, index))
  const part = modePart(loop, [re, im], rest)
  if (part === null) return null
  const w = Math.hypot(re, im)
  const moved = w * (1 + change)
  const zeta = -re / w
  const pair = [[re * (1 + change), im * (1 + change)], [re * (1 + change), -im * (1 + change)]] as ComplexPair[]
  // q - q' = 2 zeta (w - moved) s + w^2 - moved^2, its root -(w + moved)/(2 zeta)
  const slope = 2 * zeta * (w - moved)
  const level = (w - moved) * (w + moved)
  const first: Product = { gain: loop.gain, roots: [...listOf(zeros), ...pair] }
  const second = [linear(part.alpha, part.beta), linear(slope, level), { gain: 1, roots: rest }].reduce(multiply)
  const deadTime = loop.deadTime === 0 ? {} : { deadTime: loop.deadTime }
  if (second.gain === 0) return { kind: 'zerosPoles', zeros: listOf(zeros), poles: [...rest, [re, im], [re, -im]], gain: loop.gain, ...deadTime }
  const { gain, roots } = rootsOfSum(first, second)
  const others = withoutPair(roots, re, im)
  return { kind: 'zerosPoles', zeros: others.flatMap(([x, y]): ComplexPair[] => y === 0 ? [[x, 0]] : [[x, y], [x, -y]]), poles: [...rest, ...pair], gain, ...deadTime }
}

interface Product { gain: number, roots: ComplexPair[] }

function linear(slope: number, level: number): Product {
  return slope === 0 ? { gain: level, roots: [] } : { gain: slope, roots: [[-level / slope, 0]] }
}

const multiply = (a: Product, b: Product): Product => ({ gain: a.gain * b.gain, roots: [...a.roots, ...b.roots] })

/** alpha and beta of the pair p, from its residue r = N(p) / (rest(p) (p - conj p)): alpha = 2 Re r, beta = -2 Re(r conj p). */
function modePart(loop: FactoredLoop, [re, im]: ComplexPair, rest: ComplexPair[]): { alpha: number, beta: number } | null {
  let log = Math.log(Math.abs(loop.gain))
  let angle = loop.gain < 0 ? Math.PI : 0
  for (const [x, y] of listOf(loop.zeros)) {
    const distance = Math.hypot(re - x, im - y)
    if (distance === 0) return { alpha: 0, beta: 0 }
    log += Math.log(distance)
    angle += Math.atan2(im - y, re - x)
  }
  for (const [x, y] of [...rest, [re, -im] as ComplexPair]) {
    const distance = Math.hypot(re - x, im - y)
    if (distance <= 1e-6 * Math.hypot(re, im)) return null
    log -= Math.log(distance)
    angle -= Math.atan2(im - y, re - x)
  }
  const size = Math.exp(log)
  const [r, i] = [size * Math.cos(angle), size * Math.sin(angle)]
  const alpha = 2 * r
  const beta = -2 * (r * re + i * im)
  const w = Math.hypot(re, im)
  const largest = Math.max(Math.abs(alpha) * w, Math.abs(beta))
  return { alpha: Math.abs(alpha) * w <= ROUNDING * largest ? 0 : alpha, beta: Math.abs(beta) <= ROUNDING * largest ? 0 : beta }
}

/** Leading coefficient and roots (upper half plane and real axis) of a sum of two products. */
function rootsOfSum(a: Product, b: Product): Product {
  const [high, low] = a.roots.length >= b.roots.length ? [a, b] : [b, a]
  const sum: FactoredLoop = { gain: low.gain / high.gain, zeros: factorList(low.roots), poles: factorList(high.roots), deadTime: 0 }
  const roots = preciseClosedLoopRoots(sum, 0).map(({ re, im }): ComplexPair => [re, im])
  return { gain: high.roots.length === low.roots.length ? high.gain + low.gain : high.gain, roots }
}

function withoutPair(roots: ComplexPair[], re: number, im: number): ComplexPair[] {
  const distances = roots.map(([x, y]) => Math.hypot(x - re, y - Math.abs(im)))
  const nearest = distances.indexOf(Math.min(...distances))
  return roots.filter((_, k) => k !== nearest)
}

function factorList(roots: ComplexPair[]): FactorList {
  const n = roots.length
  return { re: Float64Array.from(roots, ([re]) => re), im: Float64Array.from(roots, ([, im]) => im), correction: new Float64Array(n), onBoundary: new Uint8Array(n) }
}

const listOf = ({ re, im }: FactorList) => Array.from(re, (x, k): ComplexPair => [x, im[k]!])

function conjugateOf({ re, im }: FactorList, index: number): number {
  return re.findIndex((x, k) => x === re[index] && im[k] === -im[index]!)
}
