import type { Verdict } from '../../types/criterion'

/** Every verdict, worst first. */
export const verdictOrder: readonly Verdict[] = [
  'unstable', 'not met', 'not shown', 'no data', 'not met, accepted by deviation', 'met', 'met, no limit', 'not applicable',
]
