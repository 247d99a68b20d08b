import type { Attributes } from '../Pen'
import type { PlotTheme } from '../theme'

const dashes = ['7 3', '2 2.5', '9 3 2 3', '4 2 1 2 1 2', '1 4']
const joined: Attributes = { 'stroke-linejoin': 'round', 'stroke-linecap': 'butt' }

export interface CurveStyle {
  stroke: string
  width: number
  attributes: Attributes
}

/** Of a curve among others: whether it is the continuous approximation of a sampled loop. */
interface StyledCurve { isApproximation?: boolean }

/**
 * How the line of the curve at `index` looks: the main one whole and dark, a continuous approximation whole and thin, each other thinner and in a
 * dash pattern of its own.
 */
export function curveStyle(curves: readonly StyledCurve[], index: number, theme: PlotTheme): CurveStyle {
  if (index === 0) return { stroke: theme.ink, width: theme.stroke.curve, attributes: joined }
  if (curves[index]?.isApproximation) return { stroke: theme.sea, width: theme.stroke.curve * 0.55, attributes: joined }
  const before = curves.slice(1, index).filter(curve => !curve.isApproximation).length
  return { stroke: theme.slate, width: theme.stroke.curve * 0.8, attributes: { ...joined, 'stroke-dasharray': dashes[before % dashes.length]! } }
}
