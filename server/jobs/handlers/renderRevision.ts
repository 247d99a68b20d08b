import { loopGains } from '../../reports/figures/loopGains'
import { AppError } from '#shared/errors/AppError'
import type { EditionFacts } from '#shared/types/snapshot'
import { revisionLabel } from '#shared/workflow/revisionLabel'
import type { PdfPrinter } from '../../adapters/chromium/PdfPrinter'
import type { JobRow } from '../../database/models/JobRow'
import { PersonRow } from '../../database/models/PersonRow'
import { RevisionRow } from '../../database/models/RevisionRow'
import type { HtmlRenderer } from '../../reports/createHtmlRenderer'
import { produceReport } from '../../reports/produceReport'
import { completeIssue } from '../../services/revisions/completeIssue'
import { readSnapshotText } from '../../services/revisions/readSnapshot'
import { storeArtefacts } from '../../services/revisions/storeArtefacts'
import type { JobHandler } from '../JobHandler'

export interface RenderTools {
  renderHtml: () => Promise<HtmlRenderer>
  printer: PdfPrinter
}

/** What the edition prints beside the snapshot. The date of issue is when the approver asked for it, so that rendering again gives the same bytes. */
function editionFacts(revision: RevisionRow, job: JobRow, approver: PersonRow): EditionFacts {
  const isIssued = job.edition === 'issued'
  return {
    edition: job.edition,
    label: isIssued ? revision.letter : revisionLabel(revision),
    preparedBy: revision.frozenByName,
    preparedAt: revision.frozenAt,
    approvedBy: isIssued ? approver.name : null,
    issuedAt: isIssued ? job.createdAt : null,
    snapshotSha256: revision.snapshotSha256,
  }
}

/** Renders one edition of a frozen revision and returns what stores its artefacts; of an issued edition, also what makes the revision valid. */
export const createRenderRevision = ({ renderHtml, printer }: RenderTools): JobHandler => async ({ job, signal, progress }) => {
  const [revision, requester] = await Promise.all([RevisionRow.findByPk(job.revisionId), PersonRow.findByPk(job.requestedBy)])
  if (revision === null || requester === null) throw new AppError('unexpected', 'A job names a revision or a person that is not there.')
  const edition = editionFacts(revision, job, requester)
  const artefacts = await produceReport(await readSnapshotText(revision.id), edition, { renderHtml: await renderHtml(), printer, ...loopGains, progress, signal })
  return async () => {
    await storeArtefacts(revision.id, job.edition, artefacts)
    if (job.edition === 'issued') await completeIssue(revision.id, requester, job.createdAt)
  }
}
