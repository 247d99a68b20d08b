import type { LoopInput } from '../../types/analysis'
import type { ClosedLoopPole, ClosedLoopPoles } from '../../types/structure'
import { AnalysisInputError } from '../AnalysisInputError'
import { measuredInputOf } from '../blocks/measuredInputOf'
import { lowerExpression } from '../expressions/lowerExpression'
import type { FactoredLoop } from '../FactoredLoop'
import { BOUNDARY_DISTANCE } from '../factors/BoundaryRule'
import { wholeSamples } from '../factors/wholeSamples'
import { factorsOfInput } from '../factorsOfInput'
import { nameClosedLoopPoles } from './nameClosedLoopPoles'
import { nameOpenLoopPoles } from './nameOpenLoopPoles'
import { poleInPlane } from './poleInPlane'
import { preciseClosedLoopRoots } from './preciseClosedLoopRoots'
import { splitCancelledPairs } from './splitCancelledPairs'

/** 1 + gain of a biproper loop below this: the degree drops, poles lie at infinity. */
const NO_SOLUTION = 1e-12

/**
 * The closed-loop poles of a rational loop gain (sampled: whole samples of dead time included) in order of frequency, one of each conjugate pair:
 * frequency in the input's unit, damping -Re s/|s|, time constant -1/Re s in seconds, and the open-loop pole each goes back to as the gain falls, named
 * by its block and mode where the loop is built of blocks. Poles of L that a zero cancels are poles of the closed loop too and told as hidden.
 * A sampled pole stands in the plane of s by ln(z)/T, and as z itself. Where there is no finite list, `reason` says why.
 *
 * @throws AnalysisInputError as `analyseLoop`
 */
export function closedLoopPoles(input: LoopInput): ClosedLoopPoles {
  const frequencyUnit = input.frequencyUnit ?? 'rad/s'
  const without = (reason: string): ClosedLoopPoles => ({ frequencyUnit, poles: [], reason })
  const loop = factorsOf(input)
  if (typeof loop === 'string') return without(loop)
  const samples = wholeSamples(loop)
  if (samples === null) {
    return without(loop.sampleTime === undefined
      ? 'With dead time the closed loop has endlessly many poles: none are listed.'
      : 'The dead time is no whole number of samples up to 100: the closed loop has no finite list of poles.')
  }
  if (loop.zeros.re.length === loop.poles.re.length && samples === 0 && Math.abs(1 + loop.gain) <= NO_SOLUTION) {
    return without('The loop gain is -1 at high frequency: the closed loop has no solution there, or poles at infinity.')
  }
  const { rest, hidden } = splitCancelledPairs(loop)
  let roots
  try {
    roots = preciseClosedLoopRoots(rest, samples)
  }
  catch (error) {
    if (error instanceof RangeError) return without('Closed-loop poles lie closer together than numbers can hold: none are listed.')
    throw error
  }
  const words = nameOpenLoopPoles(input, loop.sampleTime)
  const modes = nameClosedLoopPoles(rest, samples, roots, pole => words(pole))
  const poles = [
    ...roots.map((root, k) => poleOf(root, loop.sampleTime, frequencyUnit, modes[k]!)),
    ...hidden.filter(({ im }) => im >= 0).map(root => poleOf(root, loop.sampleTime, frequencyUnit, `${words(poleInPlane(root.re, root.im, loop.sampleTime))}, hidden: a zero cancels it`)),
  ]
  return { frequencyUnit, poles: poles.sort((a, b) => a.frequency - b.frequency || b.re - a.re), reason: null }
}

/** The loop gain in factors, or why it has none. */
function factorsOf(input: LoopInput): FactoredLoop | string {
  if ('numerator' in input || 'zeros' in input) return factorsOfInput(input)
  if (measuredInputOf(input)) return 'A measured response tells no closed-loop poles.'
  if (!('expression' in input)) throw new AnalysisInputError('This source form is not analysed yet.', 'expression')
  const lowered = lowerExpression(input)
  return lowered.kind === 'factored' ? lowered.loop : 'With several dead times the closed loop has endlessly many poles: none are listed.'
}

function poleOf({ re, im }: { re: number, im: number }, sampleTime: number | undefined, unit: 'rad/s' | 'Hz', mode: string | null): ClosedLoopPole {
  const place = poleInPlane(re, im, sampleTime)
  const size = Math.hypot(place.re, place.im)
  // Nearness to the boundary as the verdict has it: relative in s, absolute in z.
  const onBoundary = sampleTime === undefined ? Math.abs(re) <= BOUNDARY_DISTANCE * size : Math.abs(place.re * sampleTime) <= BOUNDARY_DISTANCE
  return {
    re: place.re,
    im: place.im,
    ...(sampleTime === undefined ? {} : { z: [re, im] }),
    frequency: size / (unit === 'Hz' ? 2 * Math.PI : 1),
    damping: size === 0 ? 0 : -place.re / size + 0,
    timeConstant: onBoundary ? null : -1 / place.re,
    mode,
  }
}
