import type { LoopInput } from '../../types/analysis'
import { describeOpenLoopPole, type PlanePole } from './describeOpenLoopPole'
import { isSamePole, polesOfBlocks, type BlockPole } from './polesOfBlocks'

/** Within this (relative) a flexible mode of a block is told beside the pole that an inner closed loop made of it. */
const NEAR = 0.1
const FLEXIBLE = 0.2

/**
 * Words for a pole of the loop gain, by the block and mode it comes from where the loop is built of blocks: 'bending 1 of G (12.3 rad/s, damping 0.02)',
 * 'integrator of C', 'pole at 12.3 rad/s, damping 0.02, nearest mode bending 1 of G' behind an inner closed loop.
 */
export function nameOpenLoopPoles(input: LoopInput, sampleTime: number | undefined): (pole: PlanePole) => string {
  const unit = input.frequencyUnit ?? 'rad/s'
  const known = 'expression' in input && input.blocks ? polesOfBlocks(input, sampleTime) : []
  return (pole) => {
    const plain = describeOpenLoopPole(pole, unit)
    const own = known.filter(candidate => isSamePole(candidate, pole))
    if (own.length === 0) return `${plain}${nearestMode(known, pole)}`
    const mode = own.find(candidate => candidate.mode !== null)
    if (mode && own.length === 1) return `${mode.mode} of ${mode.block} (${plain.replace(/^pole at /, '')})`
    const blocks = [...new Set(own.map(({ block }) => block))].join(' and ')
    return plain.includes(' at ') ? plain.replace(' at ', ` of ${blocks} at `) : `${plain} of ${blocks}`
  }
}

function nearestMode(known: BlockPole[], pole: PlanePole): string {
  if (!isFlexible(pole)) return ''
  const near = known.filter(candidate => isFlexible(candidate) && isSamePole(candidate, pole, NEAR))
  const [only] = near
  return near.length === 1 ? `, nearest ${only!.mode === null ? 'pole' : `mode ${only!.mode}`} of ${only!.block}` : ''
}

const isFlexible = ({ re, im }: PlanePole) => im !== 0 && Math.abs(re) < FLEXIBLE * Math.hypot(re, im)
