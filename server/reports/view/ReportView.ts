import type { SafeHtml } from '../text/SafeHtml'

/** How a text is set apart; its words say the same, so that nothing hangs on colour. */
export type Tone = 'plain' | 'met' | 'bad' | 'accepted' | 'open' | 'quiet'

export interface TableCell {
  text: string
  /** a second, smaller line */
  small: string
  tone: Tone
  /** an anchor of this document, without the '#'; empty for none */
  target: string
  /** a small drawing after the text */
  drawing: SafeHtml | null
  isHead: boolean
  isMono: boolean
}

export interface TableColumn {
  head: string
  /** second line of the head, where the unit or the limit stands */
  unit: string
  isNumber: boolean
  isWide: boolean
}

export interface TableView {
  caption: string
  columns: TableColumn[]
  rows: { cells: TableCell[], isMarked: boolean }[]
  /** short enough to be kept on one page */
  isShort: boolean
  /** small print under the table */
  notes: string[]
  /** a class of its own for the style sheet */
  kind: string
}

export interface FigureView {
  drawing: SafeHtml
  number: number
  caption: string
  /** 'full' takes the width of the page, 'half' stands two in a row, 'third' three */
  size: 'full' | 'half' | 'third'
}

export interface CoverView {
  teamName: string
  addressLine: string
  /** data: address of the team's mark, null where there is none */
  mark: string | null
  documentType: string
  title: string
  systemName: string
  customer: string
  /** 'Revision B' or 'Draft 2 of revision B' */
  label: string
  statusWords: string
  /** the fields of the title block, in rows */
  titleBlock: { name: string, value: string, isWide: boolean, isMono: boolean }[]
  history: TableView
  contents: { number: string, title: string, target: string, note: string }[]
}

export interface SummaryView {
  /** the answer in one sentence */
  finding: string
  findingTone: Tone
  counts: { count: number, word: string, tone: Tone }[]
  worst: TableView
  attention: TableView | null
  chart: FigureView | null
  statements: string[]
}

export interface ConditionView {
  anchor: string
  title: string
  verdict: string
  tone: Tone
  closedLoop: string
  coverage: string[]
  coverageTone: Tone
  crossings: TableView | null
  gaps: TableView | null
  /** other sources against the one of record */
  differences: TableView | null
  /** how the loop gain was built from blocks, and what contradicts it */
  structure: string[]
  structureTone: Tone
}

export interface ChapterView {
  number: string
  anchor: string
  /** name of the chapter's pages in the style sheet */
  pageName: string
  code: string
  name: string
  verdict: string
  tone: Tone
  facts: { name: string, value: string }[]
  remarks: SafeHtml
  margins: TableView
  sources: TableView
  governing: string
  figures: FigureView[]
  otherFigures: FigureView[]
  /** which conditions are not drawn, in words; empty where all are */
  notDrawn: string
  conditions: ConditionView[]
}

export interface SectionBlock {
  title: string
  paragraphs: string[]
  items: { term: string, words: string }[]
  table: TableView | null
}

/** A section of plain words and tables. */
export interface SectionView {
  number: string
  anchor: string
  title: string
  introduction: string[]
  blocks: SectionBlock[]
}

/** The whole document as strings, tables and drawings: what the templates lay out without deciding anything. */
export interface ReportView {
  /** the document's title in the file's own data */
  documentTitle: string
  pageSize: 'A4' | 'Letter'
  accent: string
  /** printed across every page of what is not issued; null on an issued document */
  stamp: string | null
  runningHead: { left: string, right: string, foot: string }
  cover: CoverView
  /** what the system is, in plain words */
  description: string
  summary: SummaryView
  remarks: SafeHtml
  matrix: { number: string, anchor: string, introduction: string, tables: TableView[] }
  chapters: ChapterView[]
  sections: SectionView[]
}
