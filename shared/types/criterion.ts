export type CriterionQuantity = 'gainMargin' | 'phaseMargin' | 'vectorMargin' | 'delayMargin'

/** One limit on one quantity. Gain margin in dB, phase margin in deg, vector margin a ratio, delay margin in s; null: no limit. */
export interface Criterion {
  quantity: CriterionQuantity
  limit: number | null
}

/** How a loop in a condition stands to the criteria, worst first in this order. */
export type Verdict
  = | 'unstable'
    | 'not met'
    | 'not shown'
    | 'no data'
    | 'not met, accepted by deviation'
    | 'met'
    | 'met, no limit'
    | 'not applicable'

/** The crossing or approach that sets a smallest margin; `index` counts in the analysis' list of that kind, null at an end of the axis. */
export interface Driver {
  kind: 'gainCrossover' | 'phaseCrossover' | 'closestApproach' | 'end'
  index: number | null
  frequency: number | 'infinity'
}

export interface CriterionRow {
  quantity: CriterionQuantity
  /** which way: the gain rising or falling, lag or lead; null where there is no direction */
  direction: 'rise' | 'fall' | 'lag' | 'lead' | null
  limit: number | null
  /** the smallest value, positive; null where there is none (no crossing that way) */
  value: number | null
  driver: Driver | null
  verdict: Verdict
  reason?: string
}

export interface Judgement {
  verdict: Verdict
  rows: CriterionRow[]
  reason?: string
}
