import { Rational } from '../../numeric/extended/Rational'
import type { ExpressionInput } from '../../types/analysis'
import type { BlockGain, DeadTimeGain, ExpressionGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import type { BlockChannel, ExpressionNode } from '../expressions/ExpressionNode'
import { parseExpression } from '../expressions/parseExpression'
import { atBlock } from './atBlock'
import { channelOfBlock, type ChannelNumbers } from './channelOfBlock'
import { commonSampleTime } from './commonSampleTime'
import { evaluateTree, type TreeScope } from './evaluateTree'
import { improper, type RationalGain } from './exactLeaf'
import type { LoopAlgebra } from './LoopAlgebra'
import type { LoopPart } from './LoopPart'
import { orderBlocks } from './orderBlocks'
import { PartArithmetic } from './PartArithmetic'

/** How the leaves of a loop are held in one algebra. */
export interface LeafSource<V> {
  algebra: LoopAlgebra<V>
  /** One channel of a rational block; null where it is zero. */
  rational: (name: string, gain: RationalGain, channel: ChannelNumbers) => V | null
  /** Told of each expression block that is needed; answers it as what refers to it takes it. */
  expression: (name: string, part: LoopPart<V>) => LoopPart<V>
  /** A measured block, which stands beside parts of either domain. */
  measured: (name: string) => V
}

/**
 * A loop's expression with all that its names stand for, evaluated in one algebra: its blocks in the order in which they need one another, each
 * fault at the place of the block where it is.
 *
 * @throws AnalysisInputError for blocks in a circle, several rates, an expression that cannot be read
 */
export class BlockScope<V> {
  readonly tree: ExpressionNode
  /** s; undefined for a continuous loop */
  readonly sampleTime: number | undefined
  readonly needed: readonly string[]
  readonly arithmetic: PartArithmetic<V>
  private readonly blocks: Readonly<Record<string, BlockGain>>
  private readonly scope: TreeScope<V>
  private readonly parts = new Map<string, LoopPart<V> | null>()

  constructor(input: ExpressionInput, private readonly leaves: LeafSource<V>) {
    this.blocks = input.blocks ?? {}
    const parameters = input.parameters ?? {}
    const names = {
      variable: input.sampleTime === undefined ? 's' as const : 'z' as const,
      parameterNames: Object.keys(parameters),
      ...input.blocks && { blocks: input.blocks },
    }
    this.tree = parseExpression(input.expression, names)
    this.needed = orderBlocks(input.expression, this.blocks)
    this.sampleTime = commonSampleTime(input.sampleTime, this.needed, this.blocks)
    const { algebra } = leaves
    this.arithmetic = new PartArithmetic(algebra, this.sampleTime, input.blocks !== undefined)
    this.scope = { algebra, arithmetic: this.arithmetic, parameters, sampleTime: this.sampleTime, block: (name, channel, position) => this.partOf(name, channel, position) }
    for (const name of this.needed) {
      const gain = this.blocks[name]!
      if (gain.kind === 'expression') atBlock(name, () => this.parts.set(name, this.expressionBlock(name, gain, names)))
    }
  }

  /** The whole expression; null where it is zero. */
  evaluate(tree: ExpressionNode = this.tree): LoopPart<V> | null {
    return evaluateTree(tree, this.scope)
  }

  /** Why an expression that is zero is refused, with the blocks that are. */
  zero(): AnalysisInputError {
    const names = [...this.parts].filter(([, part]) => part === null).map(([name]) => name.replace('[', ' in its channel [').replace(/\d+/g, number => `${Number(number) + 1}`))
    const because = names.length === 0 ? '' : ` What is zero: the block ${names.join(', the block ')}.`
    return new AnalysisInputError(`The expression is zero: a loop gain of zero has no crossings to find.${because}`, 'expression', this.tree.position)
  }

  private expressionBlock(name: string, gain: ExpressionGain, names: Parameters<typeof parseExpression>[1]): LoopPart<V> | null {
    const tree = parseExpression(gain.expression, names)
    const part = this.arithmetic.brackets(evaluateTree(tree, this.scope))
    for (const [value, sampled] of [[part?.sampled, true], [part?.continuous, false]] as const) {
      if (value && (this.leaves.algebra.excess(value) ?? 0) > 0) throw new AnalysisInputError(improper(sampled), 'expression', tree.kind === 'divide' ? tree.left.position : tree.position)
    }
    return part && this.leaves.expression(name, part)
  }

  private partOf(name: string, channel: BlockChannel | null, position: number): LoopPart<V> | null {
    const gain = this.blocks[name]!
    const numbers = channelOfBlock(name, gain, channel, position)
    const key = `${name}[${numbers.output},${numbers.input}]`
    if (gain.kind === 'expression') return this.parts.get(name) ?? null
    const known = this.parts.get(key)
    if (known !== undefined) return known
    const part = atBlock(name, () => this.leaf(name, gain, numbers))
    this.parts.set(key, part)
    return part
  }

  private leaf(name: string, gain: Exclude<BlockGain, ExpressionGain>, channel: ChannelNumbers): LoopPart<V> | null {
    const { arithmetic, leaves } = this
    switch (gain.kind) {
      case 'deadTime': return arithmetic.deadTime(this.delayOf(gain))
      case 'hold': return arithmetic.hold({ name, gain })
      case 'measured': return arithmetic.measured(leaves.measured(name))
      default: {
        const value = leaves.rational(name, gain, channel)
        if (value === null) return null
        const sampled = 'sampleTime' in gain && gain.sampleTime !== undefined
        const delay = 'deadTime' in gain ? Rational.fromDouble(gain.deadTime ?? 0) : Rational.zero
        return { ...sampled ? arithmetic.sampled(value) : arithmetic.continuous(value), delay }
      }
    }
  }

  private delayOf({ deadTime, unit }: DeadTimeGain): Rational {
    const time = Rational.fromDouble(deadTime)
    if (unit === 's') return time
    if (this.sampleTime === undefined) {
      throw new AnalysisInputError('Its dead time is in samples, but the loop has none: no sampled block and no hold stands in it. Give the dead time in seconds.', 'unit')
    }
    return time.times(Rational.fromDouble(this.sampleTime))
  }
}
