import type { FactoredLoop } from '../FactoredLoop'
import type { PlanePole } from './describeOpenLoopPole'
import { followRootLoci, type LocusEnd } from './followRootLoci'
import { poleInPlane } from './poleInPlane'

/** More loci than this that met on the way name no origin. */
const MOST_ORIGINS = 2
/** How far (relative) the end of a locus may lie from the closed-loop pole found by other means. */
const SAME_ROOT = 1e-5

/**
 * For each closed-loop pole the open-loop pole it goes back to as the gain falls, in words; two where their loci met on the real axis and left it
 * together. Null where that is not plain.
 */
export function nameClosedLoopPoles(loop: FactoredLoop, samples: number, roots: { re: number, im: number }[], words: (pole: PlanePole) => string): (string | null)[] {
  const poles = [...Array.from(loop.poles.re, (re, k) => ({ re, im: loop.poles.im[k]! })), ...Array.from({ length: samples }, () => ({ re: 0, im: 0 }))]
  // A pole is known by the first one at its place or at its mirror image.
  const canonical = poles.map(({ re, im }) => poles.findIndex(other => other.re === re && Math.abs(other.im) === Math.abs(im)))
  const ends = followRootLoci(loop, samples, canonical)
  if (ends === null) return roots.map(() => null)
  const matched = matchEnds(roots, ends)
  return matched.map((end) => {
    if (end === null || end.origins.length > MOST_ORIGINS) return null
    return [...new Set(end.origins.map((origin) => {
      const { re, im } = poles[origin]!
      return words(poleInPlane(re, Math.abs(im), loop.sampleTime))
    }))].join(' and ')
  })
}

/** The end of a locus for each root, one to one, nearest first. */
function matchEnds(roots: { re: number, im: number }[], ends: LocusEnd[]): (LocusEnd | null)[] {
  const matched = roots.map((): LocusEnd | null => null)
  const free = new Set(ends)
  const pairs = roots.flatMap((root, k) => ends.map(end => ({ k, end, distance: Math.hypot(root.re - end.re, root.im - end.im) }))
    .filter(({ distance, end }) => distance <= SAME_ROOT * Math.hypot(root.re, root.im, end.re, end.im) || distance === 0))
  for (const { k, end } of pairs.sort((a, b) => a.distance - b.distance)) {
    if (matched[k] !== null || !free.has(end)) continue
    matched[k] = end
    free.delete(end)
  }
  return matched
}
