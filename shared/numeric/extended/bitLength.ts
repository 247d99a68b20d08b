const buffer = new DataView(new ArrayBuffer(8))

/** Below this a whole number has a finite double. */
const FINITE = 1n << 1000n

/** Number of bits of |value|; 0 for zero. */
export function bitLength(value: bigint): number {
  let size = value < 0n ? -value : value
  if (size === 0n) return 0
  let dropped = 0
  for (; size >= FINITE; dropped += 900) size >>= 900n
  buffer.setFloat64(0, Number(size))
  const bits = (buffer.getUint16(0) >> 4) - 1022
  // The double may have been rounded up to a power of two.
  const isRounded = (buffer.getUint32(0) & 0xFFFFF) === 0 && buffer.getUint32(4) === 0
  return dropped + (isRounded && size >> BigInt(bits - 1) === 0n ? bits - 1 : bits)
}
