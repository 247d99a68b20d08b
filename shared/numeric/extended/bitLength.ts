/** Number of bits of |value|; 0 for zero. */
export function bitLength(value: bigint): number {
  const digits = (value < 0n ? -value : value).toString(16)
  if (digits === '0') return 0
  return digits.length * 4 - (Math.clz32(Number.parseInt(digits[0] as string, 16)) - 28)
}
