import { angleOnAxis, logGainOnAxis, type AxisFactors } from './axisFactors'

export interface AxisMinimum {
  t: number
  distance: number
  logGain: number
  angle: number
}

/** Relative slack for rounding on the slope of |1 + L|^2: sums of fewer than 100 terms in doubles err by less. */
const SLACK = 1e-13

interface Slopes {
  /** half the first, second derivative of |1 + L|^2 at the centre, and a bound of half the third over the box */
  first: number
  second: number
  thirdBound: number
  rounding: number
}

/** |L| and its derivatives enter divided by max(1, |L|)^2, so that nothing overflows. */
function slopesOver(loop: AxisFactors, c: number, h: number): Slopes {
  // (log L)' = sum weight / (t + j r): first, second and third derivative of log L at the centre, the third bounded over the box
  let l1x = 0
  let l1y = -loop.delay
  let l2x = 0
  let l2y = 0
  let sizes = loop.delay
  let l3 = 0
  for (const { re, im, weight } of loop.factors) {
    const d = c - im
    const r2 = d * d + re * re
    const x = d / r2
    const y = -re / r2
    l1x += weight * x
    l1y += weight * y
    l2x -= weight * (x * x - y * y)
    l2y -= weight * 2 * x * y
    sizes += Math.abs(weight) / Math.sqrt(r2)
    const least = Math.hypot(Math.max(0, Math.abs(d) - h), re)
    l3 += 2 * Math.abs(weight) / least ** 3
  }
  const l2 = Math.hypot(l2x, l2y) + h * l3
  const l1 = Math.hypot(l1x, l1y) + h * Math.hypot(l2x, l2y) + h * h * l3 / 2
  const logGain = logGainOnAxis(loop, c)
  const angle = angleOnAxis(loop, c)
  const a = Math.exp(Math.min(0, logGain))
  const one = Math.exp(-Math.max(0, logGain))
  // everything below is scaled: L -> (a e^j angle), 1 -> one, products of two scaled by 1/max(1, |L|)^2
  const x = a * Math.cos(angle)
  const y = a * Math.sin(angle)
  const ux = x * l1x - y * l1y
  const uy = x * l1y + y * l1x
  const qx = l1x * l1x - l1y * l1y + l2x
  const qy = 2 * l1x * l1y + l2y
  const vx = x * qx - y * qy
  const vy = x * qy + y * qx
  const growth = Math.exp(h * l1)
  const most = a * growth
  const u1 = most * l1
  const u2 = most * (l1 * l1 + l2)
  const u3 = most * (l1 ** 3 + 3 * l1 * l2 + l3)
  return {
    first: (one + x) * ux + y * uy,
    second: ux * ux + uy * uy + (one + x) * vx + y * vy,
    thirdBound: 3 * u1 * u2 + (one + most) * u3,
    rounding: SLACK * (1 + Math.abs(angle)) * (one + a) * a * sizes,
  }
}

/**
 * All local minima of |1 + L(jt)| for `from` < t < `to`, rigorously: boxes on which the slope of |1 + L|^2 is shown to keep clear of zero, or to
 * be monotone with opposite signs at the ends, by Taylor's theorem of second order with a bound of the third derivative. Rounding is covered by
 * a stated slack, not by directed rounding. What stays open goes to `open`. `evenAtZero`: |1 + L| is an even function of t.
 */
export function minimaOnAxis(loop: AxisFactors, from: number, to: number, open: string[], evenAtZero = true): AxisMinimum[] {
  const found: AxisMinimum[] = []
  /** Roots on the axis with L unbounded: [position, order] */
  const poles = new Map<number, number>()
  for (const { re, im, weight } of loop.factors) if (re === 0) poles.set(im, (poles.get(im) ?? 0) - weight)
  for (const [at, order] of poles) if (order <= 0) poles.delete(at)

  /** Half-width about a pole on the axis where |1 + L| is shown to be strictly monotone on each side. */
  const clearance = (at: number, order: number): number => {
    const rest = loop.factors.filter(f => f.re !== 0 || f.im !== at)
    let nearest = at === 0 ? 1e300 : at
    for (const f of rest) nearest = Math.min(nearest, Math.hypot(f.re, at - f.im))
    for (let delta = nearest / 4; ; delta /= 2) {
      const bound = rest.reduce((sum, f) => sum + Math.abs(f.weight) / (Math.hypot(f.re, at - f.im) - delta), loop.delay)
      const edges = at === 0 ? [delta] : [at - delta, at + delta]
      const gain = Math.exp(Math.min(600, ...edges.map(t => logGainOnAxis(loop, t))))
      if (gain > 1 && (order / delta - bound) * (gain - 1) > bound * 1.01) return delta
      if (delta < 1e-12 * nearest) {
        open.push(`no clearance at the pole ${at}`)
        return delta
      }
    }
  }
  const holes = [...poles].filter(([at]) => at >= 0).map(([at, order]) => ({ at, delta: clearance(at, order) })).sort((p, q) => p.at - q.at)

  const signAt = (t: number): number => {
    const { first, rounding } = slopesOver(loop, t, 0)
    return Math.abs(first) > rounding ? Math.sign(first) : 0
  }
  const bisect = (low: number, high: number): number => {
    let a = low
    let b = high
    for (let i = 0; i < 200 && b - a > 2 ** -52 * b; i += 1) {
      const middle = (a + b) / 2
      if (slopesOver(loop, middle, 0).first < 0) a = middle
      else b = middle
    }
    return (a + b) / 2
  }
  const search = (start: number, end: number): void => {
    const stack: [number, number][] = [[start, end]]
    while (stack.length > 0) {
      const [a, b] = stack.pop()!
      const c = (a + b) / 2
      const h = (b - a) / 2 * (1 + 1e-15)
      const { first, second, thirdBound, rounding } = slopesOver(loop, c, h)
      if (Math.abs(first) - rounding > h * Math.abs(second) * 1.000001 + h * h / 2 * thirdBound) continue
      if (Math.abs(second) > h * thirdBound * 1.000001) {
        // the slope is monotone here; at t = 0 it is zero by evenness
        if (a === 0 && evenAtZero) continue
        const low = signAt(a)
        const high = signAt(b)
        if (low === 0 || high === 0) {
          if (h > 1e-13 * c) {
            const cut = a + (b - a) * 0.437
            stack.push([cut, b], [a, cut])
          }
          else open.push(`the slope of |1 + L| is zero to rounding at ${c}`)
          continue
        }
        if (low < 0 && high > 0) {
          const t = bisect(a, b)
          const logGain = logGainOnAxis(loop, t)
          const angle = angleOnAxis(loop, t)
          const gain = Math.exp(logGain)
          // |1 + L|^2 = (1 - |L|)^2 + 4 |L| cos^2(angle / 2): both terms positive
          found.push({ t, logGain, angle, distance: Math.hypot(1 - gain, 2 * Math.sqrt(gain) * Math.cos(angle / 2)) })
        }
        continue
      }
      if (h < 1e-13 * c) {
        open.push(`nothing shown at ${c}`)
        continue
      }
      const cut = a > 0 && b / a > 3 ? Math.sqrt(a * b) : a + (b - a) * 0.513
      stack.push([cut, b], [a, cut])
    }
  }
  let start = from
  for (const { at, delta } of holes) {
    if (at + delta <= from || at - delta >= to) continue
    if (at - delta > start) search(start, at - delta)
    start = Math.max(start, at + delta)
  }
  if (start < to) search(start, to)
  return found.sort((p, q) => p.t - q.t)
}
