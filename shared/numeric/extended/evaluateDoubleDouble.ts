import type { ShiftedCoefficients } from './ScaledPolynomial'

const SPLITTER = 134217729 // 2^27 + 1

/**
 * Horner's rule in double-double arithmetic at a complex point re + j im (doubles): writes [Re P, Im P] to `out`.
 *
 * Exact products and sums after T. J. Dekker, 'A floating-point technique for extending the available precision',
 * Numerische Mathematik 18 (1971). With u = 2^-53 each complex step errs by at most 32 u^2 = 2^-101 of the magnitudes
 * that enter it (small parts, each below u of its product or sum, are added in plain doubles), hence the whole by
 * (degree + 1) 2^-100 sum |c_k| |x|^k.
 */
export function evaluateDoubleDouble(coefficients: ShiftedCoefficients, re: number, im: number, out: Float64Array): void {
  const { high, low } = coefficients
  const n = high.length - 1
  let t = SPLITTER * re
  const reTop = t - (t - re)
  const reEnd = re - reTop
  t = SPLITTER * im
  const imTop = t - (t - im)
  const imEnd = im - imTop
  let ah = high[n] as number
  let al = low[n] as number
  let bh = 0
  let bl = 0
  for (let k = n - 1; k >= 0; k--) {
    t = SPLITTER * ah
    const aTop = t - (t - ah)
    const aEnd = ah - aTop
    t = SPLITTER * bh
    const bTop = t - (t - bh)
    const bEnd = bh - bTop
    // real part: a re - b im + c
    let p = ah * re
    let q = bh * im
    let small = ((aTop * reTop - p) + aTop * reEnd + aEnd * reTop) + aEnd * reEnd
      - (((bTop * imTop - q) + bTop * imEnd + bEnd * imTop) + bEnd * imEnd)
      + (al * re - bl * im)
    let s = p - q
    let v = s - p
    small += (p - (s - v)) - (q + v)
    const c = high[k] as number
    let w = s + c
    v = w - s
    small += (s - (w - v)) + (c - v) + (low[k] as number)
    const nextAh = w + small
    const nextAl = small - (nextAh - w)
    // imaginary part: a im + b re
    p = ah * im
    q = bh * re
    small = ((aTop * imTop - p) + aTop * imEnd + aEnd * imTop) + aEnd * imEnd
      + (((bTop * reTop - q) + bTop * reEnd + bEnd * reTop) + bEnd * reEnd)
      + (al * im + bl * re)
    s = p + q
    v = s - p
    small += (p - (s - v)) + (q - v)
    w = s + small
    bl = small - (w - s)
    bh = w
    ah = nextAh
    al = nextAl
  }
  out[0] = ah + al
  out[1] = bh + bl
}
