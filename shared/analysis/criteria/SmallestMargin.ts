import type { CriterionQuantity, CriterionRow, Driver } from '../../types/criterion'

/** A smallest margin in one direction, with what sets it; `value` null where no crossing limits that direction. */
export interface SmallestMargin {
  quantity: CriterionQuantity
  direction: CriterionRow['direction']
  /** size, never negative: dB, deg, a ratio or s */
  value: number | null
  driver: Driver | null
}
