import type { ComplexPair, ZerosPolesInput } from '#shared/types/analysis'
import { axisFactors, logGainOnAxis } from '../../../tests/oracle/axisFactors'
import { seededRandom } from '../../../tests/oracle/seededRandom'

/**
 * The seed-th loop of a family of given orders: modes with damping from 1e-3 to 1 and real roots over four decades, up to two integrators, unity gain at a
 * frequency drawn among them; every second loop has a dead time, at most some hundreds of turns above the floor of -60 dB.
 */
export function benchLoop(seed: number, orders: [number, number], withDeadTime = seed % 2 === 1): ZerosPolesInput {
  const random = seededRandom(seed * 7919 + 101)
  const logBetween = (low: number, high: number) => Math.exp(Math.log(low) + Math.log(high / low) * random())
  const order = orders[0] + Math.floor(random() * (orders[1] - orders[0] + 1))
  const roots = (count: number, right: number): ComplexPair[] => {
    const list: ComplexPair[] = []
    while (list.length < count) {
      const w = logBetween(0.1, 1000)
      const side = random() < right ? 1 : -1
      if (count - list.length > 1 && random() < 0.8) {
        const zeta = logBetween(1e-3, 1)
        const im = w * Math.sqrt(1 - zeta * zeta)
        list.push([side * zeta * w, im], [side * zeta * w, -im])
      }
      else list.push([side * w, 0])
    }
    return list
  }
  const integrators = Array.from({ length: Math.floor(random() * 3) }, (): ComplexPair => [0, 0])
  const poles = [...roots(order - integrators.length, 0), ...integrators]
  const zeros = roots(Math.floor(random() * (order - 1)), 0.1)
  const loop: ZerosPolesInput = { zeros, poles, gain: 1 }
  loop.gain = Math.exp(-logGainOnAxis(axisFactors(loop), logBetween(0.3, 300)))
  if (!withDeadTime) return loop
  const factors = axisFactors(loop)
  let last = 1e9
  while (last > 1e-3 && logGainOnAxis(factors, last) < -60 * Math.LN10 / 20) last /= 1.1
  return { ...loop, deadTime: Math.min(logBetween(1e-4, 3), 1500 / last) }
}
