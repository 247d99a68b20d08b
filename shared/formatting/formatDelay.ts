import { significantDigits } from './significantDigits'

const scales = [[1, 's'], [1e-3, 'ms'], [1e-6, 'us'], [1e-9, 'ns']] as const

/** A delay given in seconds with the unit that suits it: '1.25 s', '32.0 ms', '480 us'; '0 s' for none. */
export function formatDelay(seconds: number): string {
  if (seconds === 0 || !Number.isFinite(seconds)) return `${significantDigits(seconds)} s`
  // A value that rounds up to 1000 of a unit is told in the next: 0.9999 ms is 1.00 ms, not 1000 us.
  const size = Math.abs(Number(seconds.toPrecision(3)))
  const [scale, unit] = scales.find(([scale]) => size >= scale) ?? scales[scales.length - 1]!
  return `${significantDigits(seconds / scale, 3)} ${unit}`
}
