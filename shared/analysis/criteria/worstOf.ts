import type { Verdict } from '../../types/criterion'
import { verdictOrder } from './verdictOrder'

/** The worst of some verdicts; 'no data' of none, for then nothing was shown. */
export function worstOf(verdicts: Iterable<Verdict>): Verdict {
  let worst = verdictOrder.length
  for (const verdict of verdicts) worst = Math.min(worst, verdictOrder.indexOf(verdict))
  return verdictOrder[worst] ?? 'no data'
}
