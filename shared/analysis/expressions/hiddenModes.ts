import type { FactoredLoop } from '../FactoredLoop'
import { cancelledPoles } from './cancelledPoles'

/** One sentence for each pole on or beyond the stability boundary that a zero cancels exactly: a mode of the loop that L does not show. */
export function hiddenModes(loop: FactoredLoop): string[] {
  return cancelledPoles(loop).map(({ re, im }) => {
    const place = im === 0 ? `${re}` : `${re} and ${re} with imaginary parts ${im} and ${-im}`
    return `A zero hides the pole at ${loop.sampleTime !== undefined ? 'z' : 's'} = ${place}: the mode remains in the loop and is not stable.`
  })
}
