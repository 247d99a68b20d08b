import type { ExpressionInput } from '../../types/analysis'
import type { BlockGain, BlockRole, ModalGain } from '../../types/block'
import { orderBlocks } from '../blocks/orderBlocks'
import { blockUses, type BlockUse } from './blockUses'
import { placeInWords } from './describeOpenLoopPole'
import { factorsOfReference } from './factorsOfReference'
import { isSamePole } from './polesOfBlocks'
import { replaceUses } from './replaceUses'
import { shiftPolePair } from './shiftPolePair'

/** A pole pair of less damping than this is a flexible mode. */
const FLEXIBLE = 0.2
const TWO_PI = 2 * Math.PI
const FLEXIBLE_ROLES: readonly BlockRole[] = ['plant', 'actuator', 'sensor']

export interface FlexibleMode {
  block: string
  mode: string
  /** rad/s, undamped */
  frequency: number
  damping: number
  /** the loop with this mode's frequency times 1 + change; null where its poles are not simple */
  moved: (change: number) => ExpressionInput | null
}

/**
 * The flexible modes of a loop: pole pairs of damping below 0.2 in blocks of role plant, actuator or sensor, each with what the loop is when it moves.
 * Poles of filters, notches above all, are none. `notes` tells of blocks whose modes cannot be moved and of what stands for a block.
 */
export function flexibleModes(input: ExpressionInput, roles: Readonly<Record<string, BlockRole>>): { modes: FlexibleMode[], notes: string[] } {
  const blocks = input.blocks ?? {}
  const uses = blockUses(input)
  const modes: FlexibleMode[] = []
  const notes: string[] = []
  for (const name of orderBlocks(input.expression, blocks)) {
    const role = Object.hasOwn(roles, name) ? roles[name]! : 'other'
    if (!FLEXIBLE_ROLES.includes(role)) continue
    const gain = blocks[name]!
    const own = uses.filter(({ block }) => block === name)
    if (gain.kind === 'modal') modes.push(...modesOfTable(input, name, gain, own))
    else if (gain.kind === 'measured') notes.push(`${name} is measured: its modes are not moved.`)
    else if ('sampleTime' in gain && gain.sampleTime !== undefined) {
      if (gain.kind !== 'hold') notes.push(`${name} is given in z: its modes are not moved, their continuous form is not known.`)
    }
    else if (gain.kind !== 'deadTime' && gain.kind !== 'hold') {
      const found = modesOfFactors(input, name, gain, own, modes)
      modes.push(...found)
      if (found.length > 0) {
        notes.push(`${name} (${words[gain.kind]}): where one of its modes moves it is taken by zeros, poles and gain, the mode's part with the residues it has and its frequency changed, the rest as it is.`)
      }
    }
  }
  return { modes, notes }
}

const words: Record<Exclude<BlockGain['kind'], 'modal' | 'measured' | 'hold' | 'deadTime'>, string> = {
  expression: 'an expression', coefficients: 'coefficients', zerosPoles: 'zeros, poles and gain', stateSpace: 'state space', sections: 'second-order sections',
}

/** Modes of a modal table that act in a channel used: the table is changed in place. */
function modesOfTable(input: ExpressionInput, block: string, gain: ModalGain, uses: BlockUse[]): FlexibleMode[] {
  const unit = gain.frequencyUnit === 'Hz' ? TWO_PI : 1
  return gain.modes.flatMap((mode, index): FlexibleMode[] => {
    const acts = uses.some(({ channel }) => mode.gainIn[channel.input] !== 0 && mode.gainOut[channel.output] !== 0)
    if (!(mode.damping < FLEXIBLE) || !acts) return []
    return [{
      block,
      mode: mode.name.trim() || `mode ${index + 1}`,
      frequency: mode.frequency * unit,
      damping: mode.damping,
      moved: (change) => {
        const modes = gain.modes.map((entry, k) => k === index ? { ...entry, frequency: entry.frequency * (1 + change) } : entry)
        return { ...input, blocks: { ...input.blocks, [block]: { ...gain, modes } } }
      },
    }]
  })
}

/** Modes of a block of another kind, found among the poles of the channels used; those of the blocks that it names aside. */
function modesOfFactors(input: ExpressionInput, block: string, gain: BlockGain, uses: BlockUse[], known: readonly FlexibleMode[]): FlexibleMode[] {
  const inner = new Set(gain.kind === 'expression' ? orderBlocks(gain.expression, input.blocks ?? {}) : [])
  const channels = uses.flatMap((use) => {
    const loop = factorsOfReference(input, use.reference, undefined)
    return loop === null || loop.sampleTime !== undefined ? [] : [{ use, loop }]
  })
  const found: { re: number, im: number, atOriginOfZ: boolean }[] = []
  for (const { loop: { zeros, poles } } of channels) {
    // A mode that a zero of its channel cancels has no part in it.
    const acts = (pole: { re: number, im: number }) => zeros.re.every((re, j) => re !== pole.re || zeros.im[j] !== pole.im)
    for (let k = 0; k < poles.re.length; k++) {
      const pole = { re: poles.re[k]!, im: poles.im[k]!, atOriginOfZ: false }
      if (!(pole.im > 0) || !(-pole.re < FLEXIBLE * Math.hypot(pole.re, pole.im)) || !acts(pole) || found.some(other => isSamePole(other, pole))) continue
      const ofInner = known.some(mode => inner.has(mode.block) && isSamePole(planeOf(mode), pole))
      if (!ofInner) found.push(pole)
    }
  }
  return found.map((pole): FlexibleMode => {
    const frequency = Math.hypot(pole.re, pole.im)
    return {
      block,
      mode: `mode at ${placeInWords(frequency, input.frequencyUnit ?? 'rad/s')}`,
      frequency,
      damping: -pole.re / frequency + 0,
      moved: (change) => {
        const replaced = channels.map(({ use, loop }) => {
          const index = loop.poles.re.findIndex((re, k) => loop.poles.im[k]! > 0 && isSamePole({ re, im: loop.poles.im[k]!, atOriginOfZ: false }, pole))
          return index < 0 ? undefined : { use, gain: shiftPolePair(loop, index, change) }
        }).filter(entry => entry !== undefined)
        return replaced.some(entry => entry.gain === null) ? null : replaceUses(input, replaced.map(entry => ({ use: entry.use, gain: entry.gain! })))
      },
    }
  })
}

const planeOf = ({ frequency, damping }: FlexibleMode) =>
  ({ re: -damping * frequency, im: frequency * Math.sqrt(Math.max(0, 1 - damping * damping)), atOriginOfZ: false })
