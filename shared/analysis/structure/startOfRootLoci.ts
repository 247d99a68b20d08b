import type { FactoredLoop } from '../FactoredLoop'
import { ReturnDifferenceNumerator } from '../factors/ReturnDifferenceNumerator'
import { settleRoots } from '../factors/settleRoots'

/** Poles closer together than this (relative) start as one. */
const ONE_POLE = 1e-7
/** Radius of the circle about each open-loop pole, of the distance to the nearest other. */
const CIRCLE = 0.2
const CIRCLE_POINTS = 48
const TRIALS = 6

export interface LociStart {
  gain: number
  re: Float64Array
  im: Float64Array
  origins: number[]
}

/**
 * A gain so small that every root of D + k N still lies in a circle about the open-loop pole it departs from (|k N| < |D| on the circle, looked at at 48
 * points of it; E. Rouche, 1862), and the roots there, each with the index of its pole. Null where none is found.
 */
export function startOfRootLoci(loop: FactoredLoop, samples: number, canonical: readonly number[]): LociStart | null {
  const clusters = clustersOf(loop, samples)
  const logLimit = Math.min(0, ...clusters.map(cluster => leastLogRatio(loop, clusters, cluster)))
  for (let trial = 0, logGain = Math.min(0, logLimit - 1); trial < TRIALS; trial++, logGain -= 4) {
    const gain = Math.exp(logGain)
    if (gain === 0) return null
    const start = rootsFromPoles(loop, samples, clusters, gain)
    if (start && clusters.every(cluster => cluster.members.every(k => Math.hypot(start.re[k]! - cluster.re, start.im[k]! - cluster.im) <= cluster.radius))) {
      return { gain, ...start, origins: [...canonical] }
    }
  }
  return null
}

interface PoleCluster { re: number, im: number, members: number[], radius: number }

function clustersOf(loop: FactoredLoop, samples: number): PoleCluster[] {
  const poles = [...Array.from(loop.poles.re, (re, k) => ({ re, im: loop.poles.im[k]! })), ...Array.from({ length: samples }, () => ({ re: 0, im: 0 }))]
  const clusters: PoleCluster[] = []
  poles.forEach(({ re, im }, k) => {
    const own = clusters.find(cluster => Math.hypot(cluster.re - re, cluster.im - im) <= ONE_POLE * Math.hypot(re, im))
    if (own) own.members.push(k)
    else clusters.push({ re, im, members: [k], radius: 0 })
  })
  for (const cluster of clusters) {
    const others = clusters.filter(other => other !== cluster).map(other => Math.hypot(other.re - cluster.re, other.im - cluster.im))
    const zeros = Array.from(loop.zeros.re, (re, k) => Math.hypot(re - cluster.re, loop.zeros.im[k]! - cluster.im)).filter(distance => distance > 0)
    const nearest = Math.min(...others)
    cluster.radius = CIRCLE * (Number.isFinite(nearest) ? nearest : Math.hypot(cluster.re, cluster.im) || Math.min(...zeros, 1))
  }
  return clusters
}

/** ln of the least |D| / |N| on the circle about a cluster. */
function leastLogRatio(loop: FactoredLoop, clusters: PoleCluster[], { re, im, radius }: PoleCluster): number {
  let least = Infinity
  for (let point = 0; point < CIRCLE_POINTS; point++) {
    const angle = 2 * Math.PI * (point + 0.5) / CIRCLE_POINTS
    const [x, y] = [re + radius * Math.cos(angle), im + radius * Math.sin(angle)]
    let log = -Math.log(Math.abs(loop.gain))
    for (const cluster of clusters) log += cluster.members.length * Math.log(Math.hypot(x - cluster.re, y - cluster.im))
    for (let k = 0; k < loop.zeros.re.length; k++) log -= Math.log(Math.hypot(x - loop.zeros.re[k]!, y - loop.zeros.im[k]!))
    least = Math.min(least, log)
  }
  return least
}

/** The m roots about a pole of multiplicity m leave it on a star: (s - p)^m = -k N(p) / (rest of D)(p), then all are settled together. */
function rootsFromPoles(loop: FactoredLoop, samples: number, clusters: PoleCluster[], gain: number): { re: Float64Array, im: Float64Array } | null {
  const n = loop.poles.re.length + samples
  const re = new Float64Array(n)
  const im = new Float64Array(n)
  for (const cluster of clusters) {
    let log = Math.log(Math.abs(loop.gain)) + Math.log(gain)
    let angle = loop.gain > 0 ? Math.PI : 0
    for (let k = 0; k < loop.zeros.re.length; k++) {
      log += Math.log(Math.hypot(cluster.re - loop.zeros.re[k]!, cluster.im - loop.zeros.im[k]!))
      angle += Math.atan2(cluster.im - loop.zeros.im[k]!, cluster.re - loop.zeros.re[k]!)
    }
    for (const other of clusters) {
      if (other === cluster) continue
      log -= other.members.length * Math.log(Math.hypot(cluster.re - other.re, cluster.im - other.im))
      angle -= other.members.length * Math.atan2(cluster.im - other.im, cluster.re - other.re)
    }
    const m = cluster.members.length
    const distance = Math.min(cluster.radius, Math.exp(log / m))
    cluster.members.forEach((k, branch) => {
      // A hair off the star, or a root of the real axis could not leave it.
      const direction = (angle + 2 * Math.PI * branch) / m + 1e-3
      re[k] = cluster.re + distance * Math.cos(direction)
      im[k] = cluster.im + distance * Math.sin(direction)
    })
  }
  return settleRoots(new ReturnDifferenceNumerator({ ...loop, gain: loop.gain * gain }, samples), re, im) ? { re, im } : null
}
