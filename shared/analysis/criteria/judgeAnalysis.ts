import type { ClosedLoopVerdict, LoopAnalysis } from '../../types/analysis'
import type { Criterion, CriterionQuantity, CriterionRow, Judgement, Verdict } from '../../types/criterion'
import { hiddenMargin } from './hiddenMargin'
import { leastWithinConfidence } from './leastWithinConfidence'
import { smallestMargins } from './smallestMargins'
import type { SmallestMargin } from './SmallestMargin'
import { worstOf } from './worstOf'

/**
 * How one loop in one condition stands to the criteria: one row for each quantity and direction (gain rising and falling, lag and
 * lead, vector margin, delay), in this order, and the worst of them.
 *
 * - A closed loop that is not stable has no margins: every row is 'unstable' ('not shown' where the verdict is open).
 * - A listed margin under its limit is 'not met', whatever is not known besides.
 * - A margin at or over its limit is 'met' only when no stretch that could not be searched may hide a smaller one, and when it
 *   stays so in the 95 % confidence disc of measured data; otherwise 'not shown'.
 * - No crossing in a direction, all being searched, meets every limit.
 *
 * @param analysis null where there is no source of record or it could not be analysed: 'no data'
 */
export function judgeAnalysis(analysis: LoopAnalysis | null, criteria: readonly Criterion[]): Judgement {
  if (analysis === null) return judgeWithout('no data', criteria)
  const { verdict, reason } = analysis.stability
  if (verdict !== 'stable') return judgeWithout(verdict === 'undetermined' ? 'not shown' : 'unstable', criteria, reason ?? defaultReasons[verdict])
  const rows = smallestMargins(analysis).map(margin => judgeMargin(margin, limitOf(margin.quantity, criteria), analysis))
  return judgementOf(rows)
}

const defaultReasons: Record<Exclude<ClosedLoopVerdict, 'stable'>, string> = {
  unstable: 'The closed loop is not stable: it has no margins.',
  marginal: 'The locus meets -1 to within rounding: the closed loop has no margins.',
  undetermined: 'Whether the closed loop is stable could not be determined.',
}

const directions = [
  ['gainMargin', 'rise'], ['gainMargin', 'fall'], ['phaseMargin', 'lag'], ['phaseMargin', 'lead'], ['vectorMargin', null], ['delayMargin', null],
] as const

function judgeWithout(verdict: Verdict, criteria: readonly Criterion[], reason?: string): Judgement {
  const rows = directions.map(([quantity, direction]): CriterionRow => (
    { quantity, direction, limit: limitOf(quantity, criteria), value: null, driver: null, verdict, ...(reason !== undefined && { reason }) }))
  return { verdict, rows, ...(reason !== undefined && { reason }) }
}

/** The strictest limit set on a quantity, null where there is none. */
function limitOf(quantity: CriterionQuantity, criteria: readonly Criterion[]): number | null {
  const limits = criteria.flatMap(criterion => criterion.quantity === quantity && criterion.limit !== null ? [criterion.limit] : [])
  return limits.length === 0 ? null : Math.max(...limits)
}

function judgeMargin(margin: SmallestMargin, limit: number | null, analysis: LoopAnalysis): CriterionRow {
  const row = { ...margin, limit }
  if (limit === null) return { ...row, verdict: 'met, no limit' }
  if (margin.value !== null && margin.value < limit) return { ...row, verdict: 'not met' }
  const doubt = doubtOf(margin, limit, analysis)
  return doubt === null ? { ...row, verdict: 'met' } : { ...row, verdict: 'not shown', reason: doubt }
}

/** Why a margin that looks met is not shown to be; null where nothing stands against it. */
function doubtOf(margin: SmallestMargin, limit: number, analysis: LoopAnalysis): string | null {
  if (margin.quantity === 'vectorMargin' && margin.value === null) return 'The least distance to -1 is not known.'
  const radiansPerUnit = analysis.frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  const exception = analysis.coverage.exceptions.find(stretch => hiddenMargin(margin, stretch, radiansPerUnit) < limit)
  if (exception !== undefined) return exception.reason
  // Measured data are never proven between their samples: there the exceptions tell where they cannot be trusted.
  if (!analysis.coverage.proven && analysis.coverage.exceptions.length === 0 && analysis.samples === undefined) return 'The lists of crossings are not proven complete.'
  const least = leastWithinConfidence(margin, analysis)
  return least !== null && least < limit ? 'The confidence circle of the measured samples there reaches under the limit.' : null
}

/** A quantity without limit does not lift the whole to 'met, no limit' while another is met. */
function judgementOf(rows: CriterionRow[]): Judgement {
  const verdict = worstOf(rows.map(row => row.verdict))
  const reason = rows.find(row => row.verdict === verdict)?.reason
  return { verdict, rows, ...(reason !== undefined && { reason }) }
}
