import type { ReportSnapshot } from '#shared/types/snapshot'
import type { DrawnReport } from './figures/DrawnReport'
import { tablesOf } from './package/tablesOf'
import { zipOf } from './package/zipOf'

/**
 * The package of one edition: the document as HTML and PDF, the tables and the frequency responses as CSV, the figures as SVG,
 * the frozen snapshot, and SHA256SUMS. Equal contents give equal bytes.
 */
export const packageReport = (snapshot: ReportSnapshot, snapshotText: string, drawn: DrawnReport, html: string, pdf: Buffer): Promise<Buffer> => zipOf([
  { name: 'report.html', data: html },
  { name: 'report.pdf', data: pdf },
  ...tablesOf(snapshot),
  ...drawn.responses.map(({ name, csv }) => ({ name: `responses/${name}`, data: csv })),
  ...drawn.figures.map(({ name, svg }) => ({ name: `figures/${name}`, data: svg })),
  { name: 'snapshot.json', data: snapshotText },
])
