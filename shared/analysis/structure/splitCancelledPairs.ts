import type { FactoredLoop, FactorList } from '../FactoredLoop'

/** A loop without the poles that a zero cancels exactly, and those poles: modes that stay where they are whatever the gain. */
export function splitCancelledPairs(loop: FactoredLoop): { rest: FactoredLoop, hidden: { re: number, im: number }[] } {
  const { zeros, poles } = loop
  const usedZeros = new Set<number>()
  const usedPoles = new Set<number>()
  for (let k = 0; k < poles.re.length; k++) {
    const zero = zeros.re.findIndex((re, j) => !usedZeros.has(j) && re === poles.re[k] && zeros.im[j] === poles.im[k])
    if (zero < 0) continue
    usedZeros.add(zero)
    usedPoles.add(k)
  }
  return {
    rest: { ...loop, zeros: without(zeros, usedZeros), poles: without(poles, usedPoles) },
    hidden: [...usedPoles].map(k => ({ re: poles.re[k]!, im: poles.im[k]! })),
  }
}

function without(list: FactorList, left: ReadonlySet<number>): FactorList {
  const keep = (_: number, k: number) => !left.has(k)
  return { re: list.re.filter(keep), im: list.im.filter(keep), correction: list.correction.filter(keep), onBoundary: list.onBoundary.filter(keep) }
}
