import type { BlockGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import type { BlockChannel } from '../expressions/ExpressionNode'
import { nearestName } from '../expressions/nearestName'

/** A channel of a block by its numbers, from 0. */
export interface ChannelNumbers {
  output: number
  input: number
}

/** How many outputs and inputs a block has, and their names where they are named. */
export function channelsOfBlock(gain: BlockGain): { outputs: number, inputs: number, outputNames: readonly string[], inputNames: readonly string[] } {
  switch (gain.kind) {
    case 'stateSpace': return { outputs: gain.c.length, inputs: gain.b[0]?.length ?? gain.d[0]?.length ?? 0, outputNames: gain.outputs, inputNames: gain.inputs }
    case 'modal': {
      const entry = gain.modes[0] ?? gain.rigid[0]
      return { outputs: entry?.gainOut.length ?? 0, inputs: entry?.gainIn.length ?? 0, outputNames: gain.outputs, inputNames: gain.inputs }
    }
    default: return { outputs: 1, inputs: 1, outputNames: [], inputNames: [] }
  }
}

/**
 * The channel that an expression means.
 *
 * @throws AnalysisInputError with path 'expression' and the position given, for a channel that does not exist and for a block with several that is written without
 */
export function channelOfBlock(name: string, gain: BlockGain, channel: BlockChannel | null, position: number): ChannelNumbers {
  const { outputs, inputs, outputNames, inputNames } = channelsOfBlock(gain)
  if (!channel) {
    if (outputs === 1 && inputs === 1) return { output: 0, input: 0 }
    throw new AnalysisInputError(`The block ${name} has ${count(outputs, 'output')} and ${count(inputs, 'input')}: write ${name}[output, input], as in ${name}[1, 1].`, 'expression', position)
  }
  return {
    output: numberOf(channel.output, outputNames, outputs, 'output', name, position),
    input: numberOf(channel.input, inputNames, inputs, 'input', name, position),
  }
}

function numberOf(text: string, names: readonly string[], total: number, what: 'output' | 'input', block: string, position: number): number {
  const named = names.indexOf(text)
  if (named >= 0) return named
  if (/^\d+$/.test(text)) {
    const number = Number(text)
    if (number >= 1 && number <= total) return number - 1
    throw new AnalysisInputError(`The block ${block} has no ${what} ${text}: it has ${count(total, what)}, counted from 1.`, 'expression', position)
  }
  const near = nearestName(text, names)
  throw new AnalysisInputError(
    `The block ${block} has no ${what} "${text.slice(0, 60)}"${names.length === 0 ? `: its ${what}s have no names, write their numbers from 1` : `: it has ${names.join(', ')}`}.${near === null ? '' : ` Is "${near}" meant?`}`, 'expression', position)
}

const count = (number: number, what: string) => `${number} ${what}${number === 1 ? '' : 's'}`
