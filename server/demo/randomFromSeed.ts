/**
 * Uniform numbers in (0, 1), the same ones for the same seed on every machine: a 32-bit mixing generator (mulberry32, published
 * by T. Ettinger, 2017, in the public domain). Good enough for demo noise, not for secrets.
 */
export function randomFromSeed(seed: number): () => number {
  let state = seed >>> 0
  return () => {
    state = (state + 0x6D2B79F5) >>> 0
    let mixed = Math.imul(state ^ (state >>> 15), state | 1)
    mixed ^= mixed + Math.imul(mixed ^ (mixed >>> 7), mixed | 61)
    return (((mixed ^ (mixed >>> 14)) >>> 0) + 0.5) / 4294967296
  }
}
