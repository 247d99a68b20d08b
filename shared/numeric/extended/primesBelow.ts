/** The primes below a limit (at most 2^26), largest first, one after the other. */
export function* primesBelow(limit: number): Generator<number> {
  for (let candidate = limit - 1 - (limit % 2); candidate > 3; candidate -= 2) {
    let divisor = 3
    while (divisor * divisor <= candidate && candidate % divisor !== 0) divisor += 2
    if (divisor * divisor > candidate) yield candidate
  }
}
