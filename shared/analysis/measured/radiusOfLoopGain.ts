import type { MeasuredQuantity } from '../../types/analysis'

/**
 * Radius of a disc about L that holds L for every value of the measured quantity within `relative` of the one measured.
 *
 * Closed form: 1/Q takes the disc about Q of radius r|Q| into one that the disc about 1/Q of radius |1/Q| r/(1-r) just holds. So a
 * sensitivity gives |1+L| r/(1-r), a complementary sensitivity (of which 1 - T = 1/(1+L)) |1+L| q/(1-q) with q = r|L|.
 * To first order these are dL = -(1+L) dS/S and dL = L(1+L) dT/T. Infinity where the disc is not bounded.
 */
export function radiusOfLoopGain(quantity: MeasuredQuantity, relative: number, size: number, distance: number): number {
  switch (quantity) {
    case 'loopGain': return relative * size
    case 'returnDifference': return relative * distance
    case 'sensitivity': return relative < 1 ? distance * relative / (1 - relative) : Infinity
    case 'complementarySensitivity': {
      const part = relative * size
      return part < 1 ? distance * part / (1 - part) : Infinity
    }
  }
}
