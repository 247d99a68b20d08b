import { readMatrices } from '#shared/importers/readMatrices'
import { blockGainFromDefinition } from '#shared/sources/blockGainFromDefinition'
import type { BlockGain } from '#shared/types/block'
import type { DemoSystem } from './DemoSystem'

/** The gains of all blocks of the demo's system as the engine takes them, in the condition of this index, at these values of its parameters. */
export function gainsIn(demo: DemoSystem, index: number, values: Record<string, number>): Record<string, BlockGain> {
  const code = demo.conditions[index]?.code ?? ''
  return Object.fromEntries(demo.blocks.map(({ name, gain, file }) => {
    const definition = typeof gain === 'function' ? gain({ code, index, values, uploadId: 0 }) : gain
    const sets = file === undefined ? [] : readMatrices(file.text).sets
    return [name, blockGainFromDefinition(definition, { frequencyUnit: demo.frequencyUnit, sets })]
  }))
}
