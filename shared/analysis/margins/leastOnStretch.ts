const GOLDEN = (3 - Math.sqrt(5)) / 2
const STEPS = 60
const NARROW = 1e-9

/** The least value of a function with one minimum on from <= v <= to, by golden section (J. Kiefer, 1953). */
export function leastOnStretch(at: (v: number) => number, from: number, to: number): { value: number, v: number } {
  let a = from
  let b = to
  let c = a + GOLDEN * (b - a)
  let d = b - GOLDEN * (b - a)
  let atC = at(c)
  let atD = at(d)
  for (let i = 0; i < STEPS && b - a > NARROW * b; i++) {
    if (atC < atD) {
      b = d
      d = c
      atD = atC
      c = a + GOLDEN * (b - a)
      atC = at(c)
    }
    else {
      a = c
      c = d
      atC = atD
      d = b - GOLDEN * (b - a)
      atD = at(d)
    }
  }
  return atC < atD ? { value: atC, v: c } : { value: atD, v: d }
}
