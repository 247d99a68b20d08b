import type { SnapshotCell } from '#shared/types/snapshot'
import type { CriterionRow } from '#shared/types/criterion'
import { verdictOrder } from '#shared/analysis/criteria/verdictOrder'

/** Least share of its limit that any margin keeps; infinite where nothing is limited. */
function leastShare(rows: readonly CriterionRow[]): number {
  const shares = rows.flatMap(({ value, limit }) => (value === null || limit === null || limit === 0 ? [] : [value / limit]))
  return Math.min(Infinity, ...shares)
}

/** Order of two loop-condition pairs, the worse first: by verdict, then by the margin that keeps least of its limit, then by the vector margin. */
export function compareStanding(a: SnapshotCell, b: SnapshotCell): number {
  const byVerdict = verdictOrder.indexOf(a.judgement.verdict) - verdictOrder.indexOf(b.judgement.verdict)
  if (byVerdict !== 0) return byVerdict
  const shareA = leastShare(a.judgement.rows)
  const shareB = leastShare(b.judgement.rows)
  if (shareA !== shareB) return shareA < shareB ? -1 : 1
  return (a.analysis?.vectorMargin?.distance ?? Infinity) < (b.analysis?.vectorMargin?.distance ?? Infinity) ? -1 : 0
}
