/** Milliseconds of one call: the least of several, so that a pause of the machine does not count. */
export function leastMilliseconds(call: () => unknown, repeats: number): number {
  let least = Number.POSITIVE_INFINITY
  for (let i = 0; i < repeats; i += 1) {
    const start = performance.now()
    call()
    least = Math.min(least, performance.now() - start)
  }
  return least
}

/** The value below which the given share of the values lies. */
export function quantile(values: number[], share: number): number {
  const sorted = values.slice().sort((a, b) => a - b)
  return sorted[Math.min(sorted.length - 1, Math.ceil(share * sorted.length) - 1)] ?? Number.NaN
}

/** `median 1.23, 99th percentile 4.56, most 7.89` */
export function spread(values: number[], digits = 3): string {
  const show = (x: number) => Number(x.toPrecision(digits)).toString()
  return `median ${show(quantile(values, 0.5))}, 99th percentile ${show(quantile(values, 0.99))}, most ${show(Math.max(...values))}`
}

export function logSpaced(from: number, to: number, count: number): Float64Array {
  return Float64Array.from({ length: count }, (_, i) => from * (to / from) ** (i / (count - 1)))
}
