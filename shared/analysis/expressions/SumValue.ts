/** A sum at one place of the axis: ln of its size, its angle, and the first two derivatives by v of its logarithm. */
export interface SumValue {
  logGain: number
  phase: number
  slopeRe: number
  slopeIm: number
  bendRe: number
  bendIm: number
}

/** Fills a SumValue from a value and its two derivatives, all over exp(logScale). */
export function setSumValue(out: SumValue, re: number, im: number, d1Re: number, d1Im: number, d2Re: number, d2Im: number, logScale: number): void {
  const square = re * re + im * im
  out.logGain = 0.5 * Math.log(square) + logScale
  out.phase = Math.atan2(im, re)
  const slopeRe = (d1Re * re + d1Im * im) / square
  const slopeIm = (d1Im * re - d1Re * im) / square
  out.slopeRe = slopeRe
  out.slopeIm = slopeIm
  out.bendRe = (d2Re * re + d2Im * im) / square - (slopeRe * slopeRe - slopeIm * slopeIm)
  out.bendIm = (d2Im * re - d2Re * im) / square - 2 * slopeRe * slopeIm
}
