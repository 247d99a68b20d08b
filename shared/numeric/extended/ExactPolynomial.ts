/**
 * A real polynomial held exactly: sum over k of coefficients[k] * 2^exponent * x^k, lowest power first, the last coefficient not zero.
 * Every finite double is such a dyadic number, so coefficients given as doubles enter without any rounding.
 */
export interface ExactPolynomial {
  coefficients: bigint[]
  exponent: number
}
