import type { LoopGain } from '#shared/analysis/LoopGain'
import { randomFromSeed } from './randomFromSeed'

export interface SweepOptions {
  loop: LoopGain
  /** Hz, rising */
  frequencies: readonly number[]
  /** records averaged at each frequency */
  averages: number
  /** rms of the noise in the returned signal, as a ratio of the rms put in: the signal-to-noise ratio at a frequency is |L| / noise */
  noise: number
  /** whole number; the same seed gives the same text */
  seed: number
}

/**
 * A noisy sweep of a loop gain as CSV text, made the way a sweep is taken: at each frequency `averages` records of a random
 * input X and of the returned signal Y = L X + N, N complex Gaussian, then the estimate H1 = Gxy / Gxx and the ordinary
 * coherence |Gxy|^2 / (Gxx Gyy). The comment lines at its head say so.
 *
 * Estimators: J. S. Bendat, A. G. Piersol, Random Data (from memory).
 * @throws Error where the loop gain has no value at a frequency
 */
export function makeSweep({ loop, frequencies, averages, noise, seed }: SweepOptions): string {
  const random = randomFromSeed(seed)
  const value = new Float64Array(2)
  const rows = frequencies.map((wanted) => {
    const frequency = Number(wanted.toPrecision(7))
    if (!loop.evaluate(2 * Math.PI * frequency, value)) throw new Error(`The loop gain has no value at ${frequency} Hz.`)
    const { re, im, coherence } = estimate(value[0]!, value[1]!, averages, noise, random)
    const cells = [20 * Math.log10(Math.hypot(re, im)), Math.atan2(im, re) * 180 / Math.PI].map(cell => cell.toFixed(4))
    // A coherence rounded to 0 would bound nothing: it keeps its digits.
    return [frequency, ...cells, Number(coherence.toPrecision(5))].join(',')
  })
  return [
    '# Invented data: a loop gain computed from a model, with random noise added by a script.',
    `# Each row: H1 of ${averages} averages; noise in the returned signal ${noise} of the rms put in; seed ${seed}.`,
    'Frequency (Hz),Gain (dB),Phase (deg),Coherence',
    ...rows,
    '',
  ].join('\n')
}

function estimate(re: number, im: number, averages: number, noise: number, random: () => number) {
  let [inPower, outPower, crossRe, crossIm] = [0, 0, 0, 0]
  for (let record = 0; record < averages; record++) {
    const [xr, xi] = gaussianPair(random)
    const [nr, ni] = gaussianPair(random)
    const yr = re * xr - im * xi + noise * nr
    const yi = re * xi + im * xr + noise * ni
    inPower += xr * xr + xi * xi
    outPower += yr * yr + yi * yi
    crossRe += xr * yr + xi * yi
    crossIm += xr * yi - xi * yr
  }
  return { re: crossRe / inPower, im: crossIm / inPower, coherence: (crossRe ** 2 + crossIm ** 2) / (inPower * outPower) }
}

/** Two independent normal numbers, each of variance 1/2, so that the pair as a complex number has mean square 1 (Box and Muller, 1958). */
function gaussianPair(random: () => number): [number, number] {
  const radius = Math.sqrt(-Math.log(random()))
  const angle = 2 * Math.PI * random()
  return [radius * Math.cos(angle), radius * Math.sin(angle)]
}
