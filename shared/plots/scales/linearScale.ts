import type { AxisScale } from './AxisScale'

/** Linear scale that puts `from` at `startPixel` and `to` at `endPixel`. */
export function linearScale(from: number, to: number, startPixel: number, endPixel: number): AxisScale {
  const slope = (endPixel - startPixel) / (to - from)
  return {
    kind: 'linear',
    from,
    to,
    toPixel: value => startPixel + (value - from) * slope,
    toValue: pixel => from + (pixel - startPixel) / slope,
  }
}
