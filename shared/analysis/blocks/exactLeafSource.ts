import type { LoopStructure, StructureNote } from '../../types/analysis'
import { AnalysisInputError } from '../AnalysisInputError'
import type { ExactLoop, FactorOrigin } from '../expressions/ExactLoop'
import { FactorProduct } from '../expressions/FactorProduct'
import type { LeafSource } from './BlockScope'
import { discretise } from '../sampling/discretise'
import { exactAlgebra } from './exactAlgebra'
import { stateSpaceLeaf } from '../stateSpace/stateSpaceLeaf'
import { exactLeaf } from './exactLeaf'
import { takenAsOneNote } from './takenAsOneNote'

/** What an expression uses of a block, in one domain. */
export interface UsedLeaf {
  block: string
  loop: ExactLoop
  sampled: boolean
}

/** The blocks of one loop held exactly, and what became known of them while the loop was built. */
export interface ExactLeafSource extends LeafSource<ExactLoop> {
  used: UsedLeaf[]
  notes: StructureNote[]
  /** Relative error of all leaves that have one; undefined where everything is exact. */
  accuracy: () => LoopStructure['accuracy']
}

/** Leaves of a loop over blocks without a measured one. */
export function exactLeafSource(): ExactLeafSource {
  const used: UsedLeaf[] = []
  const notes: StructureNote[] = []
  const accuracies: (() => NonNullable<LoopStructure['accuracy']>)[] = []
  const equivalents = new Map<string, ExactLoop>()
  return {
    used,
    notes,
    algebra: exactAlgebra((continuous, { name, gain }) => {
      const key = `${name}:${keyOfLoop(continuous)}`
      const known = equivalents.get(key)
      const origin = { blocks: [...new Set([...continuous.denominator.values()].flatMap(factor => factor.origin?.blocks ?? []))], sampled: true }
      const marked = (loop: ExactLoop) => origin.blocks.length > 0 ? from(origin, loop) : loop
      if (known) return marked(known)
      const { loop, accuracy, averaged } = discretise(continuous, gain)
      accuracies.push(() => accuracy)
      if (averaged !== null && !notes.some(note => note.block === name && note.code === 'averaged hold')) notes.push({ block: name, code: 'averaged hold', message: averaged })
      equivalents.set(key, loop)
      return marked(loop)
    }, (factor, some, others) => {
      const note = takenAsOneNote(factor, some, others)
      if (note && !notes.some(({ message }) => message === note.message)) notes.push(note)
    }),
    rational: (block, gain, channel) => {
      const leaf = exactLeaf(gain, channel)
      const loop = leaf && (gain.kind === 'modal' || gain.kind === 'stateSpace') ? workedOut(leaf) : leaf
      if (gain.kind === 'stateSpace') {
        const { notes: hidden, accuracy } = stateSpaceLeaf(gain, channel.output, channel.input)
        notes.push(...hidden.map(note => ({ block, ...note })))
        accuracies.push(accuracy)
      }
      if (!loop) notes.push({ block, code: 'other', message: `Its channel [${channel.output + 1}, ${channel.input + 1}] is zero: products with it are left out of L, and modes of the blocks in them, stable or not, are not in the verdict.` })
      if (!loop) return null
      const sampled = 'sampleTime' in gain && gain.sampleTime !== undefined
      used.push({ block, loop, sampled })
      return from({ blocks: [block], sampled }, loop)
    },
    expression: (block, part) => {
      const { sampled, continuous } = part
      if (sampled) used.push({ block, loop: sampled, sampled: true })
      if (continuous) used.push({ block, loop: continuous, sampled: false })
      return {
        ...part,
        sampled: sampled && from({ blocks: [block], sampled: true }, sampled),
        continuous: continuous && from({ blocks: [block], sampled: false }, continuous),
      }
    },
    measured: () => {
      throw new AnalysisInputError('A measured block makes the loop a measured one.', '')
    },
    accuracy: () => {
      const found = accuracies.map(accuracy => accuracy())
      return found.length === 0
        ? undefined
        : { relative: found.reduce((sum, { relative }) => sum + relative, 0), basis: [...new Set(found.map(({ basis }) => basis))].join('; ') }
    },
  }
}

/** The loop gain with its polynomials as worked out, not typed. */
function workedOut(loop: ExactLoop): ExactLoop {
  return { ...loop, numerator: FactorProduct.asPrecise(loop.numerator), denominator: FactorProduct.asPrecise(loop.denominator) }
}

/** The loop gain with those of its poles that have no origin yet from this one. */
function from(origin: FactorOrigin, loop: ExactLoop): ExactLoop {
  return { ...loop, denominator: FactorProduct.from(origin, loop.denominator), inverted: FactorProduct.from(origin, loop.inverted) }
}

/** A loop gain without sums, written out. */
function keyOfLoop({ scale, delay, numerator, inverted, denominator }: ExactLoop): string {
  const fraction = ({ numerator: top, denominator: bottom }: ExactLoop['scale']) => `${top}/${bottom}`
  const product = (factors: ExactLoop['numerator']) => Array.from(factors, ([key, { power }]) => `(${key})^${power}`).sort().join('')
  return [fraction(scale), fraction(delay), product(numerator), product(inverted), product(denominator)].join(';')
}
