import type { EditionFacts, ReportSnapshot } from '#shared/types/snapshot'
import type { PdfPrinter } from '#server/adapters/chromium/PdfPrinter'
import { canonicalJson } from '#server/reports/canonicalJson'
import { createHtmlRenderer } from '#server/reports/createHtmlRenderer'
import { produceReport } from '#server/reports/produceReport'
import type { ProducedArtefact } from '#server/reports/produceReport'
import { readAssetsFromFolder } from '#server/reports/readAssetsFromFolder'
import { buildEdition } from './buildEdition'
import { buildLoopGain } from './buildLoopGain'

/** The three artefacts of a snapshot, with the project's own templates and fonts. */
export async function printSnapshot(snapshot: ReportSnapshot, printer: PdfPrinter, change: Partial<EditionFacts> = {}): Promise<Record<ProducedArtefact['kind'], ProducedArtefact>> {
  const renderHtml = await createHtmlRenderer(readAssetsFromFolder(process.cwd()))
  const artefacts = await produceReport(canonicalJson(snapshot), buildEdition(snapshot, change), { renderHtml, printer, prepareGain: buildLoopGain, approximateGain: () => null, progress: async () => undefined })
  const of = (kind: ProducedArtefact['kind']) => {
    const found = artefacts.find(artefact => artefact.kind === kind)
    if (!found) throw new Error(`no ${kind} was produced`)
    return found
  }
  return { html: of('html'), pdf: of('pdf'), zip: of('zip') }
}
