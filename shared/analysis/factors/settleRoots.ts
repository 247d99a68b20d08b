import { aberthStep } from '../../numeric/extended/aberthStep'
import type { ReturnDifferenceNumerator } from './ReturnDifferenceNumerator'

const MAXIMAL_SWEEPS = 60

/**
 * Moves approximate roots of D + N onto its roots, by Aberth's iteration (1973) in plain doubles on the factors; `re` and `im` are changed in place.
 * False where the iteration does not settle.
 */
export function settleRoots(sum: ReturnDifferenceNumerator, re: Float64Array, im: Float64Array): boolean {
  const n = sum.degree
  const out = new Float64Array(6)
  const step = new Float64Array(2)
  const settled = new Uint8Array(n)
  let open = n
  for (let sweep = 0; open > 0; sweep++) {
    if (sweep === MAXIMAL_SWEEPS) return false
    for (let k = 0; k < n; k++) {
      if (settled[k]) continue
      const x = re[k] as number
      const y = im[k] as number
      const scale = scaleOf(x, y)
      const scaling = 1 / scale
      sum.evaluate(x, y, scaling, out)
      const pr = out[0] as number
      const pi = out[1] as number
      const square = pr * pr + pi * pi
      if (square === 0) {
        settled[k] = 1
        open--
        continue
      }
      const length = aberthStep(re, im, k, scaling, out, step)
      re[k] = x - step[0]! * scale
      im[k] = y - step[1]! * scale
      if (length <= 1e-15 || Math.sqrt(square) <= 4e-16 * (out[4] as number)) {
        settled[k] = 1
        open--
      }
    }
  }
  return true
}

/** A power of two of the size of x + j y. */
export function scaleOf(x: number, y: number): number {
  return 2 ** Math.round(Math.log2(Math.max(Math.abs(x), Math.abs(y), 1e-290)))
}
