import type { LoopGain } from '#shared/analysis/LoopGain'

export interface Roots {
  gain: number
  /** [re, im]; a pair is given by its upper root */
  zeros?: [number, number][]
  poles: [number, number][]
  deadTime?: number
}

/** Natural frequency (rad/s) and damping ratio as the upper root of a pair. */
export function pair(frequency: number, damping: number): [number, number] {
  return [-damping * frequency, frequency * Math.sqrt(1 - damping * damping)]
}

/** A loop gain from roots, each factor normalised to 1 at s = 0 where its root is not 0: evaluated in the plainest way, for figures only. */
export function loopGainOfRoots({ gain, zeros = [], poles, deadTime = 0 }: Roots): LoopGain {
  const both = (roots: [number, number][]) => roots.flatMap(([re, im]): [number, number][] => im === 0 ? [[re, 0]] : [[re, im], [re, -im]])
  const allZeros = both(zeros)
  const allPoles = both(poles)
  const factor = (w: number, [re, im]: [number, number]): [number, number] => {
    if (re === 0 && im === 0) return [0, w]
    const size = re * re + im * im
    // (s - r) / (-r)
    const a = -re
    const b = w - im
    return [(a * -re + b * -im) / size, (b * -re - a * -im) / size]
  }
  return {
    axisStart: 0,
    axisEnd: Infinity,
    deadTime,
    features: [...allZeros, ...allPoles].filter(([re, im]) => im > 0 || (im === 0 && re !== 0))
      .map(([re, im]) => ({ frequency: Math.hypot(re, im), width: Math.abs(im === 0 ? re : re) })),
    evaluate(w, out) {
      let re = gain
      let im = 0
      for (const root of allZeros) {
        const [a, b] = factor(w, root)
        ;[re, im] = [re * a - im * b, re * b + im * a]
      }
      for (const root of allPoles) {
        const [a, b] = factor(w, root)
        const size = a * a + b * b
        if (size === 0) return false
        ;[re, im] = [(re * a + im * b) / size, (im * a - re * b) / size]
      }
      const [c, s] = [Math.cos(w * deadTime), -Math.sin(w * deadTime)]
      out[0] = re * c - im * s
      out[1] = re * s + im * c
      return true
    },
  }
}
