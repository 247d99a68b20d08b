import type { Stability } from '#shared/types/analysis'

const verdicts: Record<Stability['verdict'], string> = {
  stable: 'closed loop stable',
  unstable: 'unstable',
  marginal: 'closed loop on the stability boundary',
  undetermined: 'closed loop not determined',
}

/** The verdict on the closed loop in words. */
export const closedLoopInWords = ({ verdict }: Pick<Stability, 'verdict'>): string => verdicts[verdict]
