import type { HoldKind } from '../types/block'

/** What each hold does, as told where one is chosen and where it is printed. */
export const describeHold: Record<HoldKind, string> = {
  zeroOrder: 'zero-order hold',
  pwmSingleUpdate: 'pulse width modulator, both edges of a pulse moved by one update',
  pwmDoubleUpdate: 'pulse width modulator, one update an edge',
}
