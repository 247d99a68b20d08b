import { describe, expect, it } from 'vitest'
import { closedLoopPoles } from '#shared/analysis/structure/closedLoopPoles'
import { checkLoops } from './checkLoop'

const loops = checkLoops.filter(loop => loop.expected.closed_loop_poles !== undefined)

describe('closed-loop poles of textbook loops', () => {
  it.each(loops.map(loop => [loop.id, loop] as const))('%s', (_, loop) => {
    const { poles, reason } = closedLoopPoles({ numerator: loop.num, denominator: loop.den, ...loop.Ts === null ? {} : { sampleTime: loop.Ts } })
    expect(reason).toBeNull()
    const expected = loop.expected.closed_loop_poles!.filter(([, im]) => im >= 0).sort(bySize)
    const found = poles.map(({ re, im, z }): [number, number] => z ?? [re, im]).sort(bySize)
    expect(found).toHaveLength(expected.length)
    found.forEach(([re, im], k) => {
      // given to 10 digits
      const [x, y] = expected[k]!
      expect(Math.hypot(re - x, im - y)).toBeLessThan(1e-9 * Math.hypot(x, y))
    })
  })

  it('with dead time left out of the list of its kind', () => {
    const delayed = checkLoops.filter(loop => loop.delay > 0)
    expect(delayed.length).toBeGreaterThan(0)
    for (const loop of delayed) {
      expect(closedLoopPoles({ numerator: loop.num, denominator: loop.den, deadTime: loop.delay }))
        .toEqual({ frequencyUnit: 'rad/s', poles: [], reason: 'With dead time the closed loop has endlessly many poles: none are listed.' })
    }
  })
})

function bySize(a: [number, number], b: [number, number]): number {
  return Math.hypot(...a) - Math.hypot(...b)
}
