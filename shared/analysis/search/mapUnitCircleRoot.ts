import { twoProduct } from '#shared/numeric/real/twoProduct'

/**
 * The image (r - 1)/(r + 1) of a root in z under z = (1 + s)/(1 - s), r not -1:
 *   Re = (|r|^2 - 1)/|1 + r|^2,  Im = 2 Im r/|1 + r|^2.
 * |r|^2 - 1 is summed with exact products, so that the damping of a root near the circle is right to the last bits.
 */
export function mapUnitCircleRoot(re: number, im: number): { re: number, im: number } {
  const [square, squareError] = twoProduct(re, re)
  const [height, heightError] = twoProduct(im, im)
  // Largest terms first: square - 1 and height have opposite signs near the circle.
  const high = Math.max(square, height)
  const low = Math.min(square, height)
  const upper = high - 1
  const sum = upper + low
  const back = sum - upper
  const sumError = (upper - (sum - back)) + (low - back)
  // high - 1 is exact for 1/2 <= high <= 2 (Sterbenz); elsewhere nothing cancels.
  const excess = sum + (sumError + squareError + heightError)
  const scale = (1 + re) * (1 + re) + im * im
  return { re: excess / scale, im: 2 * im / scale }
}
