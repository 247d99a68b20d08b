import { AnalysisInputError } from '../AnalysisInputError'
import type { ComplexPair } from '../../types/analysis'
import { complexRefusal } from './complexRefusal'
import { describeValue } from './describeValue'
import { conjugateTolerance, inputLimits } from './inputLimits'
import { readNumber } from './readNumber'
import { readTiming, type Timing } from './readTiming'

export interface ZerosPoles extends Timing {
  zeros: ComplexPair[]
  poles: ComplexPair[]
  gain: number
}

/**
 * Zeros and poles (rad/s, or plain numbers in z) and gain of a loop. Complex roots must come in conjugate pairs, each
 * partner within 1e-9 of its distance from 0; the numbers themselves are passed on as given.
 * @throws AnalysisInputError for anything else, for more than the limit of roots, and for a loop in s with dead time that
 * has more zeros than poles.
 */
export function readZerosPoles(record: Record<string, unknown>): ZerosPoles {
  const zeros = readRoots(record.zeros, 'zeros')
  const poles = readRoots(record.poles, 'poles')
  const gain = readNumber(record.gain, 'gain')
  const timing = readTiming(record)
  if (timing.sampleTime === undefined && (timing.deadTime ?? 0) > 0 && zeros.length > poles.length) {
    throw new AnalysisInputError(
      `The loop is improper: it has ${zeros.length} zeros and ${poles.length} poles. `
      + 'With dead time such a loop has no stable closed loop; add the poles it really has.', 'zeros')
  }
  return { zeros, poles, gain, ...timing }
}

function readRoots(value: unknown, path: string): ComplexPair[] {
  if (!Array.isArray(value)) throw new AnalysisInputError(`${path} must be a list of roots [re, im], not ${describeValue(value)}.`, path)
  if (value.length > inputLimits.order) {
    throw new AnalysisInputError(`${path} has ${value.length} roots; at most ${inputLimits.order} are analysed.`, path)
  }
  const roots = value.map((entry, index): ComplexPair => {
    const here = `${path}[${index}]`
    if (!Array.isArray(entry) || entry.length !== 2) {
      throw new AnalysisInputError(`${here} must be a root written [re, im], not ${describeValue(entry)}. A real root is [re, 0].`, here)
    }
    return [readNumber(entry[0], `${here}[0]`), readNumber(entry[1], `${here}[1]`)]
  })
  refuseUnpairedRoots(roots, path)
  return roots
}

/** Each root above the real axis takes the nearest free partner below it. */
function refuseUnpairedRoots(roots: ComplexPair[], path: string): void {
  const free = new Set([...roots.keys()].filter(index => roots[index]![1] < 0))
  roots.forEach(([re, im], index) => {
    if (im <= 0) return
    let partner = -1
    let nearest = conjugateTolerance * Math.hypot(re, im)
    for (const other of free) {
      const distance = Math.hypot(roots[other]![0] - re, roots[other]![1] + im)
      if (distance <= nearest) [partner, nearest] = [other, distance]
    }
    if (partner < 0) throw unpaired(index, roots[index]!, path)
    free.delete(partner)
  })
  const left = free.values().next()
  if (!left.done) throw unpaired(left.value, roots[left.value]!, path)
}

function unpaired(index: number, [re, im]: ComplexPair, path: string): AnalysisInputError {
  return new AnalysisInputError(
    `${path}[${index}] = [${re}, ${im}] has no conjugate partner: complex roots come in pairs, so [${re}, ${-im}] must be in the list too. ${complexRefusal}`, `${path}[${index}]`)
}
