import type { MeasuredQuantity } from '../../types/analysis'

/**
 * The loop gain from a measured quantity Q (negative feedback): 1 + L = Q of a return difference, 1/Q of a sensitivity,
 * 1/(1 - Q) of a complementary sensitivity. Not finite where the loop gain is not.
 */
export function loopGainOf(quantity: MeasuredQuantity, re: number, im: number): { re: number, im: number } {
  switch (quantity) {
    case 'loopGain': return { re, im }
    case 'returnDifference': return { re: re - 1, im }
    // (1 - S) / S and T / (1 - T) rather than differences of large numbers: where L is small its digits are kept.
    case 'sensitivity': return divide(1 - re, -im, re, im)
    case 'complementarySensitivity': return divide(re, im, 1 - re, -im)
  }
}

function divide(a: number, b: number, c: number, d: number): { re: number, im: number } {
  const scale = Math.max(Math.abs(c), Math.abs(d))
  const [p, q] = [c / scale, d / scale]
  const size = (p * p + q * q) * scale
  return { re: (a * p + b * q) / size, im: (b * p - a * q) / size }
}
