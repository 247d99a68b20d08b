import type { Attributes } from '../Pen'
import type { PlotTheme } from '../theme'

const dashes = ['', '7 3', '2 2.5', '9 3 2 3', '4 2 1 2 1 2', '1 4']

/** How the line of the curve at `index` looks: the main one whole and dark, each other thinner and in a dash pattern of its own. */
export function curveStyle(index: number, theme: PlotTheme): { stroke: string, width: number, attributes: Attributes } {
  const attributes: Attributes = { 'stroke-linejoin': 'round', 'stroke-linecap': 'butt' }
  if (index === 0) return { stroke: theme.ink, width: theme.stroke.curve, attributes }
  return {
    stroke: theme.slate,
    width: theme.stroke.curve * 0.8,
    attributes: { ...attributes, 'stroke-dasharray': dashes[1 + (index - 1) % (dashes.length - 1)]! },
  }
}
