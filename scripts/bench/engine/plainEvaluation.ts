import type { ZerosPolesInput } from '#shared/types/analysis'

/** One half of the loop as real factors (jw - r) and quadratic factors (c - w^2 + j b w), flat. */
function factorsOf(roots: [number, number][]): { real: Float64Array, quadratic: Float64Array } {
  const real: number[] = []
  const quadratic: number[] = []
  for (const [re, im] of roots) {
    if (im === 0) real.push(re)
    else if (im > 0) quadratic.push(-2 * re, re * re + im * im)
  }
  return { real: Float64Array.from(real), quadratic: Float64Array.from(quadratic) }
}

/**
 * The fastest plain evaluation that we know of in this language: real and quadratic factors, one division, no allocation. Returns a sum over all
 * points, so that nothing can be left out.
 */
export function plainEvaluation(input: ZerosPolesInput): (frequencies: Float64Array) => number {
  const top = factorsOf(input.zeros)
  const bottom = factorsOf(input.poles)
  const { gain, deadTime = 0 } = input
  return (frequencies) => {
    let sum = 0
    for (let i = 0; i < frequencies.length; i += 1) {
      const w = frequencies[i]!
      const w2 = w * w
      let x = gain
      let y = 0
      for (let k = 0; k < top.real.length; k += 1) {
        const r = -top.real[k]!
        const t = x * r - y * w
        y = x * w + y * r
        x = t
      }
      for (let k = 0; k < top.quadratic.length; k += 2) {
        const b = top.quadratic[k]! * w
        const c = top.quadratic[k + 1]! - w2
        const t = x * c - y * b
        y = x * b + y * c
        x = t
      }
      let u = 1
      let v = 0
      for (let k = 0; k < bottom.real.length; k += 1) {
        const r = -bottom.real[k]!
        const t = u * r - v * w
        v = u * w + v * r
        u = t
      }
      for (let k = 0; k < bottom.quadratic.length; k += 2) {
        const b = bottom.quadratic[k]! * w
        const c = bottom.quadratic[k + 1]! - w2
        const t = u * c - v * b
        v = u * b + v * c
        u = t
      }
      const size = u * u + v * v
      let re = (x * u + y * v) / size
      let im = (y * u - x * v) / size
      if (deadTime > 0) {
        const cos = Math.cos(w * deadTime)
        const sin = Math.sin(w * deadTime)
        const t = re * cos + im * sin
        im = im * cos - re * sin
        re = t
      }
      sum += re + im
    }
    return sum
  }
}
