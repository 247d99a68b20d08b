/** Product of two coefficient lists in doubles. */
export function expand(a: number[], b: number[]): number[] {
  const product = new Array<number>(a.length + b.length - 1).fill(0)
  a.forEach((x, i) => b.forEach((y, j) => {
    product[i + j] = (product[i + j] as number) + x * y
  }))
  return product
}

/** Numbers in [0, 1) from a seed, the same in every run. */
export function random(seed: number): () => number {
  let state = seed
  return () => {
    state = (state * 1103515245 + 12345) % 2147483648
    return state / 2147483648
  }
}
