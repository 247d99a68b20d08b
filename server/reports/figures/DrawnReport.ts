import type { FigureView } from '../view/ReportView'

export type DrawnFigureView = Omit<FigureView, 'number'>

/** The figures of one document, drawn before it is laid out, and the responses they were drawn from. */
export interface DrawnReport {
  crossingChart: DrawnFigureView | null
  /** by place of the loop: the large figures of its governing condition, those of the other conditions, and how many conditions are not drawn */
  loops: { governing: DrawnFigureView[], others: DrawnFigureView[], leftOut: number }[]
  /** every figure as a file of its own for the package, in the order drawn */
  figures: { name: string, svg: string }[]
  /** the frequency response of each loop in each condition as a file for the package */
  responses: { name: string, csv: string }[]
}
