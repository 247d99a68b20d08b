import { formatFrequency } from '../../formatting/formatFrequency'
import { significantDigits } from '../../formatting/significantDigits'
import { interpolateCurve } from '../curves/interpolateCurve'
import type { BlockResponseData, CrossingChartData, LoopFigureData } from '../FigureData'

const signed = (value: number) => (Number(value.toFixed(1)) + 0).toFixed(1).replace('-', '−')

/**
 * What a figure tells of a frequency under the pointer: '81.50 rad/s: |L| 0.834 (−1.6 dB), phase −150.3 deg, |1 + L| 0.435' of its main curve, phase in
 * (-180, 180]; of a block its gain and phase; of a crossing chart the frequency alone.
 */
export function readoutOf(data: LoopFigureData | CrossingChartData | BlockResponseData, frequency: number): string {
  const place = formatFrequency(frequency, data.frequencyUnit)
  const curve = 'curves' in data ? data.curves[0].curve : 'response' in data ? data.response : null
  if (curve === null) return place
  const value = interpolateCurve(curve, frequency)
  if (!value) return `${place}: no value`
  const magnitude = Math.hypot(value.re, value.im)
  const decibels = magnitude > 0 ? ` (${signed(20 * Math.log10(magnitude))} dB)` : ''
  const phase = Math.atan2(value.im, value.re) * 180 / Math.PI
  if ('response' in data) return `${place}: gain ${significantDigits(magnitude, 3)}${decibels}, phase ${signed(phase)} deg`
  return `${place}: |L| ${significantDigits(magnitude, 3)}${decibels}, phase ${signed(phase)} deg, |1 + L| ${significantDigits(Math.hypot(1 + value.re, value.im), 3)}`
}
