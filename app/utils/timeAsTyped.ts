const units = [[1, 's'], [1e-3, 'ms'], [1e-6, 'us'], [1e-9, 'ns']] as const

/** A time that somebody typed, in the unit that suits it and with all its digits: '20 us', '1.25 ms', '0 s'. */
export function timeAsTyped(seconds: number): string {
  const size = Math.abs(seconds)
  const [scale, unit] = size === 0 ? units[0] : units.find(([scale]) => size >= scale * 0.9999999) ?? units[units.length - 1]!
  return `${Number((seconds / scale).toPrecision(12))} ${unit}`
}
