import type { ExactPolynomial } from '../../numeric/extended/ExactPolynomial'
import { exactFromDoubles } from '../../numeric/extended/exactFromDoubles'
import { multiplyExact } from '../../numeric/extended/multiplyExact'
import { addExact } from '../../numeric/extended/addExact'
import type { FactoredLoop, FactorList } from '../FactoredLoop'

/** D z^delaySamples + N, multiplied out from the factors of the loop gain without any rounding. */
export function exactClosedLoopPolynomial(loop: FactoredLoop, delaySamples: number): ExactPolynomial {
  const denominator = expandFactors(loop.poles, [1])
  if (delaySamples > 0) {
    denominator.coefficients.unshift(...new Array<bigint>(delaySamples).fill(0n))
  }
  return addExact(denominator, expandFactors(loop.zeros, [loop.gain]))
}

function expandFactors(list: FactorList, start: number[]): ExactPolynomial {
  let product = exactFromDoubles(start)
  for (let k = 0; k < list.re.length; k++) {
    const x = list.re[k] as number
    const y = list.im[k] as number
    if (y < 0) continue
    const root = exactFromDoubles([-x, 1])
    if (y === 0) {
      product = multiplyExact(product, root)
      continue
    }
    // (v - x)^2 + y^2
    const square = multiplyExact(exactFromDoubles([y]), exactFromDoubles([y]))
    product = multiplyExact(product, addExact(multiplyExact(root, root), square))
  }
  return product
}
