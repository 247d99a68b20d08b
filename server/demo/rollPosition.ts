import type { CoefficientsDefinition } from '#shared/types/source'

/** Product of two polynomials, coefficients with the highest power first. */
function multiply(a: number[], b: number[]): number[] {
  const product = new Array<number>(a.length + b.length - 1).fill(0)
  a.forEach((x, i) => b.forEach((y, j) => {
    product[i + j] = (product[i + j] ?? 0) + x * y
  }))
  return product
}

/**
 * The roll position loop of the demo as coefficients:
 * kRoP (1 + 0.3/s)/s / (s/25 + 1) / (hydraulics) / (torsion mode), and 8 ms of dead time.
 */
export function coefficientsOfRollPosition(values: Record<string, number>): { name: string, definition: CoefficientsDefinition } {
  const { kRoP = 0, whRo = 0, wTor = 0 } = values
  const parts = [[1, 0, 0], [1 / 25, 1], [1 / whRo ** 2, 0.8 / whRo, 1], [1 / wTor ** 2, 0.02 / wTor, 1]]
  return {
    name: 'identified model',
    definition: { kind: 'coefficients', numerator: [kRoP, 0.3 * kRoP], denominator: parts.reduce(multiply, [1]), deadTime: 0.008 },
  }
}
