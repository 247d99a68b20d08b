import type { StructureNote } from '../../types/analysis'
import type { FactorOrigin, PolynomialFactor } from '../expressions/ExactLoop'
import { factorsFromPolynomials } from '../factors/factorsFromPolynomials'
import { listInWords } from '../../formatting/listInWords'

/**
 * That a pole on or beyond the stability boundary stands in different blocks and is taken as one: two outputs of one plant share it, two integrators side by side do not, and then
 * the closed loop keeps one that L does not show. Null where the factor has no such pole.
 */
export function takenAsOneNote({ coefficients, precise, roots }: PolynomialFactor, some: FactorOrigin, others: FactorOrigin): StructureNote | null {
  const { sampled } = some
  const { re, im, onBoundary } = factorsFromPolynomials([{ polynomial: { coefficients, exponent: 0 }, power: 1, given: roots, precise }], sampled, 'expression')
  const places = Array.from(re, (x, k) => ({ x, y: im[k]!, kept: onBoundary[k] === 1 || (sampled ? Math.hypot(x, im[k]!) > 1 : x > 0) }))
    .filter(({ y, kept }) => kept && y >= 0)
    .map(({ x, y }) => y === 0 ? format(x) : `${format(x)} +- j${format(y)}`)
  if (places.length === 0) return null
  const [first, second] = [some, others].map(({ blocks }) => listInWords(blocks)).sort()
  return {
    block: '', code: 'other',
    message: `${first} and ${second} have the same pole at ${sampled ? 'z' : 's'} = ${listInWords(places)}, not a stable one, which is taken as one pole of one part, as where two blocks are two outputs of one plant. `
      + 'Where they are parts of their own, the closed loop keeps a mode there that L does not show: write what they share as a block of its own.',
  }
}

const format = (value: number) => String(Number(value.toPrecision(6)))
