import type { ExpressionInput } from '../../types/analysis'
import type { BlockGain } from '../../types/block'
import { orderBlocks } from '../blocks/orderBlocks'
import { usesInText, type BlockUse } from './blockUses'

/**
 * A loop in which some channels of blocks have another gain: wherever such a channel is written, a block of its own stands in its place.
 */
export function replaceUses(input: ExpressionInput, replaced: readonly { use: BlockUse, gain: BlockGain }[]): ExpressionInput {
  const blocks: Record<string, BlockGain> = { ...input.blocks }
  const names = new Map<string, string>()
  for (const { use, gain } of replaced) {
    const name = freeName(use, { ...blocks, ...input.parameters })
    names.set(keyOf(use), name)
    blocks[name] = gain
  }
  const rewrite = (text: string) => usesInText(text, input).reverse().reduce((written, use) => {
    const name = names.get(keyOf(use))
    return name === undefined ? written : written.slice(0, use.from) + name + written.slice(use.to)
  }, text)
  for (const name of orderBlocks(input.expression, input.blocks ?? {})) {
    const gain = blocks[name]!
    if (gain.kind === 'expression') blocks[name] = { ...gain, expression: rewrite(gain.expression) }
  }
  return { ...input, expression: rewrite(input.expression), blocks }
}

const keyOf = ({ block, channel }: BlockUse) => `${block} ${channel.output} ${channel.input}`

function freeName({ block, channel }: BlockUse, taken: Readonly<Record<string, unknown>>): string {
  let name = `${block}_${channel.output + 1}_${channel.input + 1}_moved`
  while (Object.hasOwn(taken, name)) name += '_'
  return name
}
