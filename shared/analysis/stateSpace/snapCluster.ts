import type { PreciseRoot } from './rootList'

const LARGEST_CLUSTER = 12
/** A cluster stands apart when the next root is this many times as far away. */
const APART = 8

/**
 * Puts a cluster of roots that the numbers of the matrices cannot tell from a multiple root at a real point of the stability boundary exactly there: on two points four
 * times as far from it as the cluster reaches, the product of its factors differs from that of the multiple root by no more (relative) than a few units in the last place of the
 * matrices can change the whole. An integrator in other coordinates is one. `reach` is the farthest a cluster is looked for.
 */
export function snapCluster(roots: PreciseRoot[], point: number, reach: number, uncertainty: (s: number) => number): void {
  const distance = (root: PreciseRoot) => Math.hypot((root.re - point) + root.reLow, root.im)
  const near = roots.filter(root => distance(root) > 0 && distance(root) <= APART * reach).sort((p, q) => distance(p) - distance(q))
  for (let m = Math.min(LARGEST_CLUSTER, near.length); m > 0; m--) {
    const radius = distance(near[m - 1]!)
    if (radius > reach || (m < near.length && distance(near[m]!) < APART * radius)) continue
    const members = near.slice(0, m)
    const within = [1, -1].every((side) => {
      const s = point + side * 4 * radius
      if (s === point) return true
      let re = 1
      let im = 0
      for (const root of members) {
        // 1 - (r - point) / (s - point)
        const a = 1 - ((root.re - point) + root.reLow) / (s - point)
        const b = -root.im / (s - point)
        const t = re * a - im * b
        im = re * b + im * a
        re = t
      }
      return Math.hypot(re - 1, im) <= uncertainty(s)
    })
    if (!within) continue
    for (const root of members) Object.assign(root, { re: point, reLow: 0, im: 0, imLow: 0, correction: 0 })
    return
  }
}
