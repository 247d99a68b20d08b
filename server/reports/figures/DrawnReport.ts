import type { FigureView } from '../view/ReportView'

export type DrawnFigureView = Omit<FigureView, 'number'>

/** The figures of one document, drawn before it is laid out. */
export interface DrawnReport {
  crossingChart: DrawnFigureView | null
  /** by place of the loop: the large figures of its governing condition, and those of the other conditions */
  loops: { governing: DrawnFigureView[], others: DrawnFigureView[] }[]
  /** every figure as a file of its own, in the order drawn, for the package */
  files: { name: string, svg: string }[]
}
