import type { FigureOptions } from '#shared/plots/Figure'
import { drawFigure } from '#shared/plots/drawFigure'
import type { FigureDataOf, FigureName } from '#shared/plots/figures'
import { figures } from '#shared/plots/figures'
import { Pen } from '#shared/plots/Pen'
import type { PlotTheme } from '#shared/plots/theme'
import { plotThemes } from '#shared/plots/theme'
import { createDrawing } from './createDrawing'

export interface RenderOptions {
  /** Unique on the page: the figure's title and description carry it in their ids. */
  id: string
  /** px; 642 are 170 mm on paper. @default 642 */
  width?: number
  /** px */
  height?: number
  /** @default the print theme */
  theme?: PlotTheme
}

/** px of 170 mm, the width of text on A4 with the report's edges */
const usualWidth = 642

/**
 * A figure as SVG text, to stand in a page or a file of its own: one image to a reader of the screen, with its title and caption.
 * The same data and options give the same bytes. Synchronous: SVG.js finds its document by a global.
 */
export function renderFigure<Name extends FigureName>(name: Name, data: FigureDataOf[Name], { id, width = usualWidth, height, theme = plotThemes.print }: RenderOptions): string {
  const drawing = createDrawing()
  drawing.attr({ 'role': 'img', 'aria-labelledby': `${id}-title ${id}-caption` })
  const words = new Pen(drawing)
  words.add('title', { id: `${id}-title` }, figures[name].title)
  words.add('desc', { id: `${id}-caption` }, figures[name].caption(data))
  const options: FigureOptions = { width, theme }
  if (height !== undefined) options.height = height
  drawFigure(drawing, name, data, options)
  return drawing.svg()
}
