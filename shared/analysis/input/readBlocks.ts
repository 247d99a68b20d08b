import type { BlockGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import { atBlock } from '../blocks/atBlock'
import { inputLimits } from './inputLimits'
import { readBlockGain } from './readBlockGain'
import { readRecord } from './readRecord'

/** Names that have their own meaning in an expression; i and j would be read as the imaginary unit. */
const reserved = ['s', 'z', 'exp', 'pi', 'i', 'j']

/**
 * The blocks of a loop by name, each checked by itself, whether the expression needs it or not.
 *
 * @throws AnalysisInputError naming the field (`blocks.G.poles[3]`), for names that are none or stand for a parameter too, and beyond the limits
 */
export function readBlocks(value: unknown, parameterNames: readonly string[]): Record<string, BlockGain> {
  const entries = Object.entries(readRecord(value, 'blocks', 'blocks'))
  if (entries.length > inputLimits.blocks) {
    throw new AnalysisInputError(`blocks holds ${entries.length} names; at most ${inputLimits.blocks} are read.`, 'blocks')
  }
  let characters = 0
  return Object.fromEntries(entries.map(([name, entry]) => {
    checkName(name, parameterNames)
    const gain = atBlock(name, () => readBlockGain(entry))
    characters += gain.kind === 'expression' ? gain.expression.length : 0
    if (characters > inputLimits.blockExpressionsLength) {
      throw new AnalysisInputError(`The expressions of the blocks have more than ${inputLimits.blockExpressionsLength} characters together.`, `blocks.${name}.expression`)
    }
    return [name, gain]
  }))
}

function checkName(name: string, parameterNames: readonly string[]): void {
  const path = `blocks.${name.slice(0, 60)}`
  if (name.length > inputLimits.blockNameLength) {
    throw new AnalysisInputError(`The name of a block has ${name.length} characters; at most ${inputLimits.blockNameLength} are read.`, path)
  }
  if (!/^[a-z_]\w*$/i.test(name) || name === '__proto__') {
    throw new AnalysisInputError(`"${name.slice(0, 60)}" cannot name a block: use letters, digits and _, a letter first.`, path)
  }
  if (reserved.includes(name)) throw new AnalysisInputError(`"${name}" cannot name a block: it has its own meaning in an expression.`, path)
  if (parameterNames.includes(name)) throw new AnalysisInputError(`"${name}" names both a block and a parameter: give one of them another name.`, path)
}
