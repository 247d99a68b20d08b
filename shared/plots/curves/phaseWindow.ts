/** Range of phase (deg) that a figure shows; wrapped where the curves turn too often to be drawn unwrapped. */
export interface PhaseWindow {
  from: number
  to: number
  wrapped: boolean
}

/** deg; curves that turn further are wrapped. */
const longestUnwrapped = 900

/**
 * The range of phase in which to draw curves: all of it at multiples of 90 deg with at least one odd multiple of half a turn, or, for a
 * loop whose dead time turns it many times, one whole turn about -180 deg into which the curves are wrapped.
 */
export function phaseWindow(phases: readonly Float64Array[]): PhaseWindow {
  let low = Infinity
  let high = -Infinity
  for (const phase of phases) {
    for (const value of phase) {
      if (value < low) low = value
      if (value > high) high = value
    }
  }
  if (low > high) return { from: -270, to: 0, wrapped: false }
  if (high - low > longestUnwrapped) return { from: -360, to: 0, wrapped: true }
  let from = 90 * Math.floor((low - 8) / 90)
  let to = 90 * Math.ceil((high + 8) / 90)
  // The nearest odd multiple of half a turn is always in sight, with something beyond it.
  const critical = 360 * Math.round(((low + high) / 2 - 180) / 360) + 180
  from = Math.min(from, critical - 45)
  to = Math.max(to, critical + 45)
  return { from, to, wrapped: false }
}

/** How many whole turns a phase (deg) lies above the window. */
export function turnOf(phase: number, { from }: PhaseWindow): number {
  return Math.floor((phase - from) / 360)
}

/** A phase (deg) as the window shows it. */
export function shownPhase(phase: number, window: PhaseWindow): number {
  return window.wrapped ? phase - 360 * turnOf(phase, window) : phase
}
