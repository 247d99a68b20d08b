import type { LoopGain } from '#shared/analysis/LoopGain'
import type { ClosedLoopVerdict, FrequencyUnit, LoopAnalysis } from '#shared/types/analysis'

/**
 * A LoopAnalysis for figures, by a fine scan and bisection. It proves nothing and is no reference for numbers:
 * the figures only need lists that belong to their curve. The verdict is the caller's.
 */
export function analysisByScan(gain: LoopGain, from: number, to: number, verdict: ClosedLoopVerdict = 'stable', frequencyUnit: FrequencyUnit = 'rad/s'): LoopAnalysis {
  const out = new Float64Array(2)
  const unit = frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  const at = (w: number) => {
    gain.evaluate(w, out)
    const [re, im] = [out[0]!, out[1]!]
    return { re, im, size: Math.hypot(re, im), distance: Math.hypot(1 + re, im), angle: Math.atan2(im, re) * 180 / Math.PI }
  }
  const bisect = (a: number, b: number, sign: (w: number) => number) => {
    const start = sign(a)
    for (let i = 0; i < 100; i++) {
      const m = Math.sqrt(a * b)
      if (sign(m) * start > 0) a = m
      else b = m
    }
    return Math.sqrt(a * b)
  }
  const grid = new Set<number>()
  const steps = 6_000
  for (let i = 0; i <= steps; i++) grid.add(from * (to / from) ** (i / steps))
  for (const { frequency, width } of gain.features) for (let k = -40; k <= 40; k++) grid.add(frequency + k * width / 4)
  const ws = [...grid].filter(w => w >= from && w <= to).sort((a, b) => a - b)

  const analysis: LoopAnalysis = {
    frequencyUnit,
    gainCrossovers: [],
    phaseCrossovers: [],
    closestApproaches: [],
    vectorMargin: null,
    summary: null,
    stability: { verdict, basis: 'counted', openLoopUnstablePoles: 0, encirclements: null, closedLoopUnstablePoles: verdict === 'unstable' ? 2 : 0 },
    coverage: { proven: true, from: 0, to: 'infinity', exceptions: [] },
  }
  const slope = (w: number) => at(w * 1.0001).distance - at(w / 1.0001).distance
  let least = { distance: Infinity, frequency: 0 }
  const values = ws.map(at)
  for (let i = 1; i < ws.length; i++) {
    const [a, b] = [ws[i - 1]!, ws[i]!]
    const [va, vb] = [values[i - 1]!, values[i]!]
    if ((va.size - 1) * (vb.size - 1) < 0) {
      const w = bisect(a, b, x => at(x).size - 1)
      const v = at(w)
      const margin = 180 + v.angle > 180 ? v.angle - 180 : v.angle + 180
      analysis.gainCrossovers.push({ frequency: w / unit, phaseMargin: margin, delayMargin: ((margin + 360) % 360) * Math.PI / 180 / w, slope: va.size > vb.size ? 'falling' : 'rising', distance: v.distance })
    }
    if (va.im * vb.im < 0 && va.re < 0 && vb.re < 0) {
      const w = bisect(a, b, x => at(x).im)
      const v = at(w)
      if (v.size > 1e-3) analysis.phaseCrossovers.push({ frequency: w / unit, gainMargin: -20 * Math.log10(v.size), slope: va.im < 0 ? 'falling' : 'rising', distance: v.distance })
    }
    const [before, after] = [values[i - 2], values[i + 1]]
    const mayTurn = before && after && (va.distance <= before.distance || vb.distance <= after.distance)
    if (mayTurn && slope(a) < 0 && slope(b) > 0) {
      const w = bisect(a, b, slope)
      const v = at(w)
      if (v.size > 1e-3) {
        analysis.closestApproaches.push({ frequency: w / unit, distance: v.distance, gainChange: -20 * Math.log10(v.size), phaseChange: v.angle > 0 ? 180 - v.angle : -180 - v.angle })
        if (v.distance < least.distance) least = { distance: v.distance, frequency: w / unit }
      }
    }
  }
  if (Number.isFinite(least.distance)) analysis.vectorMargin = least
  return analysis
}
