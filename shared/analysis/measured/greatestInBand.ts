import { curveAt, type CurvePoint } from './curveAt'
import type { MeasuredCurve } from './MeasuredCurve'

/** Places looked at in each gap before the greatest is refined: gain and phase are monotone there, so a peak between is broad. */
const placesInGap = 4

/**
 * The greatest value of a function of log L over a band of the data, and its frequency: looked for at the samples and at three
 * places in every gap, then refined by golden section beside the best. For peaks of |S|, |T| and |S - 1/2|, not for crossings.
 */
export function greatestInBand(curve: MeasuredCurve, from: number, to: number, value: (point: CurvePoint) => number): { value: number, frequency: number } {
  const places = placesIn(curve, from, to)
  const at = (frequency: number) => value(curveAt(curve, Math.min(to, Math.max(from, frequency)))!)
  let best = 0
  let greatest = -Infinity
  places.forEach((frequency, index) => {
    const here = at(frequency)
    if (here > greatest) [best, greatest] = [index, here]
  })
  let low = Math.log(places[Math.max(0, best - 1)]!)
  let high = Math.log(places[Math.min(places.length - 1, best + 1)]!)
  const ratio = (Math.sqrt(5) - 1) / 2
  for (let step = 0; step < 60; step++) {
    const [a, b] = [high - ratio * (high - low), low + ratio * (high - low)]
    if (at(Math.exp(a)) < at(Math.exp(b))) low = a
    else high = b
  }
  const refined = Math.min(to, Math.max(from, Math.exp((low + high) / 2)))
  return at(refined) > greatest ? { value: at(refined), frequency: refined } : { value: greatest, frequency: places[best]! }
}

function placesIn({ frequency }: MeasuredCurve, from: number, to: number): number[] {
  const places = [from]
  for (let i = 0; i < frequency.length; i++) {
    const [here, next] = [frequency[i]!, frequency[i + 1] ?? frequency[i]!]
    for (let k = 0; k < placesInGap; k++) {
      const place = here * (next / here) ** (k / placesInGap)
      if (place > places[places.length - 1]! && place < to) places.push(place)
    }
  }
  places.push(to)
  return places
}
