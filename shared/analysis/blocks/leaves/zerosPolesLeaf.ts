import { Rational } from '../../../numeric/extended/Rational'
import type { ComplexPair } from '../../../types/analysis'
import type { ZerosPolesGain } from '../../../types/block'
import { conjugatePairs } from '../../factors/conjugatePairs'
import type { ExactLoop } from '../../expressions/ExactLoop'
import { FactorProduct } from '../../expressions/FactorProduct'
import { quotient } from './quotient'
import { scaledPolynomial, type ScaledFactors } from './scaledPolynomial'

/**
 * A block given by its zeros, poles and gain: each real root and each conjugate pair an exact factor that keeps the roots as given.
 *
 * @throws AnalysisInputError with the path in the block, for a complex root without its conjugate
 */
export function zerosPolesLeaf({ zeros, poles, gain }: ZerosPolesGain): ExactLoop | null {
  if (gain === 0) return null
  const top = product(zeros, 'zeros')
  const { scale, ...rest } = quotient(top, product(poles, 'poles'))
  return { ...rest, scale: scale.times(Rational.fromDouble(gain)) }
}

/** prod (s - root) */
function product(roots: ComplexPair[], path: 'zeros' | 'poles'): ScaledFactors {
  const { re, im } = conjugatePairs(roots, path)
  let result: ScaledFactors = { scale: Rational.one, factors: FactorProduct.empty }
  for (let k = 0; k < re.length; k++) {
    if (im[k]! < 0) continue
    const { scale, factors } = im[k] === 0 ? realFactor(re[k]!) : pairFactor(re[k]!, im[k]!)
    result = { scale: result.scale.times(scale), factors: FactorProduct.times(result.factors, factors) }
  }
  return result
}

function realFactor(root: number): ScaledFactors {
  return withRoots(scaledPolynomial([Rational.fromDouble(root).negated(), Rational.one])!, [[root, 0]])
}

function pairFactor(re: number, im: number): ScaledFactors {
  const a = Rational.fromDouble(re)
  const b = Rational.fromDouble(im)
  return withRoots(scaledPolynomial([a.times(a).plus(b.times(b)), a.plus(a).negated(), Rational.one])!, [[re, im], [re, -im]])
}

function withRoots({ scale, factors }: ScaledFactors, roots: ComplexPair[]): ScaledFactors {
  return { scale, factors: new Map(Array.from(factors, ([key, factor]) => [key, { ...factor, roots }])) }
}
