import type { EditionFacts, ReportSnapshot } from '#shared/types/snapshot'
import { canonicalJson } from '#server/reports/canonicalJson'
import { sha256Of } from '#server/reports/sha256Of'

/** The draft edition of a snapshot. `change` replaces fields. */
export const buildEdition = (snapshot: ReportSnapshot, change: Partial<EditionFacts> = {}): EditionFacts => ({
  edition: 'draft',
  label: `${snapshot.letter} draft ${snapshot.draftNumber}`,
  preparedBy: snapshot.frozenBy,
  preparedAt: snapshot.frozenAt,
  approvedBy: null,
  issuedAt: null,
  snapshotSha256: sha256Of(canonicalJson(snapshot)),
  ...change,
})
