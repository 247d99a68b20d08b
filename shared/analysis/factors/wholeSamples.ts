import type { FactoredLoop } from '../FactoredLoop'

const WHOLE_SAMPLES = 1e-9
const MOST_DELAY_SAMPLES = 100

/** Dead time in samples, each a pole at z = 0; 0 without dead time; null where the closed loop has no polynomial. */
export function wholeSamples(loop: FactoredLoop): number | null {
  if (loop.deadTime === 0) return 0
  if (loop.sampleTime === undefined) return null
  const samples = loop.deadTime / loop.sampleTime
  const whole = Math.round(samples)
  return Math.abs(samples - whole) <= WHOLE_SAMPLES * whole && whole <= MOST_DELAY_SAMPLES ? whole : null
}
