import type { ZerosPolesInput } from '#shared/types/analysis'

/** The polynomials of a loop given by zeros, poles and gain, multiplied out in doubles: highest power first. */
export function expandRoots(loop: ZerosPolesInput): { numerator: number[], denominator: number[] } {
  const expand = (list: [number, number][], lead: number) => {
    let p = [lead]
    for (const [re, im] of list) {
      if (im < 0) continue
      const q = im === 0 ? [1, -re] : [1, -2 * re, re * re + im * im]
      const product = new Array<number>(p.length + q.length - 1).fill(0)
      p.forEach((a, i) => q.forEach((b, j) => {
        product[i + j]! += a * b
      }))
      p = product
    }
    return p
  }
  return { numerator: expand(loop.zeros, loop.gain), denominator: expand(loop.poles, 1) }
}
