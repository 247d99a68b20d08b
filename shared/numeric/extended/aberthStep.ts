/**
 * The Aberth correction of root k (O. Aberth, 1973): `step` takes N / (1 - N sum_j 1/(r_k - r_j)) with the Newton step N = P/P', in units of the
 * root's own size (multiplied by `scaling`), and its length before it is limited is returned. `at` holds [Re P, Im P, Re P', Im P'] there, scaled alike; P must not be 0.
 */
export function aberthStep(re: Float64Array, im: Float64Array, k: number, scaling: number, at: Float64Array, step: Float64Array): number {
  const x = re[k]!
  const y = im[k]!
  const pr = at[0]!
  const pi = at[1]!
  const dr = at[2]!
  const di = at[3]!
  const size = pr * pr + pi * pi
  // 1 / (P'/P - sum), which needs no Newton step of its own
  let ur = (dr * pr + di * pi) / size
  let ui = (di * pr - dr * pi) / size
  for (let j = 0; j < re.length; j++) {
    if (j === k) continue
    const p = (x - re[j]!) * scaling
    const q = (y - im[j]!) * scaling
    const square = p * p + q * q
    if (square === 0) continue
    ur -= p / square
    ui += q / square
  }
  const square = ur * ur + ui * ui
  step[0] = ur / square
  step[1] = -ui / square
  const length = Math.sqrt(step[0] * step[0] + step[1] * step[1])
  if (!(length < 4)) {
    // Steps far beyond the root's own size only throw it out of its place.
    const limit = length < Infinity ? 4 / length : 0
    step[0] *= limit
    step[1] *= limit
  }
  return length
}
