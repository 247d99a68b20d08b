import { loopGains } from '../../reports/figures/loopGains'
import { nextDraft } from '#shared/workflow/nextDraft'
import { RevisionRow } from '../../database/models/RevisionRow'
import { buildReportView } from '../../reports/buildReportView'
import { writeSnapshot } from '../../reports/snapshotText'
import { collectSnapshot } from '../../reports/collectSnapshot'
import type { HtmlRenderer } from '../../reports/createHtmlRenderer'
import { drawReportFigures } from '../../reports/figures/drawReportFigures'
import { sha256Of } from '../../reports/sha256Of'
import type { ServiceContext } from '../context'
import { findReport } from './findReport'

/** The document as it would be frozen at this moment, marked a preview; nothing is stored. */
export async function previewReport(reportId: number, renderHtml: HtmlRenderer, context: ServiceContext): Promise<string> {
  const report = await findReport(reportId)
  const draft = nextDraft(await RevisionRow.findAll({ where: { reportId } }))
  const snapshot = await collectSnapshot(report, { ...draft, changeNote: 'Not frozen yet' }, context, { isPreview: true })
  const drawn = await drawReportFigures(snapshot, { ...loopGains, progress: async () => undefined })
  return renderHtml(buildReportView(snapshot, {
    edition: 'preview', label: 'Preview', preparedBy: context.actor.name, preparedAt: snapshot.frozenAt, approvedBy: null, issuedAt: null, snapshotSha256: sha256Of(writeSnapshot(snapshot)),
  }, drawn))
}
