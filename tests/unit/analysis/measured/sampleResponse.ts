import type { MeasuredInput, MeasuredPoint, MeasuredQuantity } from '#shared/types/analysis'

export type Complex = [number, number]

export const times = ([a, b]: Complex, [c, d]: Complex): Complex => [a * c - b * d, a * d + b * c]
export const over = ([a, b]: Complex, [c, d]: Complex): Complex => [(a * c + b * d) / (c * c + d * d), (b * c - a * d) / (c * c + d * d)]

/** num(jw) / den(jw) exp(-jw deadTime), highest power first. */
export function rational(numerator: number[], denominator: number[], deadTime = 0) {
  const at = (coefficients: number[], w: number) => coefficients.reduce<Complex>((sum, entry) => {
    const [re, im] = times(sum, [0, w])
    return [re + entry, im]
  }, [0, 0])
  return (w: number): Complex => times(over(at(numerator, w), at(denominator, w)), [Math.cos(w * deadTime), -Math.sin(w * deadTime)])
}

/** Frequencies from `from` to `to`, evenly on a logarithmic axis. */
export const logSpaced = (from: number, to: number, count: number) => Array.from({ length: count }, (_, i) => i === count - 1 ? to : from * (to / from) ** (i / (count - 1)))

const quantities: Record<MeasuredQuantity, (loopGain: Complex) => Complex> = {
  loopGain: value => value,
  returnDifference: ([re, im]) => [1 + re, im],
  sensitivity: ([re, im]) => over([1, 0], [1 + re, im]),
  complementarySensitivity: ([re, im]) => over([re, im], [1 + re, im]),
}

export interface SampleOptions extends Omit<MeasuredInput, 'measured'>, Partial<Omit<MeasuredInput['measured'], 'points'>> {
  coherence?: number
}

/** A measured response made of exact samples of a loop gain. */
export function sampleResponse(loopGain: (w: number) => Complex, frequencies: number[], options: SampleOptions = {}): MeasuredInput {
  const { quantity = 'loopGain', averages, stayedStable, coherence, ...rest } = options
  const points = frequencies.map((frequency): MeasuredPoint => {
    const [re, im] = quantities[quantity](loopGain(frequency))
    return { frequency, re, im, ...(coherence !== undefined && { coherence }) }
  })
  return { ...rest, measured: { quantity, points, ...(averages !== undefined && { averages }), ...(stayedStable !== undefined && { stayedStable }) } }
}
