import type { FactoredLoop } from '../FactoredLoop'

/** One sentence for each pole on or beyond the stability boundary that a zero cancels exactly: a mode of the loop that L does not show. */
export function hiddenModes(loop: FactoredLoop): string[] {
  const { zeros, poles } = loop
  const sampled = loop.sampleTime !== undefined
  const used = new Set<number>()
  const notes: string[] = []
  for (let k = 0; k < poles.re.length; k++) {
    const re = poles.re[k] as number
    const im = poles.im[k] as number
    const beyond = sampled ? (Math.abs(re) - 1) * (Math.abs(re) + 1) + im * im > 0 : re > 0
    if (!beyond && !poles.onBoundary[k]) continue
    const zero = Array.from(zeros.re).findIndex((value, j) => !used.has(j) && value === re && zeros.im[j] === im)
    if (zero < 0) continue
    used.add(zero)
    if (im < 0) continue
    const place = im === 0 ? `${re}` : `${re} and ${re} with imaginary parts ${im} and ${-im}`
    notes.push(`A zero hides the pole at ${sampled ? 'z' : 's'} = ${place}: the mode remains in the loop and is not stable.`)
  }
  return notes
}
