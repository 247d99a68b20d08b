import { AppError } from '#shared/errors/AppError'
import type { LoopGain } from '#shared/analysis/LoopGain'
import type { LoopInput } from '#shared/types/analysis'
import type { ArtefactKind } from '#shared/types/report'
import type { EditionFacts } from '#shared/types/snapshot'
import type { PdfPrinter } from '../adapters/chromium/PdfPrinter'
import { buildReportView } from './buildReportView'
import type { HtmlRenderer } from './createHtmlRenderer'
import { drawReportFigures } from './figures/drawReportFigures'
import { packageReport } from './packageReport'
import { fileNameOf } from './package/fileNameOf'
import { sha256Of } from './sha256Of'
import { parseSnapshot } from './snapshotText'

export interface ProducedArtefact {
  kind: ArtefactKind
  fileName: string
  mediaType: string
  bytes: Buffer
}

export interface ProduceTools {
  renderHtml: HtmlRenderer
  printer: PdfPrinter
  prepareGain: (input: LoopInput) => LoopGain
  approximateGain: (input: LoopInput) => LoopGain | null
  progress: (step: string, done: number, total: number) => Promise<void>
  signal?: AbortSignal
}

/** Steps after the loops are drawn: laying out, printing, packing. */
const laterSteps = 3

const mediaTypes: Record<ArtefactKind, string> = { html: 'text/html; charset=utf-8', pdf: 'application/pdf', zip: 'application/zip' }

/**
 * Makes the artefacts of one edition from its frozen snapshot: figures, HTML, PDF, ZIP. Touches no database and holds no transaction.
 * The text must be the very snapshot that was frozen: throws an AppError where its SHA-256 is another than the edition's.
 */
export async function produceReport(snapshotText: string, edition: EditionFacts, tools: ProduceTools): Promise<ProducedArtefact[]> {
  if (sha256Of(snapshotText) !== edition.snapshotSha256) throw new AppError('unexpected', 'The stored snapshot is not the one that was frozen: its SHA-256 differs.')
  const snapshot = parseSnapshot(snapshotText)
  const { renderHtml, printer, prepareGain, approximateGain, progress, signal } = tools
  const total = snapshot.loops.length + laterSteps
  const drawn = await drawReportFigures(snapshot, { prepareGain, approximateGain, progress: (step, done) => progress(step, done, total), signal })

  await progress('Laying out the document', snapshot.loops.length, total)
  const view = buildReportView(snapshot, edition, drawn)
  const html = await renderHtml(view)
  signal?.throwIfAborted()

  await progress('Printing the PDF', snapshot.loops.length + 1, total)
  const time = new Date(edition.issuedAt ?? edition.preparedAt)
  const pdf = await printer.print({ html, title: view.documentTitle, time, signal })

  await progress('Packing the ZIP', snapshot.loops.length + 2, total)
  const zip = await packageReport(snapshot, snapshotText, drawn, html, pdf)
  signal?.throwIfAborted()

  const stem = `${fileNameOf(snapshot.report.documentNumber)}-${fileNameOf(edition.label)}`
  const artefact = (kind: ArtefactKind, bytes: Buffer): ProducedArtefact => ({ kind, fileName: `${stem}.${kind}`, mediaType: mediaTypes[kind], bytes })
  return [artefact('html', Buffer.from(html)), artefact('pdf', pdf), artefact('zip', zip)]
}
