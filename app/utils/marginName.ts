import type { CriterionRow } from '#shared/types/criterion'

const names: Record<string, string> = {
  'gainMargin rise': 'gain may rise',
  'gainMargin fall': 'gain may fall',
  'phaseMargin lag': 'phase may lag',
  'phaseMargin lead': 'phase may lead',
  'vectorMargin': 'vector margin',
  'delayMargin': 'delay may grow',
}

/** What a smallest margin is called with its direction: 'gain may rise', 'phase may lag'. */
export const marginName = ({ quantity, direction }: Pick<CriterionRow, 'quantity' | 'direction'>): string =>
  names[direction === null ? quantity : `${quantity} ${direction}`] ?? quantity
