/** Maps a value of an axis to px and back. */
export interface AxisScale {
  kind: 'linear' | 'logarithmic'
  from: number
  to: number
  toPixel: (value: number) => number
  toValue: (pixel: number) => number
}
