import { describe, expect, it } from 'vitest'
import { integerGcd } from '#shared/numeric/extended/integerGcd'
import { Rational } from '#shared/numeric/extended/Rational'

describe('integerGcd', () => {
  it.each([
    [0n, 0n, 0n], [0n, -6n, 6n], [6n, 0n, 6n], [1n, 7n, 1n], [-12n, 18n, 6n], [48n, 64n, 16n], [2n ** 90n * 3n, 2n ** 40n * 9n, 2n ** 40n * 3n], [35n, 64n, 1n],
  ])('of %d and %d is %d (closed form)', (a, b, divisor) => {
    expect(integerGcd(a, b)).toBe(divisor)
    expect(integerGcd(b, a)).toBe(divisor)
  })
})

describe('Rational', () => {
  it('holds a double exactly and gives it back', () => {
    for (const value of [0, 1, -0.1, 1e-300, 5e-324, 1.7976931348623157e308, Math.PI]) expect(Rational.fromDouble(value).toNumber()).toBe(value)
  })

  it('refuses division by zero', () => {
    expect(() => Rational.one.over(Rational.zero)).toThrow('division by zero')
    expect(() => Rational.zero.toPower(-1)).toThrow('division by zero')
  })

  it('keeps fractions that doubles cannot: 1/3 + 1/6 is 1/2', () => {
    const sum = Rational.of(1n, 3n).plus(Rational.of(1n, 6n))
    expect([sum.numerator, sum.denominator]).toEqual([1n, 2n])
  })
})
