import type { RevisionComparison } from '#shared/types/comparison'
import type { ArtefactKind, Edition, Job, Revision } from '#shared/types/report'
import { callApi } from './apiClient'

export interface RevisionDetail {
  revision: Revision
  report: { id: number, title: string, documentNumber: string, systemId: number }
  systemName: string
}

const at = (revisionId: number) => `/api/revisions/${revisionId}`

/** Routes of revisions. */
export const revisionsClient = {
  read: (revisionId: number) => callApi<RevisionDetail>('GET', at(revisionId)),
  render: (revisionId: number) => callApi<Job>('POST', `${at(revisionId)}/render`),
  issue: (revisionId: number) => callApi<Revision>('POST', `${at(revisionId)}/issue`, { body: {} }),
  compare: (revisionId: number, otherId: number) => callApi<RevisionComparison>('GET', `${at(revisionId)}/comparison/${otherId}`),
  artefactPath: (revisionId: number, kind: ArtefactKind, edition: Edition, disposition: 'inline' | 'attachment') =>
    `${at(revisionId)}/artefacts/${kind}?edition=${edition}&disposition=${disposition}`,
}
