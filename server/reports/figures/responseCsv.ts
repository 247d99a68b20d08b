import { measuredInputOf } from '#shared/analysis/blocks/measuredInputOf'
import type { LoopInput } from '#shared/types/analysis'
import type { SampledCurve } from '#shared/plots/FigureData'
import { csvOf } from '../package/csvOf'

const degreesOf = (re: number, im: number) => Math.atan2(im, re) * 180 / Math.PI

/** A measured response as it was read, or a model's loop gain as it was drawn, with full digits. */
export function responseCsv(input: LoopInput, curve: SampledCurve, frequencyUnit: string): string {
  const measured = measuredInputOf(input)
  if (measured) {
    const { quantity, points } = measured.input.measured
    return csvOf([`frequency, ${frequencyUnit}`, `real part of ${quantity}`, 'imaginary part', 'coherence'], points.map(({ frequency, re, im, coherence }) => [frequency, re, im, coherence ?? null]))
  }
  const rows = Array.from(curve.frequency, (frequency, index): [number, number, number] => [frequency, curve.re[index] ?? Number.NaN, curve.im[index] ?? Number.NaN])
  return csvOf(
    [`frequency, ${frequencyUnit}`, 'Re L', 'Im L', '|L|, dB', 'arg L, deg', '|1 + L|'],
    rows.filter(([, re, im]) => Number.isFinite(re) && Number.isFinite(im)).map(([frequency, re, im]) => [frequency, re, im, 20 * Math.log10(Math.hypot(re, im)), degreesOf(re, im), Math.hypot(1 + re, im)]),
  )
}
