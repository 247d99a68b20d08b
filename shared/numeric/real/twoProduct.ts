const SPLITTER = 2 ** 27 + 1

/**
 * The product of two doubles and its rounding error: a b = product + error exactly, barring over- and underflow.
 * Source: T. J. Dekker, A floating-point technique for extending the available precision, Numer. Math. 18 (1971).
 */
export function twoProduct(a: number, b: number): [product: number, error: number] {
  const product = a * b
  const aBig = SPLITTER * a
  const aHigh = aBig - (aBig - a)
  const aLow = a - aHigh
  const bBig = SPLITTER * b
  const bHigh = bBig - (bBig - b)
  const bLow = b - bHigh
  return [product, ((aHigh * bHigh - product) + aHigh * bLow + aLow * bHigh) + aLow * bLow]
}
