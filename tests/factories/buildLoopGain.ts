import type { LoopGain } from '#shared/analysis/LoopGain'

/** L(jw) = 25 (jw + 2) / (jw (jw + 10)) exp(-0.01 jw), written out: the loop of buildSnapshot, independent of the engine. */
export const buildLoopGain = (): LoopGain => ({
  evaluate(w, out) {
    const size = 25 * Math.hypot(2, w) / (w * Math.hypot(10, w))
    const angle = Math.atan2(w, 2) - Math.PI / 2 - Math.atan2(w, 10) - 0.01 * w
    out[0] = size * Math.cos(angle)
    out[1] = size * Math.sin(angle)
    return w > 0
  },
  axisStart: 0,
  axisEnd: Number.POSITIVE_INFINITY,
  features: [{ frequency: 2, width: 2 }, { frequency: 10, width: 10 }],
  deadTime: 0.01,
})
