import { counted } from '#shared/formatting/counted'
import type { EditionFacts, ReportSnapshot } from '#shared/types/snapshot'
import type { DrawnReport } from './figures/DrawnReport'
import { markdownToHtml } from './text/markdownToHtml'
import { loopAnchor } from './view/anchorOf'
import { blocksSection } from './view/blocksSection'
import { cautionsSection } from './view/cautionsSection'
import { cellsOf } from './view/cellsOf'
import { closedLoopSection } from './view/closedLoopSection'
import { chapterView } from './view/chapterView'
import { conditionsSection } from './view/conditionsSection'
import { conventionsSection } from './view/conventionsSection'
import { coverView, documentType } from './view/coverView'
import { criteriaLine } from './view/criteriaWords'
import { matrixTables } from './view/matrixTables'
import type { FigureView, ReportView, SectionView } from './view/ReportView'
import { summaryView } from './view/summaryView'

/** Numbers figures through the document and keeps its order: the summary's chart, then chapter by chapter. */
function createFigureNumberer(): (figure: Omit<FigureView, 'number'>) => FigureView {
  let count = 0
  return (figure) => {
    count += 1
    return { ...figure, number: count }
  }
}

/** The sections there are, numbered on from `first`. */
function numberedSections(first: number, makers: ((number: string) => SectionView | null)[]): SectionView[] {
  return makers.reduce<SectionView[]>((sections, make) => {
    const section = make(String(first + sections.length))
    return section === null ? sections : [...sections, section]
  }, [])
}

/** As a browser reads a title (HTML, document.title): white space stripped and collapsed. The printer compares the two. */
const oneLine = (text: string) => text.replace(/[\t\n\f\r ]+/g, ' ').trim()

const stamps: Record<EditionFacts['edition'], string | null> = { preview: 'PREVIEW', draft: 'DRAFT', issued: null }

/**
 * The document as strings, tables and drawings, from a frozen snapshot, the facts of the edition, and the figures drawn for it.
 * Pure: the same arguments give the same view. Throws a RangeError for a snapshot that lacks a loop-condition pair.
 */
export function buildReportView(snapshot: ReportSnapshot, edition: EditionFacts, drawn: DrawnReport): ReportView {
  const cells = cellsOf(snapshot)
  const numbered = createFigureNumberer()
  const chart = drawn.crossingChart === null ? null : numbered(drawn.crossingChart)
  const firstChapter = 3
  const chapters = snapshot.loops.map((_, index) => chapterView(
    snapshot,
    cells.filter(cell => cell.loopIndex === index),
    index,
    String(firstChapter + index),
    (drawn.loops[index]?.governing ?? []).map(numbered),
    (drawn.loops[index]?.others ?? []).map(numbered),
    drawn.loops[index]?.leftOut ?? 0,
  ))
  const afterChapters = firstChapter + chapters.length
  const sections = numberedSections(afterChapters, [
    number => conditionsSection(snapshot, number),
    number => blocksSection(snapshot, number),
    number => closedLoopSection(snapshot, cells, number),
    number => conventionsSection(snapshot, number),
    cautionsSection,
  ])
  const contents = [
    { number: '1', title: 'Summary', target: 'summary', note: '' },
    { number: '2', title: 'Every loop in every condition', target: 'matrix', note: '' },
    ...chapters.map(({ number, code, name, verdict }, index) => ({ number, title: `${code} ${name}`, target: loopAnchor(index, code), note: verdict })),
    ...sections.map(({ number, title, anchor }) => ({ number, title, target: anchor, note: '' })),
  ]
  const { report, brand, system } = snapshot
  const label = edition.edition === 'issued' ? `revision ${edition.label}` : edition.label
  return {
    documentTitle: oneLine(`${report.documentNumber} ${label}: ${report.title}`),
    pageSize: brand.pageSize,
    accent: brand.accent,
    stamp: stamps[edition.edition],
    runningHead: {
      left: `${report.documentNumber} \u00b7 ${label}`,
      right: report.title,
      foot: `${brand.teamName} \u00b7 ${documentType} \u00b7 ${edition.snapshotSha256.slice(0, 12)}`,
    },
    cover: coverView(snapshot, edition, contents),
    description: system.description,
    summary: summaryView(snapshot, cells, chart),
    remarks: markdownToHtml(report.remarks),
    matrix: {
      number: '2',
      anchor: 'matrix',
      introduction: `${system.name}: ${counted(snapshot.loops.length, 'loop')} in ${counted(snapshot.conditions.length, 'operating condition')}. Criteria: ${criteriaLine(snapshot.criteria)}. The bar runs to the vector margin; its dotted mark is the limit.`,
      tables: matrixTables(snapshot, cells),
    },
    chapters,
    sections,
  }
}
