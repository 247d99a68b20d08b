/** Sample times are one and the same when they differ by no more than rounding of what they were worked out from. */
export function sameSampleTime(a: number, b: number): boolean {
  return Math.abs(a - b) <= 1e-12 * Math.max(a, b)
}
