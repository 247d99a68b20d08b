/** Multiples of the smallest of `steps` that gives at most `most` of them in [from, to], or of a doubled largest. */
export function linearTicks(from: number, to: number, most: number, steps: readonly number[]): number[] {
  let step = steps.find(candidate => (to - from) / candidate < most + 1e-9)
  if (step === undefined) {
    step = steps[steps.length - 1]!
    while ((to - from) / step >= most) step *= 2
  }
  const ticks: number[] = []
  for (let i = Math.ceil(from / step - 1e-9); i * step <= to + step * 1e-9; i++) ticks.push(Number((i * step).toPrecision(12)) + 0)
  return ticks
}
