import { constant, polynomial, product, quotient, s, sum, type LoopTree } from './LoopTree'
import { seededRandom } from './seededRandom'

export const RATIONAL_TREE_FAMILIES = ['product of factors', 'sum of modes', 'inner loop', 'sampled sum', 'powers of 1/z'] as const
export type RationalTreeFamily = typeof RATIONAL_TREE_FAMILIES[number]

export interface GeneratedRationalTree {
  tree: LoopTree
  gainFloor: number
  /** s; the tree's variable is z then */
  sampleTime?: number
}

const fraction = (numerator: number[], denominator: number[]) => quotient(polynomial(numerator), polynomial(denominator))

/** The seed-th rational expression of a family; numbers are short decimals, meant as the doubles they are read as. */
export function generateRationalTree(family: RationalTreeFamily, seed: number): GeneratedRationalTree {
  const random = seededRandom(seed * 131 + RATIONAL_TREE_FAMILIES.indexOf(family) * 17 + 9)
  const log = (low: number, high: number, digits = 5) => Number(Math.exp(Math.log(low) + Math.log(high / low) * random()).toPrecision(digits))
  const chance = (p: number) => random() < p
  const some = <T>(least: number, most: number, make: () => T): T[] => Array.from({ length: least + Math.floor(random() * (most - least + 1)) }, make)
  const short = (x: number) => Number(x.toPrecision(6))
  const mode = () => {
    const w = log(0.1, 50)
    return polynomial([1, short(2 * log(1e-5, 0.7) * w), short(w * w)])
  }
  const lag = () => polynomial([1, log(0.05, 50)])
  const multiplied = (list: LoopTree[], first: LoopTree = constant(log(0.01, 100))) => list.reduce((tree, f) => product(tree, f), first)
  const added = (list: LoopTree[]) => list.slice(1).reduce((tree, f) => sum(tree, f), list[0]!)
  const gainFloor = -10 * (3 + Math.floor(random() * 6))
  switch (family) {
    case 'product of factors': {
      const bottom = [...some(1, 4, () => chance(0.6) ? mode() : lag()), ...some(0, 2, () => s)]
      return { tree: quotient(multiplied(some(0, bottom.length - 1, lag)), multiplied(bottom, constant(1))), gainFloor }
    }
    case 'sum of modes': {
      const rigid = chance(0.5) ? [fraction([log(0.1, 10)], [1, 0, 0])] : [quotient(constant(log(0.1, 10)), lag())]
      const modes = some(1, 4, () => quotient(constant(short((chance(0.3) ? -1 : 1) * log(1e-3, 5))), mode()))
      return { tree: product(fraction([log(0.1, 20), log(0.1, 20)], [1, log(20, 200)]), added([...rigid, ...modes])), gainFloor }
    }
    case 'inner loop': {
      const plant = quotient(constant(log(0.5, 20)), product(lag(), mode()))
      const controller = fraction([log(0.1, 5), log(0.1, 5)], [1, 0])
      const sensor = quotient(constant(log(0.05, 2)), lag())
      return { tree: quotient(product(plant, controller), sum(constant(1), product(plant, sensor))), gainFloor }
    }
    case 'sampled sum': {
      const pole = () => chance(0.3) ? [1, -1] : chance(0.5) ? [1, -log(0.1, 0.99)] : [1, short(-1.8 * log(0.1, 0.99)), short(log(0.83, 0.98))]
      return { tree: added(some(1, 3, () => fraction([short((chance(0.3) ? -1 : 1) * log(0.01, 1))], pole()))), gainFloor, sampleTime: log(1e-3, 1) }
    }
    case 'powers of 1/z': {
      const back = quotient(constant(1), s)
      const bottom = sum(constant(1), product(constant(short(-log(0.2, 0.95))), back))
      const top = added(some(1, 4, () => multiplied(some(0, 3, () => back), constant(short((chance(0.3) ? -1 : 1) * log(0.05, 1))))))
      return { tree: quotient(product(top, back), chance(0.5) ? product(bottom, polynomial([1, -1])) : bottom), gainFloor, sampleTime: log(1e-3, 1) }
    }
  }
}
