import { describe, expect, it } from 'vitest'
import { deadTimeAnswer } from '../oracle/deadTimeAnswer'
import { crossProduct, exactLoop, squaredMagnitude, type OracleRoots } from '../oracle/ExactLoop'
import { exactAnswer } from '../oracle/exactAnswer'
import { generateLoop } from '../oracle/generateLoop'
import { integerPolynomial } from '../oracle/integerPolynomial'
import { isolatePositiveRoots } from '../oracle/isolatePositiveRoots'
import { rightHalfPlaneCount } from '../oracle/rightHalfPlaneCount'
import { seededRandom } from '../oracle/seededRandom'
import { sturmCount } from '../oracle/sturmCount'

const { multiply, subtract, derivative, squareFree, signAt } = integerPolynomial
const product = (...factors: bigint[][]) => factors.reduce((p, q) => multiply(p, q), [1n])

describe('the oracle, held against mathematics before it holds the engine', () => {
  it('isolates roots that are zero, negative, double, dyadic, at powers of two and 2^-60 apart', () => {
    const close = [-(1n << 60n) - 1n, 1n << 60n]
    const p = product([0n, 1n], [3n, 1n], [-2n, 1n], [-2n, 1n], [-1n, 1n], close, [-1n, 2n], [-7n, 3n], [1n, 0n, 1n])
    const roots = isolatePositiveRoots(p)
    expect(roots.map(r => r.toNumber())).toEqual([0.5, 1, 1 + 2 ** -60, 2, 7 / 3])
    const ends = roots[2]!.refine(100).ends
    expect(signAt(close, ends.low, ends.exponent) * signAt(close, ends.high, ends.exponent)).toBeLessThanOrEqual(0)
  })

  it('finds the real roots of Wilkinson\'s polynomial (J. H. Wilkinson, The perfidious polynomial, 1984), and 8 of them lost when -210 becomes -210 - 2^-23', () => {
    const wilkinson = product(...Array.from({ length: 20 }, (_, i) => [-BigInt(i + 1), 1n]))
    expect(isolatePositiveRoots(wilkinson).map(r => r.toNumber())).toEqual(Array.from({ length: 20 }, (_, i) => i + 1))
    const scaled = wilkinson.map(c => c << 23n)
    scaled[19]! -= 1n
    const left = isolatePositiveRoots(scaled).map(r => r.toNumber())
    expect(left.length).toBe(10)
    // published: 1.00000 2.00000 3.00000 4.00000 5.00000 6.00001 6.99970 8.00727 8.91725 20.84691
    expect(left.map(r => r.toFixed(5))).toEqual(['1.00000', '2.00000', '3.00000', '4.00000', '5.00000', '6.00001', '6.99970', '8.00727', '8.91725', '20.84691'])
  })

  it('agrees with Sturm\'s and Tarski\'s counts of gain crossovers, phase crossovers and minima on 90 seeded loops', () => {
    for (const family of ['mixed', 'light damping', 'tuned hump'] as const) {
      for (let seed = 0; seed < 30; seed += 1) {
        const { input } = generateLoop(family, seed, [2, 4])
        const { numerator, denominator } = exactLoop(input)
        const top = squaredMagnitude(numerator)
        const bottom = squaredMagnitude(denominator)
        const distance = squaredMagnitude(integerPolynomial.add(numerator, denominator))
        const answer = exactAnswer(input, -200)
        expect(sturmCount(subtract(top, bottom)), `${family} ${seed}`).toBe(answer.gainCrossovers.length)
        const { real, imaginary } = crossProduct(numerator, denominator)
        const onRealAxis = sturmCount(imaginary)
        const right = sturmCount(imaginary, real)
        expect((onRealAxis - right) / 2, `${family} ${seed}`).toBe(answer.phaseCrossovers.filter(p => p.frequency !== 0).length)
        const slope = squareFree(subtract(multiply(derivative(distance), bottom), multiply(distance, derivative(bottom))))
        const minima = (sturmCount(slope) + sturmCount(slope, derivative(slope))) / 2
        expect(minima, `${family} ${seed}`).toBe(answer.closestApproaches.length)
      }
    }
  })

  it('counts right half-plane roots as built in', () => {
    expect(rightHalfPlaneCount(product([1n, 1n], [2n, 3n], [5n, 1n, 1n]))).toBe(0)
    expect(rightHalfPlaneCount(product([1n, 1n], [-2n, 3n], [5n, -1n, 1n], [9n, 2n, 1n], [0n, 1n]))).toBe(3)
    expect(rightHalfPlaneCount(product([4n, 0n, 1n], [1n, 1n]))).toBeNull()
    const random = seededRandom(5)
    const whole = () => BigInt(1 + Math.floor(random() * 1000))
    for (let trial = 0; trial < 500; trial += 1) {
      let right = 0
      const factors = Array.from({ length: 1 + Math.floor(random() * 8) }, () => {
        const [beyond, single] = [random() < 0.4, random() < 0.4]
        if (beyond) right += single ? 1 : 2
        const [a, b, c] = [whole(), whole(), whole()]
        return single ? [beyond ? -a : a, b] : [a, beyond ? -b : b, c]
      })
      expect(rightHalfPlaneCount(product(...factors))).toBe(right)
    }
  })

  it('knows the closed forms of 3/(s+1)^3: crossover sqrt(3^(2/3) - 1), gain margin 8/3 at sqrt 3, vector margin 5/11 (Astrom and Murray, Feedback Systems, ch. 9; derived)', () => {
    const answer = exactAnswer({ zeros: [], poles: [[-1, 0], [-1, 0], [-1, 0]], gain: 3 })
    expect(answer.gainCrossovers[0]!.frequency).toBeCloseTo(Math.sqrt(3 ** (2 / 3) - 1), 14)
    expect(answer.phaseCrossovers).toHaveLength(1)
    expect(answer.phaseCrossovers[0]!.frequency).toBeCloseTo(Math.sqrt(3), 14)
    expect(answer.phaseCrossovers[0]!.gainMargin).toBeCloseTo(20 * Math.log10(8 / 3), 12)
    expect(answer.vectorMargin.distance).toBeCloseTo(5 / 11, 14)
    expect(answer.closedLoopUnstablePoles).toBe(0)
  })

  it('gives a sampled dead time of whole samples the same answer as that many poles at z = 0', () => {
    for (let seed = 0; seed < 40; seed += 1) {
      const { input } = generateLoop('sampled dead time', seed, [2, 7])
      const samples = 1 + seed % 5
      const period = 2 ** Math.round(Math.log2(input.sampleTime!))
      const roots = { ...input as OracleRoots, sampleTime: period }
      const delayed = deadTimeAnswer({ ...roots, deadTime: samples * period })
      const poles = [...roots.poles, ...Array.from({ length: samples }, (): [number, number] => [0, 0])]
      const exact = exactAnswer({ ...roots, deadTime: 0, poles })
      expect(delayed.open, `seed ${seed}`).toEqual([])
      for (const list of ['gainCrossovers', 'phaseCrossovers', 'closestApproaches'] as const) {
        expect(delayed[list].map(f => Number(f.frequency).toPrecision(9)), `${list}, seed ${seed}`).toEqual(exact[list].map(f => Number(f.frequency).toPrecision(9)))
      }
      expect(delayed.closedLoopUnstablePoles, `seed ${seed}`).toBe(exact.closedLoopUnstablePoles)
      expect(delayed.vectorMargin.distance).toBeCloseTo(exact.vectorMargin.distance, exact.vectorMargin.distance > 0.99 ? 1 : 9)
    }
  })

  it('finds the minima of |1 + L| by enclosures where exact arithmetic finds them, on 120 loops without dead time', () => {
    for (const family of ['mixed', 'light damping', 'integrators', 'undamped modes'] as const) {
      for (let seed = 0; seed < 30; seed += 1) {
        const { input, gainFloor } = generateLoop(family, seed)
        const enclosed = deadTimeAnswer({ ...input as OracleRoots, deadTime: 0 }, gainFloor)
        const exact = exactAnswer(input, gainFloor)
        expect(enclosed.open, `${family} ${seed}`).toEqual([])
        expect(enclosed.closestApproaches.map(m => m.frequency.toPrecision(7)), `${family} ${seed}`).toEqual(exact.closestApproaches.map(m => m.frequency.toPrecision(7)))
        expect(enclosed.phaseCrossovers.length, `${family} ${seed}`).toBe(exact.phaseCrossovers.length)
      }
    }
  })

  it('lists the crossings pi/2 + 2 pi n of exp(-s)/s (closed form: phase -90 - w 180/pi degrees)', () => {
    const answer = deadTimeAnswer({ zeros: [], poles: [[0, 0]], gain: 1, deadTime: 1 }, -30)
    expect(answer.phaseCrossovers.map(p => p.frequency)).toHaveLength(5)
    answer.phaseCrossovers.forEach((p, n) => expect(p.frequency).toBeCloseTo(Math.PI / 2 + 2 * Math.PI * n, 12))
    expect(answer.closedLoopUnstablePoles).toBe(0)
  })
})
