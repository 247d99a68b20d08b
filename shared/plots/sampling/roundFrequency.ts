/** The next of 1, 2, 5 times a power of ten at or under the value. */
export function roundDown(value: number): number {
  const exponent = Math.floor(Math.log10(value) + 1e-9)
  const digit = [5, 2, 1].find(candidate => Number(`${candidate}e${exponent}`) <= value * (1 + 1e-9)) ?? 1
  return Number(`${digit}e${exponent}`)
}

/** The next of 1, 2, 5 times a power of ten at or above the value. */
export function roundUp(value: number): number {
  const exponent = Math.floor(Math.log10(value) + 1e-9)
  const digit = [1, 2, 5, 10].find(candidate => Number(`${candidate}e${exponent}`) >= value * (1 - 1e-9)) ?? 10
  return Number(`${digit}e${exponent}`)
}
