/** One evaluated point of a loop gain in all the views in which it is drawn. */
export interface SamplePoint {
  /** rad/s */
  w: number
  re: number
  im: number
  /** Whether L has a value here. */
  valid: boolean
  /** px of a figure of usual size: ln w, gain in dB, log |1 + L| */
  x: number
  gain: number
  distance: number
  /** deg; argument, then unwrapped along the curve */
  phase: number
  /** scale of the neighbourhood of -1 at this point, px per unit of L */
  nearScale: number
  /** May not be left out. */
  pinned: boolean
}
