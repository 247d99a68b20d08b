import type { RefinedRoots } from '../../numeric/extended/refineRoots'
import type { ScaledPolynomial } from '../../numeric/extended/ScaledPolynomial'
import type { FactorList } from '../FactoredLoop'
import { BOUNDARY_DISTANCE } from './BoundaryRule'
import { taylorVanishes } from './taylorVanishes'

/** Clusters are looked for among roots no farther than this (relative) from a point of the boundary; rounding splits ten roots by some per cent. */
const REACH = 0.1
const LARGEST_CLUSTER = 12

/**
 * Puts the roots that count as on the stability boundary exactly on it: s = 0 and s = jb, or z = 1, z = -1 and the unit circle.
 *
 * Two rules (contract of the analysis): a root within 1e-9 (relative) of the boundary; and a cluster of m roots about a
 * point of the boundary where the first m Taylor coefficients of the polynomial vanish to within a few units in the last
 * place of its coefficients, as roots of multiplicity m do that rounding has split (backward error, J. H. Wilkinson,
 * 'Rounding Errors in Algebraic Processes', 1963). The second needs the coefficients; roots given as such go by the first alone.
 */
export function snapToBoundary(roots: RefinedRoots, sampled: boolean, coefficients: ScaledPolynomial | null): FactorList {
  const list = {
    re: roots.re.slice(),
    im: roots.im.slice(),
    correction: roots.correction.slice(),
    onBoundary: new Uint8Array(roots.re.length),
  }
  const place = (k: number, re: number, im: number) => {
    list.re[k] = re
    list.im[k] = im
    list.correction[k] = 0
    list.onBoundary[k] = 1
  }
  if (coefficients && sampled) {
    for (const point of [1, -1]) {
      for (const k of clusterAt(coefficients, roots, list, point, 0)) place(k, point, 0)
    }
  }
  for (let k = 0; k < roots.re.length; k++) {
    if (list.onBoundary[k]) continue
    const projected = projection(roots.re[k] as number, roots.im[k] as number, sampled)
    if (projected && projected.distance <= BOUNDARY_DISTANCE) place(k, projected.re, projected.im)
  }
  if (coefficients) {
    for (let k = 0; k < roots.re.length; k++) {
      if (list.onBoundary[k] || !((roots.im[k] as number) > 0)) continue
      const found = undampedCluster(coefficients, roots, list, k, sampled)
      for (const member of found.members) {
        place(member, found.re, found.im)
        const partner = conjugateOf(roots, list, member)
        if (partner >= 0) place(partner, found.re, -found.im)
      }
    }
  }
  return list
}

/** Nearest point of the boundary and the relative distance to it; null for a root that has none (real, in the s plane, not at 0). */
function projection(re: number, im: number, sampled: boolean): { re: number, im: number, distance: number } | null {
  if (!sampled) {
    if (im === 0) return re === 0 ? { re: 0, im: 0, distance: 0 } : null
    return { re: 0, im, distance: Math.abs(re) / Math.hypot(re, im) }
  }
  if (re === 0 && im === 0) return null
  const nearOne = Math.hypot(Math.abs(re) - 1, im)
  if (im === 0 || nearOne <= BOUNDARY_DISTANCE) return { re: Math.sign(re), im: 0, distance: nearOne }
  const modulus = Math.hypot(re, im)
  // (|r|^2 - 1) / (|r| + 1) without the rounding of the square root
  const excess = ((Math.abs(re) - 1) * (Math.abs(re) + 1) + im * im) / (modulus + 1)
  return { re: re / modulus, im: im / modulus, distance: Math.abs(excess) }
}

/** The largest group of nearest roots that cannot be told from a multiple root at a real point of the boundary. */
function clusterAt(coefficients: ScaledPolynomial, roots: RefinedRoots, list: FactorList, re: number, im: number): number[] {
  const near = nearest(roots, list, re, im, REACH * Math.hypot(re, im)).slice(0, LARGEST_CLUSTER)
  for (let m = near.length; m > 0; m--) {
    const members = near.slice(0, m)
    if (!closedUnderConjugation(roots, members)) continue
    if (taylorVanishes(coefficients, roots, re, im, m)) return members
  }
  return []
}

/** The largest group about root k, upper half plane, that cannot be told from a multiple root on the boundary beside it. */
function undampedCluster(coefficients: ScaledPolynomial, roots: RefinedRoots, list: FactorList, k: number, sampled: boolean): { members: number[], re: number, im: number } {
  const x = roots.re[k] as number
  const y = roots.im[k] as number
  const own = projection(x, y, sampled)
  if (!own || own.distance > REACH) return { members: [], re: 0, im: 0 }
  const near = nearest(roots, list, x, y, REACH * Math.hypot(x, y))
    .filter(j => (roots.im[j] as number) > 0)
    .slice(0, LARGEST_CLUSTER)
  for (let m = near.length; m > 0; m--) {
    const members = near.slice(0, m)
    let re = 0
    let im = 0
    for (const member of members) {
      re += (roots.re[member] as number) / m
      im += (roots.im[member] as number) / m
    }
    const point = projection(re, im, sampled)
    if (point && taylorVanishes(coefficients, roots, point.re, point.im, m)) return { members, re: point.re, im: point.im }
  }
  return { members: [], re: 0, im: 0 }
}

/** Roots not yet placed within a reach of a point, nearest first. */
function nearest(roots: RefinedRoots, list: FactorList, re: number, im: number, reach: number): number[] {
  const found: { k: number, distance: number }[] = []
  for (let k = 0; k < roots.re.length; k++) {
    if (list.onBoundary[k]) continue
    const distance = Math.hypot((roots.re[k] as number) - re, (roots.im[k] as number) - im)
    if (distance <= reach) found.push({ k, distance })
  }
  return found.sort((a, b) => a.distance - b.distance || a.k - b.k).map(entry => entry.k)
}

function closedUnderConjugation(roots: RefinedRoots, members: number[]): boolean {
  let balance = 0
  for (const member of members) balance += Math.sign(roots.im[member] as number)
  return balance === 0
}

function conjugateOf(roots: RefinedRoots, list: FactorList, k: number): number {
  for (let j = 0; j < roots.re.length; j++) {
    if (!list.onBoundary[j] && roots.re[j] === roots.re[k] && roots.im[j] === -(roots.im[k] as number)) return j
  }
  return -1
}
