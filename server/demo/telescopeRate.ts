import type { ComplexPair } from '#shared/types/analysis'
import type { ZerosPolesDefinition } from '#shared/types/source'

/** Roots of s^2/w^2 + 2 z s/w + 1, |z| < 1. */
function pair(w: number, z: number): ComplexPair[] {
  const im = w * Math.sqrt(1 - z * z)
  return [[-z * w, im], [-z * w, -im]]
}

/**
 * The telescope rate loop of the demo as zeros, poles and gain:
 * kTeR (1 + s/80)/s / (hydraulics) / (valve lag at 220 rad/s) with the axial mode's zero pair below its pole pair, and 4 ms of dead time.
 */
export function rootsOfTelescopeRate(values: Record<string, number>): { name: string, definition: ZerosPolesDefinition } {
  const { kTeR = 0, whTe = 0, zh = 0, wAx = 0 } = values
  const notch = 0.93 * wAx
  return {
    name: 'design model',
    definition: {
      kind: 'zerosPoles',
      zeros: [[-80, 0], ...pair(notch, 0.014)],
      poles: [[0, 0], ...pair(whTe, zh), [-220, 0], ...pair(wAx, 0.01)],
      gain: kTeR / 80 * whTe ** 2 * 220 * wAx ** 2 / notch ** 2,
      deadTime: 0.004,
    },
  }
}
