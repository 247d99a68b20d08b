import type { Dom } from '@svgdotjs/svg.js'
import type { DrawnFigure, FigureOptions } from './Figure'
import type { FigureDataOf, FigureName } from './figures'
import { figures } from './figures'
import { Pen } from './Pen'

/**
 * Draws a figure into an empty <svg> of a browser's page or of the server's document, sets its size and font, and returns its scales and marks.
 * Nothing of it depends on where it is drawn.
 */
export function drawFigure<Name extends FigureName>(drawing: Dom, name: Name, data: FigureDataOf[Name], options: FigureOptions): DrawnFigure {
  const drawn = figures[name].draw(new Pen(drawing), data, options)
  const height = Math.ceil(drawn.height)
  drawing.attr({ 'viewBox': `0 0 ${drawn.width} ${height}`, 'width': drawn.width, height, 'font-family': options.theme.fontFamily })
  return { ...drawn, height }
}
