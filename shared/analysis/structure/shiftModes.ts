import type { ExpressionInput, LoopInput } from '../../types/analysis'
import type { BlockRole } from '../../types/block'
import type { MarginsThere, ModeShift, ModeShiftTable } from '../../types/structure'
import { AnalysisInputError } from '../AnalysisInputError'
import { analyseLoop } from '../analyseLoop'
import { prepareLoopGain } from '../prepareLoopGain'
import { flexibleModes, type FlexibleMode } from './flexibleModes'

const CHANGES = [-0.2, -0.1, 0.1, 0.2] as const
const MOST_MODES = 20
const TWO_PI = 2 * Math.PI

/**
 * The margins of a loop when each of its flexible modes is moved by -20, -10, +10 and +20 % of its frequency, everything else, the notches above all,
 * left where it is. A flexible mode is a pole pair of damping below 0.2 in a block of role plant, actuator or sensor; the mode keeps its damping and the
 * gains it has in the table, or the residues' part (alpha s + beta)/(s^2 + 2 zeta w s + w^2) with the same alpha and beta. Of more than 20 modes those of
 * the highest |L| at the mode over its damping are moved. Continuous blocks behind a hold are moved before they are discretised.
 */
export function shiftModes(input: LoopInput, roles: Readonly<Record<string, BlockRole>>): ModeShiftTable {
  const frequencyUnit = input.frequencyUnit ?? 'rad/s'
  const nominal = marginsOf(() => input)
  const without = (reason: string, notes: string[] = []): ModeShiftTable => ({ frequencyUnit, nominal, modes: [], reason, notes })
  if (!('expression' in input) || Object.keys(input.blocks ?? {}).length === 0) {
    return without('The loop gain is not built from blocks: its flexible modes cannot be told from its notches.')
  }
  if (nominal.failure !== null) return without('The loop cannot be analysed.')
  const { modes, notes } = flexibleModes(input, roles)
  if (modes.length === 0) return without('No block of role plant, actuator or sensor has a mode of damping below 0.2.', notes)
  const chosen = modes.length > MOST_MODES ? mostFelt(input, modes) : modes
  if (chosen.length < modes.length) notes.push(`${modes.length - chosen.length} of ${modes.length} modes are left out, those felt least in the loop gain.`)
  const unit = frequencyUnit === 'Hz' ? TWO_PI : 1
  return {
    frequencyUnit,
    nominal,
    modes: [...chosen].sort((a, b) => a.frequency - b.frequency).map(mode => ({
      block: mode.block, mode: mode.mode, frequency: mode.frequency / unit, damping: mode.damping,
      shifts: CHANGES.map((change): ModeShift => ({ change, ...marginsOf(() => mode.moved(change)) })),
    })),
    reason: null,
    notes,
  }
}

function marginsOf(loop: () => LoopInput | null): MarginsThere {
  const failed = (failure: string): MarginsThere => ({ verdict: 'undetermined', summary: null, vectorMargin: null, failure })
  try {
    const input = loop()
    if (input === null) return failed('The poles of this mode lie together with others: its part cannot be told from theirs.')
    const { stability, summary, vectorMargin } = analyseLoop(input)
    return { verdict: stability.verdict, summary, vectorMargin, failure: null }
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return failed(error.message)
    if (error instanceof RangeError) return failed('The zeros of the block with this mode moved lie closer together than numbers can hold.')
    throw error
  }
}

/** The modes with the largest |L| at their frequency over their damping. */
function mostFelt(input: ExpressionInput, modes: FlexibleMode[]): FlexibleMode[] {
  const gain = prepareLoopGain(input)
  const value = new Float64Array(2)
  const felt = ({ frequency, damping }: FlexibleMode) => {
    const w = folded(frequency, gain.axisEnd)
    // On an undamped pole the loop gain has no value: nothing is felt more.
    return damping > 0 && gain.evaluate(w, value) ? Math.hypot(value[0]!, value[1]!) / damping : Infinity
  }
  return modes.map(mode => ({ mode, felt: felt(mode) })).sort((a, b) => b.felt - a.felt).slice(0, MOST_MODES).map(({ mode }) => mode)
}

/** Where a frequency lies on the axis of a sampled loop. */
function folded(w: number, axisEnd: number): number {
  if (!Number.isFinite(axisEnd)) return w
  const rest = w % (2 * axisEnd)
  return rest > axisEnd ? 2 * axisEnd - rest : rest
}
