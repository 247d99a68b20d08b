import { describeBlockGain } from '#shared/formatting/describeBlockGain'
import { significantDigits } from '#shared/formatting/significantDigits'
import type { Block, BlockDefinition, BlockGain } from '#shared/types/block'
import type { Parameter } from '#shared/types/system'
import type { CompletionName } from './completionsAt'

interface Known {
  blocks: readonly Block[]
  parameters: readonly Parameter[]
  /** gains in the condition looked at, where they could be made out, by block name */
  gains: Readonly<Record<string, BlockGain>>
  conditionId: number | null
}

/** The blocks and parameters of a system as an expression field offers them, with what each is in the condition looked at. */
export function completionNames({ blocks, parameters, gains, conditionId }: Known): CompletionName[] {
  const own = (values: Record<number, BlockDefinition>) => conditionId === null ? undefined : values[conditionId]
  return [
    ...blocks.map(({ name, role, definition, byCondition }): CompletionName => {
      const gain = gains[name] ?? own(byCondition) ?? definition
      const channels = gain === null ? null : channelsOf(gain)
      return { name, kind: 'block', detail: gain === null ? role : `${role}, ${describeBlockGain(gain)}`, ...channels }
    }),
    ...parameters.map(({ name, unit, values }): CompletionName => {
      const value = conditionId === null ? undefined : values[conditionId]
      return { name, kind: 'parameter', detail: value === undefined ? unit : `${significantDigits(value)} ${unit}`.trim() }
    }),
  ]
}

/** The channels of a block that has several, by name or by number from 1. */
function channelsOf(gain: BlockGain | BlockDefinition): { outputs: string[], inputs: string[] } | null {
  if (gain.kind !== 'stateSpace' && gain.kind !== 'modal') return null
  const counted = (names: readonly string[], count: number) => names.length > 0 ? [...names] : Array.from({ length: count }, (_, index) => String(index + 1))
  const [outputCount, inputCount] = gain.kind === 'modal' ? modalCounts(gain) : 'a' in gain ? [gain.c.length, gain.b[0]?.length ?? 0] : [gain.outputs.length, gain.inputs.length]
  return outputCount > 1 || inputCount > 1 ? { outputs: counted(gain.outputs, outputCount), inputs: counted(gain.inputs, inputCount) } : null
}

function modalCounts({ modes, rigid }: Extract<BlockGain, { kind: 'modal' }>): [number, number] {
  const first = modes[0] ?? rigid[0]
  return [first?.gainOut.length ?? 0, first?.gainIn.length ?? 0]
}
