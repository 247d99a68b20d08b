import type { PreciseRoot } from './rootList'

/** gain prod(s - zero) / prod(s - pole) at s = re + j im, in doubles from differences that lose nothing. */
export function factoredValue(gain: number, zeros: readonly PreciseRoot[], poles: readonly PreciseRoot[], re: number, im: number): { re: number, im: number } {
  let p = gain
  let q = 0
  let exponent = 0
  const count = Math.max(zeros.length, poles.length)
  for (let k = 0; k < count; k++) {
    const zero = zeros[k]
    const pole = poles[k]
    if (zero) {
      const a = (re - zero.re) - zero.reLow
      const b = (im - zero.im) - zero.imLow
      const t = p * a - q * b
      q = p * b + q * a
      p = t
    }
    if (pole) {
      const a = (re - pole.re) - pole.reLow
      const b = (im - pole.im) - pole.imLow
      const square = a * a + b * b
      const t = (p * a + q * b) / square
      q = (q * a - p * b) / square
      p = t
    }
    const size = Math.abs(p) + Math.abs(q)
    if (size > 2 ** 200 || (size < 2 ** -200 && size > 0)) {
      const power = Math.round(Math.log2(size))
      p *= 2 ** -power
      q *= 2 ** -power
      exponent += power
    }
  }
  const unit = 2 ** Math.max(-1070, Math.min(1020, exponent))
  return { re: p * unit, im: q * unit }
}
