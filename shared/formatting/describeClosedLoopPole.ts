import type { FrequencyUnit } from '../types/analysis'
import type { ClosedLoopPole } from '../types/structure'
import { formatDelay } from './formatDelay'
import { formatFrequency } from './formatFrequency'
import { significantDigits } from './significantDigits'

/** |z| below which a pole has settled after its sample, to the precision of the numbers. */
const DEAD_BEAT = 1e-12

/** Damping below which a pole is printed as lying on the boundary. */
const NO_DAMPING = 1e-9

export interface ClosedLoopPoleRow {
  /** '12.30 rad/s', or the bare number without a unit */
  frequency: string
  /** '0.021'; '1' on the real axis; 'minus 0.021' of what grows */
  damping: string
  /** '1.25 s'; 'grows by e in 1.25 s'; 'neither decays nor grows' */
  timeConstant: string
  /** 'mode bending 1 of G ...'; 'not told' */
  mode: string
}

/** One closed-loop pole as a row of a table prints it. */
export function describeClosedLoopPole(pole: ClosedLoopPole, unit?: FrequencyUnit): ClosedLoopPoleRow {
  const mode = pole.mode ?? 'not told'
  if (pole.z && Math.hypot(...pole.z) < DEAD_BEAT) return { frequency: 'dead beat', damping: '1', timeConstant: 'settles within a sample', mode }
  return {
    frequency: formatFrequency(pole.frequency, unit),
    damping: describeDamping(pole.damping),
    timeConstant: describeTimeConstant(pole.timeConstant),
    mode,
  }
}

function describeDamping(damping: number): string {
  const size = Math.abs(damping)
  if (size >= 1) return damping < 0 ? 'minus 1' : '1'
  // Three digits of a lightly damped mode too; what is left of rounding on the boundary is none.
  const figure = size < NO_DAMPING ? '0' : significantDigits(size, 3)
  return damping < 0 && figure !== '0' ? `minus ${figure}` : figure
}

function describeTimeConstant(timeConstant: number | null): string {
  if (timeConstant === null) return 'neither decays nor grows'
  return timeConstant > 0 ? formatDelay(timeConstant) : `grows by e in ${formatDelay(-timeConstant)}`
}
