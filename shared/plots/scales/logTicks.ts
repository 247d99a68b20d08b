export interface LogTick {
  value: number
  /** whether it is told with a number; the others are only drawn */
  major: boolean
}

/**
 * Ticks of a logarithmic axis over [from, to]: as many of 1, 2, 5 per decade as `most` numbers allow, then decades only,
 * then every second, third ... decade.
 */
export function logTicks(from: number, to: number, most: number): LogTick[] {
  const low = Math.floor(Math.log10(from) + 1e-9)
  const high = Math.ceil(Math.log10(to) - 1e-9)
  const inside = (value: number) => value >= from * (1 - 1e-9) && value <= to * (1 + 1e-9)
  const at = (exponent: number, digit: number) => Number(`${digit}e${exponent}`)

  const finest = to / from < 20 ? [[1, 2, 3, 5, 7]] : []
  for (const majors of [...finest, [1, 2, 5], [1, 3], [1]]) {
    const ticks: LogTick[] = []
    for (let exponent = low; exponent <= high; exponent++) {
      for (let digit = 1; digit <= 9; digit++) {
        const value = at(exponent, digit)
        if (inside(value)) ticks.push({ value, major: majors.includes(digit) })
      }
    }
    const count = ticks.filter(tick => tick.major).length
    if (count > most) continue
    if (count >= 2) return count > 6 && majors.length === 1 ? ticks.filter(tick => tick.major) : ticks
    return evenTicks(from, to, most)
  }
  const step = Math.ceil((high - low) / most)
  const ticks: LogTick[] = []
  for (let exponent = low; exponent <= high; exponent++) {
    const value = at(exponent, 1)
    if (inside(value)) ticks.push({ value, major: (exponent - low) % step === 0 })
  }
  return ticks
}

/** An axis shorter than a factor of two or so: even steps of a round number. */
function evenTicks(from: number, to: number, most: number): LogTick[] {
  const rough = (to - from) / Math.max(1, Math.min(most, 6))
  const power = 10 ** Math.floor(Math.log10(rough))
  const step = [1, 2, 5, 10].map(digit => digit * power).find(value => value >= rough * (1 - 1e-9))!
  const ticks: LogTick[] = []
  for (let i = Math.ceil(from / step - 1e-9); i * step <= to * (1 + 1e-9); i++) {
    ticks.push({ value: Number((i * step).toPrecision(12)), major: true })
  }
  return ticks
}
