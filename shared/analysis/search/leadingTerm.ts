/** How far a series is ruled by its first term that is not zero for all one can tell. */
export interface LeadingTerm {
  /** The series has one sign on flatTo < y <= 1. */
  holds: boolean
  /** Up to here lower terms, which are zero to within rounding, could still turn the sign; 0 where the very first term leads. */
  flatTo: number
  /** Sign of the leading term; 0 where all terms are within rounding. */
  sign: number
}

/**
 * Whether sum_{n = first, first + step, ...} term(n) y^(n - first) keeps one sign on 0 < y <= 1: its leading term outweighs the others, the tail
 * and the rounding `noise` (a bound of the sum of the errors of all terms).
 */
export function leadingTerm(term: (n: number) => number, first: number, step: number, last: number, noise: number, tail: number): LeadingTerm {
  let lead = first
  let lower = 0
  while (lead <= last && Math.abs(term(lead)) <= noise) {
    lower += Math.abs(term(lead))
    lead += step
  }
  if (lead > last) return { holds: false, flatTo: 1, sign: 0 }
  let rest = tail + noise
  for (let n = lead + step; n <= last; n += step) rest += Math.abs(term(n))
  const excess = Math.abs(term(lead)) - rest
  const sign = Math.sign(term(lead))
  if (!(excess > 0)) return { holds: false, flatTo: 1, sign }
  if (lead === first) return { holds: true, flatTo: 0, sign }
  const flatTo = (2 * (lower + noise) / excess) ** (1 / (lead - first))
  return { holds: flatTo < 0.5, flatTo, sign }
}
