import type { ExpressionInput } from '../../types/analysis'
import { channelOfBlock, type ChannelNumbers } from '../blocks/channelOfBlock'
import { orderBlocks } from '../blocks/orderBlocks'
import { namesInExpression } from '../expressions/namesInExpression'

/** One channel of a block that a loop uses. */
export interface BlockUse {
  block: string
  channel: ChannelNumbers
  /** as it is written in an expression: 'G', 'G[1, 2]' */
  reference: string
}

/** A name at a place of an expression, with its channel in brackets where it has one. */
export interface WrittenUse extends BlockUse {
  from: number
  to: number
}

const CHANNEL = /\s*\[([^\],]*),([^\]]*)\]/y

/**
 * The channels of blocks that a loop uses, each once, its blocks' own expressions included, those that need no others first.
 *
 * @throws AnalysisInputError for blocks in a circle and for channels that do not exist
 */
export function blockUses(input: ExpressionInput): BlockUse[] {
  const blocks = input.blocks ?? {}
  const needed = orderBlocks(input.expression, blocks)
  const texts = [input.expression, ...needed.flatMap((name) => {
    const gain = blocks[name]!
    return gain.kind === 'expression' ? [gain.expression] : []
  })]
  const found = new Map<string, BlockUse>()
  for (const { block, channel, reference } of texts.flatMap(text => usesInText(text, input))) {
    found.set(`${block} ${channel.output} ${channel.input}`, { block, channel, reference })
  }
  return needed.flatMap(name => [...found.values()].filter(({ block }) => block === name))
}

/** The blocks named in one expression, in the order they stand there. */
export function usesInText(text: string, input: ExpressionInput): WrittenUse[] {
  const blocks = input.blocks ?? {}
  return namesInExpression(text).flatMap(({ name, position }) => {
    if (!Object.hasOwn(blocks, name)) return []
    CHANNEL.lastIndex = position + name.length
    const written = CHANNEL.exec(text)
    const channel = channelOfBlock(name, blocks[name]!, written && { output: written[1]!.trim(), input: written[2]!.trim() }, position)
    const to = position + name.length + (written?.[0].length ?? 0)
    return [{ block: name, channel, reference: text.slice(position, to), from: position, to }]
  })
}
