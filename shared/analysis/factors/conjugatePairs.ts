import type { ComplexPair } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'

/** Complex roots are taken as a conjugate pair when they agree to this (relative to their size). */
const PAIRING_TOLERANCE = 1e-9

/**
 * Given roots, pairs made exactly conjugate.
 *
 * @throws AnalysisInputError for a number that is not finite and a complex root without its conjugate; the path names the entry, as in 'poles[3]'
 */
export function conjugatePairs(roots: ComplexPair[], path: 'zeros' | 'poles'): { re: Float64Array, im: Float64Array } {
  const n = roots.length
  const re = Float64Array.from(roots, root => root[0])
  const im = Float64Array.from(roots, root => root[1])
  for (let k = 0; k < n; k++) {
    if (!Number.isFinite(re[k]) || !Number.isFinite(im[k])) {
      throw new AnalysisInputError(`Entry ${k + 1} of the ${path} is not a pair of finite numbers.`, `${path}[${k}]`)
    }
  }
  const paired = new Uint8Array(n)
  for (let k = 0; k < n; k++) {
    if (im[k] === 0 || paired[k]) continue
    const partner = closestConjugate(re, im, paired, k)
    if (partner < 0) {
      throw new AnalysisInputError(`Entry ${k + 1} of the ${path}, ${re[k]} ${(im[k] as number) < 0 ? '-' : '+'} j${Math.abs(im[k] as number)}, stands without its conjugate: complex ${path} come in conjugate pairs.`, `${path}[${k}]`)
    }
    re[partner] = re[k] as number
    im[partner] = -(im[k] as number)
    paired[k] = 1
    paired[partner] = 1
  }
  return { re, im }
}

function closestConjugate(re: Float64Array, im: Float64Array, paired: Uint8Array, k: number): number {
  const x = re[k] as number
  const y = im[k] as number
  let smallest = PAIRING_TOLERANCE * Math.hypot(x, y)
  let found = -1
  for (let j = 0; j < re.length; j++) {
    if (j === k || paired[j] || im[j] === 0 || Math.sign(im[j] as number) === Math.sign(y)) continue
    const distance = Math.hypot((re[j] as number) - x, (im[j] as number) + y)
    if (distance < smallest || (distance === 0 && found < 0)) {
      smallest = distance
      found = j
    }
  }
  return found
}
