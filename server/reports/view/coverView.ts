import type { EditionFacts, ReportSnapshot } from '#shared/types/snapshot'
import { formatDate, formatInstant } from './formatDate'
import type { CoverView, TableView } from './ReportView'
import { tableOf } from './tableOf'

export const documentType = 'Stability margin report'

const statusWords: Record<EditionFacts['edition'], string> = {
  preview: 'Preview, not frozen: nothing in it is kept',
  draft: 'Draft, not issued: not to be used as evidence',
  issued: 'Issued',
}

function historyTable(snapshot: ReportSnapshot, edition: EditionFacts): TableView {
  const earlier = snapshot.history.map(entry => ({
    cells: [{ text: entry.letter, isHead: true }, { text: formatDate(entry.issuedAt) }, { text: entry.changeNote }, { text: entry.frozenBy }, { text: entry.issuedBy }],
  }))
  const isIssued = edition.edition === 'issued'
  return tableOf({
    caption: 'Revision history',
    columns: [{ head: 'revision' }, { head: 'date' }, { head: 'change', isWide: true }, { head: 'prepared by' }, { head: 'approved by' }],
    rows: [...earlier, {
      isMarked: true,
      cells: [
        { text: edition.label, isHead: true },
        { text: formatDate(isIssued && edition.issuedAt ? edition.issuedAt : edition.preparedAt) },
        { text: snapshot.changeNote },
        { text: edition.preparedBy },
        { text: edition.approvedBy ?? 'not approved' },
      ],
    }],
    notes: [],
    kind: 'history',
  })
}

/** The cover: title block with the fields of ISO 7200:2004 that this document has, revision history, contents. */
export function coverView(snapshot: ReportSnapshot, edition: EditionFacts, contents: CoverView['contents']): CoverView {
  const { brand, report, system } = snapshot
  const isIssued = edition.edition === 'issued'
  return {
    teamName: brand.teamName,
    addressLine: brand.addressLine,
    mark: brand.mark,
    documentType,
    title: report.title,
    systemName: system.name,
    customer: system.customer,
    label: isIssued ? `Revision ${edition.label}` : edition.label,
    statusWords: statusWords[edition.edition],
    titleBlock: [
      { name: 'Legal owner', value: brand.teamName },
      { name: 'Document number', value: report.documentNumber },
      { name: 'Revision', value: edition.label },
      { name: 'Status', value: statusWords[edition.edition] },
      { name: 'Title', value: report.title, isWide: true },
      { name: 'System', value: [system.name, system.documentNumber].filter(text => text !== '').join(', ') },
      { name: 'Customer', value: system.customer },
      { name: 'Document type', value: documentType },
      { name: 'Language', value: 'en' },
      { name: 'Prepared by', value: `${edition.preparedBy}, ${formatInstant(edition.preparedAt)}` },
      { name: 'Checked by', value: 'no separate check recorded' },
      { name: 'Approved by', value: edition.approvedBy && edition.issuedAt ? `${edition.approvedBy}, ${formatInstant(edition.issuedAt)}` : 'not approved' },
      { name: 'Date of issue', value: edition.issuedAt ? formatDate(edition.issuedAt) : 'not issued' },
      { name: 'Fingerprint of the inputs and results (SHA-256)', value: edition.snapshotSha256, isWide: true, isMono: true },
    ].map(field => ({ isWide: false, isMono: false, ...field })),
    history: historyTable(snapshot, edition),
    contents,
  }
}
