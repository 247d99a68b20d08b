import type { BlockDefinition, HoldKind } from '#shared/types/block'
import { timeAsTyped } from './timeAsTyped'

const counted = (count: number, one: string, several = `${one}s`) => `${count} ${count === 1 ? one : several}`
const holds: Record<HoldKind, string> = { zeroOrder: 'zero order', pwmSingleUpdate: 'PWM, one update a period', pwmDoubleUpdate: 'PWM, two updates a period' }

/** What the gain of a block looks like, in a few words: '20 modes, 2 in, 1 out', 'in z at 20 us', the expression. */
export function blockInShort(definition: BlockDefinition): string {
  const timed = (sampleTime: number | undefined) => sampleTime === undefined ? 'in s' : `in z at ${timeAsTyped(sampleTime)}`
  switch (definition.kind) {
    case 'expression': {
      const text = definition.expression.replace(/\s+/g, ' ').trim()
      return `${text.length > 60 ? `${text.slice(0, 59)}…` : text}${definition.sampleTime === undefined ? '' : `, ${timed(definition.sampleTime)}`}`
    }
    case 'coefficients':
      return [`order ${Math.max(0, definition.numerator.length - 1)} over ${Math.max(0, definition.denominator.length - 1)}`, timed(definition.sampleTime), delayed(definition.deadTime)].filter(Boolean).join(', ')
    case 'zerosPoles':
      return [counted(definition.zeros.length, 'zero'), counted(definition.poles.length, 'pole'), timed(definition.sampleTime), delayed(definition.deadTime)].filter(Boolean).join(', ')
    case 'stateSpace':
      return [definition.set === null ? 'matrices of a file' : `matrices '${definition.set}' of a file`, channels(definition.inputs.length, definition.outputs.length), definition.sampleTime === undefined ? '' : timed(definition.sampleTime)].filter(Boolean).join(', ')
    case 'sections':
      return `${counted(definition.rows.length, 'section')} ${timed(definition.sampleTime)}`
    case 'modal':
      return [counted(definition.modes.length, 'mode'), definition.rigid.length === 0 ? '' : counted(definition.rigid.length, 'rigid term'), channels(gainsOf(definition, 'gainIn'), gainsOf(definition, 'gainOut'))].filter(Boolean).join(', ')
    case 'measured':
      return definition.averages === undefined ? 'sweep from a file' : `sweep from a file, ${definition.averages} averages`
    case 'deadTime':
      return definition.unit === 's' ? timeAsTyped(definition.deadTime) : counted(definition.deadTime, 'sample')
    case 'hold':
      return `${holds[definition.hold]} at ${timeAsTyped(definition.sampleTime)}`
  }
}

const delayed = (deadTime: number | undefined) => deadTime === undefined || deadTime === 0 ? '' : `${timeAsTyped(deadTime)} of dead time`
const channels = (inputs: number, outputs: number) => inputs === 0 && outputs === 0 ? '' : `${Math.max(1, inputs)} in, ${Math.max(1, outputs)} out`

function gainsOf({ modes, rigid }: Extract<BlockDefinition, { kind: 'modal' }>, side: 'gainIn' | 'gainOut'): number {
  return (modes[0] ?? rigid[0])?.[side].length ?? 0
}
