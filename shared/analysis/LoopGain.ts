/**
 * A loop gain ready to be evaluated on its boundary (s = jw, or z = exp(jwT)): what figures and tables sample.
 * Frequencies here are always in rad/s.
 */
export interface LoopGain {
  /** Writes [Re L, Im L] at w (rad/s) into `out`; returns false where L has no value (a boundary pole, outside measured data). */
  evaluate: (w: number, out: Float64Array) => boolean
  /** Highest frequency: pi/T for a sampled loop, the last sample for a measured one, otherwise Infinity. */
  axisEnd: number
  /** Lowest frequency: the first sample of a measured loop, otherwise 0. */
  axisStart: number
  /** Frequencies (rad/s) and half-widths of the features a sampler must not step over: roots near the axis, break frequencies. */
  features: { frequency: number, width: number }[]
  /** s; the longest dead time, so that a sampler can bound the phase it steps over. */
  deadTime: number
}
