import type { CurveViews } from './curveViews'
import type { PhaseWindow } from './phaseWindow'
import { turnOf } from './phaseWindow'

/** Samples of a curve whose phase (deg) is brought into the shown window; NaN breaks the line. */
export interface WrappedCurve {
  frequency: Float64Array
  phase: Float64Array
  gain: Float64Array
}

/**
 * The curve in the turn that a wrapped window shows: where it leaves at one side it comes in at the other. A chord across the seam is given
 * twice, reaching beyond both sides, for the panel to cut. A window that is not wrapped gives the curve as it is.
 */
export function wrapPhase(frequency: Float64Array, { phase, gain }: CurveViews, window: PhaseWindow): WrappedCurve {
  if (!window.wrapped) return { frequency, phase, gain }
  const out = { frequency: [] as number[], phase: [] as number[], gain: [] as number[] }
  const push = (i: number, turn: number) => {
    out.frequency.push(frequency[i]!)
    out.phase.push(phase[i]! - 360 * turn)
    out.gain.push(gain[i]!)
  }
  const separate = () => {
    for (const list of [out.frequency, out.phase, out.gain]) list.push(Number.NaN)
  }
  for (let i = 0; i < phase.length; i++) {
    if (Number.isNaN(phase[i]!)) {
      separate()
      continue
    }
    const turn = turnOf(phase[i]!, window)
    const before = i > 0 && !Number.isNaN(phase[i - 1]!) ? turnOf(phase[i - 1]!, window) : turn
    if (before !== turn) {
      push(i, before)
      separate()
      push(i - 1, turn)
    }
    push(i, turn)
  }
  return { frequency: Float64Array.from(out.frequency), phase: Float64Array.from(out.phase), gain: Float64Array.from(out.gain) }
}
