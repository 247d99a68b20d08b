import type { ReportSnapshot } from '#shared/types/snapshot'
import { readSnapshot } from './readSnapshot'

type Pair = Pick<ReportSnapshot['cells'][number], 'loopCode' | 'conditionCode'>

/** Revisions whose answer is kept: a snapshot never changes, and reading one takes longer than all else of a list. */
const keptRevisions = 200
const kept = new Map<number, Pair[]>()

/** Pairs of a model source that are not proven or have no analysis. Measured ones, by a measured block too, carry their gaps instead, and a pair without a source says 'no data'. */
export const unprovenOf = ({ cells }: ReportSnapshot): Pair[] => cells
  .filter(({ source, analysis }) => source !== null && source.kind !== 'measured' && analysis?.samples === undefined && analysis?.coverage.proven !== true)
  .map(({ loopCode, conditionCode }) => ({ loopCode, conditionCode }))

export async function unprovenCells(revisionId: number): Promise<Pair[]> {
  const known = kept.get(revisionId)
  if (known) return known
  const found = unprovenOf(await readSnapshot(revisionId))
  const oldest = kept.keys().next()
  if (kept.size >= keptRevisions && !oldest.done) kept.delete(oldest.value)
  kept.set(revisionId, found)
  return found
}
