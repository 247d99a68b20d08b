const view = new DataView(new ArrayBuffer(8))

/**
 * Splits a finite double into an integer mantissa of at most 53 bits and a power of two: value = mantissa * 2^exponent, exactly.
 * The mantissa of a normal number has exactly 53 bits; zero gives { mantissa: 0, exponent: 0 }.
 */
export function splitDouble(value: number): { mantissa: number, exponent: number } {
  if (value === 0) return { mantissa: 0, exponent: 0 }
  view.setFloat64(0, value)
  const high = view.getUint32(0)
  const biased = (high >>> 20) & 0x7FF
  const fraction = (high & 0xFFFFF) * 2 ** 32 + view.getUint32(4)
  const magnitude = biased === 0 ? fraction : fraction + 2 ** 52
  return { mantissa: value < 0 ? -magnitude : magnitude, exponent: (biased === 0 ? 1 : biased) - 1075 }
}
