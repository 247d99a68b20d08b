import { parseNumberText } from './parseNumberText'

const powers: Record<string, number> = { s: 0, ms: -3, us: -6, µs: -6, μs: -6, ns: -9 }
const typed = /^(.*?)\s*(s|ms|us|µs|μs|ns)?$/i

/** A typed time in seconds, with its unit or without: '0.02', '20 ms', '20us'. Null for a blank text, NaN for one that is no time. */
export function parseTimeText(text: string): number | null {
  const [, number = '', unit = 's'] = typed.exec(text.trim()) ?? []
  const value = parseNumberText(number)
  const power = powers[unit.toLowerCase()] ?? 0
  if (value === null || Number.isNaN(value) || power === 0) return value === null && text.trim() !== '' ? Number.NaN : value
  // As a decimal, so that 20 us is the double nearest to 0.00002.
  const [mantissa, exponent = '0'] = number.trim().replace(/^[−–]/, '-').toLowerCase().split('e')
  return Number(`${mantissa}e${Number(exponent) + power}`)
}
