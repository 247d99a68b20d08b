import type { Polyline } from '../curves/clipPolyline'
import { clipPolyline } from '../curves/clipPolyline'
import type { CurveStyle } from '../curves/curveStyle'
import { pathData } from '../curves/pathData'
import type { Rectangle } from '../curves/Rectangle'
import type { FigureCurve } from '../FigureData'
import type { Pen } from '../Pen'

const gapDash = '1.5 3'

/**
 * Draws a curve through the points (px) inside a rectangle: dotted where a measured response cannot be trusted between its samples.
 * Returns the pieces as drawn, so that labels keep off them.
 */
export function drawCurve(pen: Pen, figureCurve: FigureCurve, { stroke, width, attributes }: CurveStyle, xs: Float64Array, ys: Float64Array, panel: Rectangle): Polyline[] {
  const all = clipPolyline(xs, ys, panel)
  const gaps = figureCurve.untrusted ?? []
  if (gaps.length === 0) {
    pen.stroke(pathData(all), stroke, width, attributes)
    return all
  }
  const { frequency } = figureCurve.curve
  const inGap = (i: number) => {
    const middle = Math.sqrt(frequency[i]! * frequency[i + 1]!)
    return gaps.some(({ from, to }) => middle > from && middle < to)
  }
  // The line is broken at every change between trusted and untrusted, in the list of the other kind.
  const part = (wanted: boolean) => {
    const px: number[] = []
    const py: number[] = []
    for (let i = 0; i + 1 < xs.length; i++) {
      if (inGap(i) !== wanted) {
        px.push(Number.NaN)
        py.push(Number.NaN)
        continue
      }
      if (i === 0 || inGap(i - 1) !== wanted) {
        px.push(xs[i]!)
        py.push(ys[i]!)
      }
      px.push(xs[i + 1]!)
      py.push(ys[i + 1]!)
    }
    return clipPolyline(px, py, panel)
  }
  pen.stroke(pathData(part(false)), stroke, width, attributes)
  pen.stroke(pathData(part(true)), stroke, width, { ...attributes, 'stroke-dasharray': gapDash })
  return all
}
