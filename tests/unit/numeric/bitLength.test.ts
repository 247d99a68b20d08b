import { describe, expect, it } from 'vitest'
import { bitLength } from '#shared/numeric/extended/bitLength'

describe('the bits of a whole number', () => {
  it('are none for zero, and the same for either sign', () => {
    expect([0n, 1n, -1n, 2n, 3n, -4n].map(bitLength)).toEqual([0, 1, 1, 2, 2, 3])
  })

  it('are exact about every power of two, also where doubles round up to it or overflow', () => {
    for (const power of [1, 52, 53, 54, 63, 64, 65, 127, 899, 900, 901, 999, 1000, 1001, 1023, 1024, 1025, 1900, 5000, 40_000]) {
      const two = 1n << BigInt(power)
      expect([two - 1n, two, two + 1n, -(two - 1n)].map(bitLength)).toEqual([power, power + 1, power + 1, power])
    }
  })

  it('are those of the number written in binary', () => {
    let value = 1n
    for (let k = 0; k < 300; k++) {
      value = value * 6364136223846793005n + BigInt(k)
      expect(bitLength(value)).toBe(value.toString(2).length)
    }
  })
})
