import type { StateSpaceGain } from '#shared/types/block'

/** Numbers in [-0.5, 0.5) from a fixed linear congruence. */
export function sequence(seed: number): () => number {
  let state = seed
  return () => {
    state = (state * 1103515245 + 12345) % 2147483648
    return state / 2147483648 - 0.5
  }
}

export function product(a: number[][], b: number[][]): number[][] {
  return a.map(row => b[0]!.map((_, j) => row.reduce((sum, value, k) => sum + value * b[k]![j]!, 0)))
}

export function transposed(a: number[][]): number[][] {
  return a[0]!.map((_, j) => a.map(row => row[j]!))
}

export function identity(n: number): number[][] {
  return Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => i === j ? 1 : 0))
}

/** A product of three reflections: orthogonal to rounding. */
export function orthogonal(n: number, seed: number): number[][] {
  const next = sequence(seed)
  const q = identity(n)
  for (let k = 0; k < 3; k++) {
    const v = Array.from({ length: n }, next)
    const square = v.reduce((sum, value) => sum + value * value, 0)
    for (const row of q) {
      const part = 2 * row.reduce((sum, value, j) => sum + value * v[j]!, 0) / square
      for (let j = 0; j < n; j++) row[j]! -= part * v[j]!
    }
  }
  return q
}

export function stateSpace(a: number[][], b: number[][], c: number[][], d?: number[][], sampleTime?: number): StateSpaceGain {
  return {
    kind: 'stateSpace', a, b, c, d: d ?? c.map(() => b.length === 0 ? [0] : b[0]!.map(() => 0)), inputs: [], outputs: [],
    ...sampleTime !== undefined && { sampleTime },
  }
}

/** The same system in the coordinates x~ = T x, each product rounded to doubles. */
export function inCoordinates(gain: StateSpaceGain, t: number[][], inverse: number[][]): StateSpaceGain {
  return { ...gain, a: product(product(t, gain.a), inverse), b: product(t, gain.b), c: product(gain.c, inverse) }
}

export function rotated(gain: StateSpaceGain, seed: number): StateSpaceGain {
  const q = orthogonal(gain.a.length, seed)
  return inCoordinates(gain, q, transposed(q))
}

/** Coordinates of condition about 10^(2 digits): a rotation, states scaled from 10^-digits to 10^digits, another rotation. */
export function skewed(gain: StateSpaceGain, seed: number, digits: number): StateSpaceGain {
  const n = gain.a.length
  const first = rotated(gain, seed)
  const scale = Array.from({ length: n }, (_, i) => 10 ** (n === 1 ? 0 : digits * (2 * i / (n - 1) - 1)))
  const scaled: StateSpaceGain = {
    ...first,
    a: first.a.map((row, i) => row.map((value, j) => value * scale[i]! / scale[j]!)),
    b: first.b.map((row, i) => row.map(value => value * scale[i]!)),
    c: first.c.map(row => row.map((value, j) => value / scale[j]!)),
  }
  return rotated(scaled, seed + 1)
}

/** Companion form of numerator / denominator, lowest power first, denominator monic and of the higher degree. */
export function companion(numerator: number[], denominator: number[]): StateSpaceGain {
  const n = denominator.length - 1
  const a = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (_, j) => i < n - 1 ? (j === i + 1 ? 1 : 0) : -denominator[j]! + 0))
  return stateSpace(a, Array.from({ length: n }, (_, i) => [i === n - 1 ? 1 : 0]), [Array.from({ length: n }, (_, j) => numerator[j] ?? 0)])
}

/** Blocks along the diagonal; inputs and outputs in common. */
export function parallel(...parts: StateSpaceGain[]): StateSpaceGain {
  const n = parts.reduce((sum, part) => sum + part.a.length, 0)
  const a = Array.from({ length: n }, () => new Array<number>(n).fill(0))
  let offset = 0
  for (const part of parts) {
    const start = offset
    part.a.forEach((row, i) => row.forEach((value, j) => {
      a[start + i]![start + j] = value
    }))
    offset += part.a.length
  }
  return stateSpace(a, parts.flatMap(part => part.b), parts[0]!.c.map((_, i) => parts.flatMap(part => part.c[i]!)))
}

/** gain / (s^2 + 2 damping w s + w^2) of the position, in the coordinates (position, rate / w). */
export function mode(w: number, damping: number, gain = 1): StateSpaceGain {
  return stateSpace([[0, w], [-w, -2 * damping * w]], [[0], [1]], [[gain / w, 0]])
}
