import { bitLength } from './bitLength'

/**
 * Greatest common divisor of two integers, not negative. Powers of two are taken out first: what comes of doubles has little else in
 * its denominators, and is then done.
 */
export function integerGcd(a: bigint, b: bigint): bigint {
  let x = a < 0n ? -a : a
  let y = b < 0n ? -b : b
  if (x === 0n) return y
  if (y === 0n) return x
  const twosX = bitLength(x & -x) - 1
  const twosY = bitLength(y & -y) - 1
  x >>= BigInt(twosX)
  y >>= BigInt(twosY)
  const twos = BigInt(Math.min(twosX, twosY))
  while (y !== 0n && x !== 1n) {
    if (y === 1n) {
      x = 1n
      break
    }
    [x, y] = [y, x % y]
  }
  return x << twos
}
