import { primitivePart } from '../../numeric/extended/primitivePart'
import { Rational } from '../../numeric/extended/Rational'
import type { FactorMap, FactorOrigin, PolynomialFactor } from './ExactLoop'

/** Products of integer polynomial factors, each known by its coefficients. */
export const FactorProduct = {
  empty: new Map<string, PolynomialFactor>() as FactorMap,

  /** A polynomial (not zero) as scale times a product: the power of the variable taken out, the rest primitive. */
  of(coefficients: bigint[], precise = false): { scale: Rational, factors: FactorMap } {
    let atZero = 0
    while (coefficients[atZero] === 0n) atZero++
    const rest = coefficients.slice(atZero)
    const factors = new Map<string, PolynomialFactor>()
    if (atZero > 0) factors.set('0,1', { coefficients: [0n, 1n], power: atZero })
    if (rest.length === 1) return { scale: Rational.of(rest[0] as bigint, 1n), factors }
    const primitive = primitivePart(rest)
    factors.set(primitive.join(), { coefficients: primitive, power: 1, ...precise && { precise } })
    return { scale: Rational.of(rest[rest.length - 1] as bigint, primitive[primitive.length - 1] as bigint), factors }
  },

  /** True where one of the factors was worked out and not typed. */
  holdsPrecise(a: FactorMap): boolean {
    return Array.from(a.values()).some(factor => factor.precise)
  },

  /** The same factors, as worked out and not typed. */
  asPrecise(a: FactorMap): FactorMap {
    return new Map(Array.from(a, ([key, factor]) => [key, { ...factor, precise: true }]))
  },

  /** The same factors, those without an origin with this one. */
  from(origin: FactorOrigin, a: FactorMap): FactorMap {
    return new Map(Array.from(a, ([key, factor]) => [key, { origin, ...factor }]))
  },

  times(a: FactorMap, b: FactorMap): FactorMap {
    if (a.size === 0) return b
    if (b.size === 0) return a
    const product = new Map(a)
    for (const [key, factor] of b) {
      const present = a.get(key)
      product.set(key, present ? { ...factor, ...present, ...bothOrigins(factor, present), power: factor.power + present.power } : factor)
    }
    return product
  },

  toPower(a: FactorMap, exponent: number): FactorMap {
    return new Map(Array.from(a, ([key, factor]) => [key, { ...factor, power: factor.power * exponent }]))
  },

  /** Factors that stand in both. */
  common(a: FactorMap, b: FactorMap): FactorMap {
    const shared = new Map<string, PolynomialFactor>()
    for (const [key, factor] of a) {
      const other = b.get(key)
      if (other) shared.set(key, { ...other, ...factor, power: Math.min(factor.power, other.power) })
    }
    return shared
  },

  /** Factors of the least common multiple. */
  multiple(a: FactorMap, b: FactorMap): FactorMap {
    const result = new Map(a)
    for (const [key, factor] of b) {
      const present = a.get(key)
      result.set(key, present ? { ...factor, ...present, ...bothOrigins(factor, present), power: Math.max(factor.power, present.power) } : factor)
    }
    return result
  },

  /** a without b, which must divide it. */
  without(a: FactorMap, b: FactorMap): FactorMap {
    if (b.size === 0) return a
    const result = new Map(a)
    for (const [key, factor] of b) {
      const power = (a.get(key)?.power ?? 0) - factor.power
      if (power > 0) result.set(key, { ...factor, ...a.get(key), power })
      else result.delete(key)
    }
    return result
  },

  degree(a: FactorMap): number {
    let sum = 0
    for (const { coefficients, power } of a.values()) sum += (coefficients.length - 1) * power
    return sum
  },

  /** Coefficients of the product multiplied out, lowest power first. */
  expanded(a: FactorMap): bigint[] {
    let product = [1n]
    for (const { coefficients, power } of a.values()) {
      for (let repeat = 0; repeat < power; repeat++) product = multiplied(product, coefficients)
    }
    return product
  },

  /** Product of two polynomials, lowest power first. */
  multiplied,
}

function bothOrigins({ origin: a }: PolynomialFactor, { origin: b }: PolynomialFactor): { origin?: FactorOrigin } {
  return a && b ? { origin: { ...a, blocks: [...new Set([...a.blocks, ...b.blocks])] } } : {}
}

function multiplied(a: bigint[], b: bigint[]): bigint[] {
  const product = new Array<bigint>(a.length + b.length - 1).fill(0n)
  a.forEach((x, i) => {
    if (x === 0n) return
    b.forEach((y, j) => {
      product[i + j] = (product[i + j] as bigint) + x * y
    })
  })
  return product
}
