import { angleOnAxis, axisFactors, endLogGain, logGainOnAxis, overReciprocal } from './axisFactors'
import { addDelayToCount } from './closedLoopCountWithDelay'
import { dyadicOf, dyadicToNumber, shifted } from './dyadic'
import { exactAnswer, withoutAxisRoots, wrapDegrees, type ExactAnswer, type ExactPhaseCrossover } from './exactAnswer'
import { exactLoop, squaredMagnitude, type OracleRoots } from './ExactLoop'
import { integerPolynomial, type IntegerPolynomial } from './integerPolynomial'
import { isolatePositiveRoots } from './isolatePositiveRoots'
import { minimaOnAxis } from './minimaOnAxis'
import { rightHalfPlaneCount } from './rightHalfPlaneCount'

const { add, subtract, multiply, raise, scale, derivative } = integerPolynomial
const DEGREES = 180 / Math.PI
const DECIBELS = 20 / Math.LN10
/** An end of a monotone stretch whose angle comes this near (rad) to the negative real axis is left open, not judged. */
const NEAR = 1e-9

/** first / second as integers of the same scale */
function asIntegers(first: number, second: number): [bigint, bigint] {
  const a = dyadicOf(first)
  const b = dyadicOf(second)
  const e = Math.min(a.exponent, b.exponent)
  return [shifted(a.mantissa, a.exponent - e), shifted(b.mantissa, b.exponent - e)]
}

/** The answer for a loop with dead time; `open` lists what could not be decided, `null` stands where this oracle does not reach. */
export type DeadTimeAnswer = Omit<ExactAnswer, 'complementarySensitivityPeak' | 'diskMargin'> & { open: string[] }

/**
 * Everything the contract asks of a factored loop with dead time (continuous, or sampled with any real dead time).
 *
 * Gain crossovers: exact, as without dead time. Phase crossovers: the stretches on which the total angle is monotone end at roots of an integer
 * polynomial (slope of the rational angle minus the dead time), isolated exactly; on each the odd multiples of 180 degrees between the angles at
 * its ends are counted, the angles being sums of arctangents in doubles with a guard of 1e-9 rad. Minima: `minimaOnAxis`.
 * Closed-loop count: `addDelayToCount`.
 *
 * Assumes: strictly proper, or biproper with an end gain under the floor.
 */
export function deadTimeAnswer(input: OracleRoots, gainFloor = -60): DeadTimeAnswer {
  const deadTime = input.deadTime ?? 0
  const period = input.sampleTime
  const rational = exactAnswer({ ...input, deadTime: 0 }, gainFloor)
  const open: string[] = []
  const { numerator, denominator } = exactLoop({ ...input, deadTime: 0 })
  const factors = axisFactors(input)
  const frequencyOf = (t: number) => period === undefined ? t : 2 / period * Math.atan(t)

  const top = withoutAxisRoots(numerator)
  const bottom = withoutAxisRoots(denominator)
  const real = add(multiply(top.even, bottom.even), raise(multiply(top.odd, bottom.odd), 1))
  const imaginary = subtract(multiply(top.odd, bottom.even), multiply(top.even, bottom.odd))
  // slope of the rational angle in t: [R I + 2x (R I' - I R')] / (R^2 + x I^2)
  const turning = add(multiply(real, imaginary), scale(raise(subtract(multiply(real, derivative(imaginary)), multiply(imaginary, derivative(real))), 1), 2n))
  const size = add(multiply(real, real), raise(multiply(imaginary, imaginary), 1))
  const [delay, unit] = asIntegers(deadTime, period ?? 1)
  const totalSlope = period === undefined
    ? subtract(scale(turning, unit), scale(size, delay))
    // dw = 2/T dt / (1 + t^2)
    : subtract(scale(multiply(turning, [1n, 1n]), unit), scale(size, 2n * delay))
  const floorPower = 10n ** BigInt(-gainFloor / 10)
  const aboveFloor = subtract(scale(squaredMagnitude(numerator), floorPower), squaredMagnitude(denominator))

  const cuts = [totalSlope, aboveFloor, top.common, bottom.common].flatMap(p => p.length > 1 ? isolatePositiveRoots(p) : []).map((root) => {
    const { mantissa, exponent } = root.squareRoot(80)
    return dyadicToNumber(mantissa, exponent)
  }).sort((p, q) => p - q)
  const floorSign = (t: number) => {
    const { mantissa, exponent } = dyadicOf(t)
    return integerPolynomial.signAt(aboveFloor, mantissa * mantissa, 2 * exponent)
  }

  // the slope at w = 0 is that of the total angle
  const startSlope = (totalSlope[0] ?? 0n) > 0n ? 'rising' as const : 'falling' as const
  const phaseCrossovers: ExactPhaseCrossover[] = rational.phaseCrossovers.filter(p => p.frequency === 0).map(p => ({ ...p, slope: startSlope }))
  const closestApproaches: ExactAnswer['closestApproaches'] = []
  let lowest = Number.POSITIVE_INFINITY
  let lowestAt = 0
  const edges = [0, ...cuts]
  const endAbove = aboveFloor.length > 0 && aboveFloor[aboveFloor.length - 1]! > 0n
  if (endAbove && period === undefined) open.push('the loop stays above the floor without end')
  const endOfAxis = period === undefined ? Number.POSITIVE_INFINITY : Math.PI / period
  const wholeSamples = period !== undefined && Number.isInteger(deadTime / period)
  const list = (t: number, distance: number, logGain: number, angle: number) => {
    closestApproaches.push({ frequency: frequencyOf(t), distance, gainChange: -DECIBELS * logGain, phaseChange: -wrapDegrees(180 + angle * DEGREES) })
    if (distance < lowest) [lowest, lowestAt] = [distance, frequencyOf(t)]
  }
  let stretchStart: number | null = null
  for (let i = 0; i < edges.length; i += 1) {
    const low = edges[i]!
    const high = edges[i + 1] ?? Number.POSITIVE_INFINITY
    const inside = high === Number.POSITIVE_INFINITY ? Math.max(2 * low, Number.MIN_VALUE) : low + (high - low) / 2
    const above = floorSign(inside) > 0
    if (above && stretchStart === null) stretchStart = low
    if (stretchStart !== null && (!above || high === Number.POSITIVE_INFINITY)) {
      // a stretch that reaches the end of the axis is cut, and its last part searched over 1/t
      const cut = above ? Math.max(low, stretchStart, 1) : low
      if (cut > stretchStart) {
        for (const { t, distance, logGain, angle } of minimaOnAxis(factors, stretchStart, cut, open)) list(t, distance, logGain, angle)
      }
      if (above && period !== undefined) {
        for (const { t, distance, logGain, angle } of minimaOnAxis(overReciprocal(factors), 0, 1 / cut, open, wholeSamples).reverse()) list(1 / t, distance, logGain, -angle)
      }
      stretchStart = null
    }
    if (!above || high === low || (high === Number.POSITIVE_INFINITY && period === undefined)) continue
    const first = angleOnAxis(factors, low, 1) / Math.PI
    const lastComputed = angleOnAxis(factors, high, -1) / Math.PI
    const last = high === Number.POSITIVE_INFINITY && wholeSamples ? Math.round(2 * lastComputed) / 2 : lastComputed
    const startTurns = low === 0 ? Math.round(2 * first) / 2 : first
    for (const turns of [...low === 0 ? [] : [startTurns], ...high === Number.POSITIVE_INFINITY && wholeSamples ? [] : [last]]) {
      const toOdd = Math.abs(turns - 1 - 2 * Math.round((turns - 1) / 2))
      if (toOdd * Math.PI < NEAR * (1 + Math.abs(turns))) open.push(`the angle turns within ${NEAR} rad of the negative real axis near ${frequencyOf(low)}`)
    }
    const rising = last > startTurns
    const odd: number[] = []
    const from = Math.min(startTurns, last)
    const to = Math.max(startTurns, last)
    for (let k = 2 * Math.floor((from - 1) / 2) + 1; k < to; k += 2) if (k > from) odd.push(k)
    if (!rising) odd.reverse()
    for (const k of odd) {
      let a = low
      let b = high
      for (let step = 0; step < 1100 && !(b - a <= 2 ** -52 * b && b < Number.POSITIVE_INFINITY); step += 1) {
        const middle = b === Number.POSITIVE_INFINITY ? Math.max(1, 64 * a) : a > 0 && b / a > 4 ? Math.sqrt(a * b) : a === 0 && b > 1e-300 ? b / 64 : (a + b) / 2
        if ((angleOnAxis(factors, middle) / Math.PI < k) === rising) a = middle
        else b = middle
        if (a === 0 && b < 1e-290) break
      }
      const t = (a + b) / 2
      phaseCrossovers.push({ frequency: frequencyOf(t), gainMargin: -DECIBELS * logGainOnAxis(factors, t), slope: rising ? 'rising' : 'falling' })
    }
  }

  const gainCrossovers = rational.gainCrossovers.map((crossing) => {
    const phaseMargin = wrapDegrees(crossing.phaseMargin - crossing.frequency * deadTime * DEGREES)
    return { ...crossing, phaseMargin, delayMargin: (phaseMargin < 0 ? phaseMargin + 360 : phaseMargin) / DEGREES / crossing.frequency }
  })
  let closedLoopUnstablePoles = rational.closedLoopUnstablePoles
  if (period !== undefined && endLogGain(factors) >= 0) {
    // a root may then cross at z = -1: whole samples are poles at z = 0, other dead times have no count
    const zeros = Array.from({ length: wholeSamples ? deadTime / period : 0 }, (): [number, number] => [0, 0])
    const sum = exactLoop({ ...input, deadTime: 0, poles: [...input.poles, ...zeros] })
    closedLoopUnstablePoles = wholeSamples ? rightHalfPlaneCount(add(sum.numerator, sum.denominator)) : null
  }
  else closedLoopUnstablePoles = addDelayToCount(rational, deadTime)
  if (wholeSamples && endAbove) {
    const turns = Math.round(angleOnAxis(factors, Number.POSITIVE_INFINITY) / (Math.PI / 2)) / 2
    const before = angleOnAxis(factors, 1e9) / Math.PI
    if (Math.abs(turns % 2) === 1 && Number.isFinite(endLogGain(factors))) {
      phaseCrossovers.push({ frequency: endOfAxis, gainMargin: -DECIBELS * endLogGain(factors), slope: before < turns ? 'rising' : 'falling' })
    }
  }
  const start = startDistance(numerator, denominator)
  const endGain = period === undefined ? 0 : Math.exp(endLogGain(factors))
  const endAngle = angleOnAxis(factors, Number.POSITIVE_INFINITY)
  const vectorMargin: ExactAnswer['vectorMargin'] = {
    distance: period === undefined || endGain === 0 ? 1 : endGain === Number.POSITIVE_INFINITY ? endGain : Math.hypot(1 + endGain * Math.cos(endAngle), endGain * Math.sin(endAngle)),
    frequency: period === undefined ? 'infinity' : endOfAxis,
  }
  if (start < vectorMargin.distance) Object.assign(vectorMargin, { distance: start, frequency: 0 })
  if (lowest < vectorMargin.distance) Object.assign(vectorMargin, { distance: lowest, frequency: lowestAt })
  return {
    gainCrossovers, phaseCrossovers, closestApproaches, vectorMargin, closedLoopUnstablePoles,
    openLoopUnstablePoles: rational.openLoopUnstablePoles,
    ties: rational.ties.filter(tie => !tie.startsWith('the slope') && !tie.startsWith('the negative') && !tie.startsWith('L is real') && !tie.startsWith('|1 + L|')),
    open,
  }
}

/** |1 + L(0)|, infinite at a pole. */
function startDistance(numerator: IntegerPolynomial, denominator: IntegerPolynomial): number {
  let n = numerator
  let d = denominator
  while (n[0] === 0n && d[0] === 0n) [n, d] = [n.slice(1), d.slice(1)]
  if (d[0] === 0n) return Number.POSITIVE_INFINITY
  const [sum, unit] = [(n[0] ?? 0n) + d[0]!, d[0]!]
  return Math.abs(Number((sum << 200n) / unit) / 2 ** 200)
}
