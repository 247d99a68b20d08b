import type { Pen } from './Pen'
import type { PlotTheme } from './theme'
import type { AxisScale } from './scales/AxisScale'

/** How a figure is to be drawn; what it shows is in its data. */
export interface FigureOptions {
  /** px */
  width: number
  /** px; each figure has a height of its own for its width */
  height?: number
  theme: PlotTheme
  /** Marks answer to the pointer and the keyboard, and carry a halo that can be lit. @default false */
  interactive?: boolean
}

export type MarkKind = 'gain' | 'phase' | 'approach'

/** One crossing or closest approach as drawn: its place, its name in the lists and its words. */
export interface FigureMark {
  /** 'gain-2', 'phase-0', 'approach-1': kind and place in the main analysis' list; in the crossing chart with the row's key before it, as in 'SL-P/gain-2' */
  id: string
  kind: MarkKind
  /** px */
  x: number
  y: number
  /** What a reader of the screen hears, as in 'gain crossover at 79.8 rad/s, falling, lag 27.1 deg'. */
  label: string
}

/** A rectangle of the figure with scales from values to px. */
export interface FigurePanel {
  x: number
  y: number
  width: number
  height: number
  xScale: AxisScale
  yScale: AxisScale
}

/** What lies under a place of the figure. */
export interface FigurePlace {
  /** in the figure's unit */
  frequency: number
  /** key of the row, in the crossing chart */
  row?: string
}

export interface DrawnFigure {
  width: number
  height: number
  panels: FigurePanel[]
  /** in order of frequency, row by row */
  marks: FigureMark[]
  /** The frequency that a place (px) stands for, null beside the panels. */
  locate: (x: number, y: number) => FigurePlace | null
  /** Where the main curve is at a frequency (px), in each panel that shows it there. */
  pointsAt: (frequency: number) => { x: number, y: number }[]
}

/** A figure: a pure function from data and options to drawn elements. */
export type DrawFigure<Data> = (pen: Pen, data: Data, options: FigureOptions) => DrawnFigure
