import type { AxisScale } from './AxisScale'

/** Logarithmic scale that puts `from` at `startPixel` and `to` at `endPixel`; both values above 0. */
export function logScale(from: number, to: number, startPixel: number, endPixel: number): AxisScale {
  const start = Math.log(from)
  const slope = (endPixel - startPixel) / (Math.log(to) - start)
  return {
    kind: 'logarithmic',
    from,
    to,
    toPixel: value => startPixel + (Math.log(value) - start) * slope,
    toValue: pixel => Math.exp(start + (pixel - startPixel) / slope),
  }
}
