import type { HoldGain } from '../../types/block'
import { holdResponse } from '../sampling/holdResponse'
import type { LoopAlgebra } from './LoopAlgebra'

export interface Complex {
  re: number
  im: number
}

/** A gain by its values: one at every w (rad/s); NaN where it has none, at a pole on the axis. */
export type Response = (w: number) => Complex

/**
 * Loop gains as functions of frequency: s = jw, z = exp(jwT), a hold by its frequency response. What stands behind a hold is taken as it
 * is at w, without the aliases that sampling adds.
 *
 * @param sampleTime s; undefined for a continuous loop
 */
export function responseAlgebra(sampleTime: number | undefined): LoopAlgebra<Response> {
  return {
    number: (value) => {
      const re = value.toNumber()
      return () => ({ re, im: 0 })
    },
    variable: domain => domain === 'continuous' ? w => ({ re: 0, im: w }) : w => turn(w * (sampleTime ?? 0)),
    scale: (value, by) => {
      const factor = by.toNumber()
      return (w) => {
        const { re, im } = value(w)
        return { re: re * factor, im: im * factor }
      }
    },
    add: (a, b) => once((w) => {
      const [x, y] = [a(w), b(w)]
      return { re: x.re + y.re, im: x.im + y.im }
    }),
    multiply: (a, b) => once(w => product(a(w), b(w))),
    invert: value => w => inverse(value(w)),
    raise: (value, exponent) => once((w) => {
      const base = exponent < 0 ? inverse(value(w)) : value(w)
      let power: Complex = { re: 1, im: 0 }
      for (let repeat = 0; repeat < Math.abs(exponent); repeat++) power = product(power, base)
      return power
    }),
    delay: (value, delay) => {
      if (delay.sign === 0) return value
      const time = delay.toNumber()
      return w => product(value(w), turn(-w * time))
    },
    unitDelays: count => w => turn(-w * count * (sampleTime ?? 0)),
    behindHold: (continuous, { gain }) => w => product(continuous(w), held(gain, w)),
    hasSeveralDelays: () => false,
    excess: () => null,
  }
}

/** Keeps the last value: blocks of blocks of blocks would else be worked out over and over at one frequency. */
function once(response: Response): Response {
  let at = Number.NaN
  let value: Complex = { re: Number.NaN, im: Number.NaN }
  return (w) => {
    if (w !== at) [at, value] = [w, response(w)]
    return value
  }
}

const turn = (angle: number): Complex => ({ re: Math.cos(angle), im: Math.sin(angle) })

const product = (a: Complex, b: Complex): Complex => ({ re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re })

function inverse({ re, im }: Complex): Complex {
  // by the larger part, so that no square leaves the range of doubles
  const scale = Math.max(Math.abs(re), Math.abs(im))
  const [x, y] = [re / scale, im / scale]
  const size = (x * x + y * y) * scale
  return { re: x / size, im: -y / size }
}

function held(hold: HoldGain, w: number): Complex {
  const out = new Float64Array(2)
  holdResponse(hold, w, out)
  return { re: out[0]!, im: out[1]! }
}
