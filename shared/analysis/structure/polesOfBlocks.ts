import type { ExpressionInput } from '../../types/analysis'
import type { ModalGain } from '../../types/block'
import { orderBlocks } from '../blocks/orderBlocks'
import { blockUses } from './blockUses'
import type { PlanePole } from './describeOpenLoopPole'
import { factorsOfReference } from './factorsOfReference'
import { poleInPlane } from './poleInPlane'

/** Poles that agree to this (relative) are one: of two channels, before and after a discrete equivalent. */
export const SAME_POLE = 1e-7

/** A pole that a block brings into its loop, one of each conjugate pair. */
export interface BlockPole extends PlanePole {
  block: string
  /** its name in a modal table */
  mode: string | null
}

/**
 * The poles of each block of a loop in the plane of s of that loop (a continuous pole behind a hold folded below half the sampling frequency). A block
 * that is an expression over others has only those that are not theirs.
 */
export function polesOfBlocks(input: ExpressionInput, sampleTime: number | undefined): BlockPole[] {
  const blocks = input.blocks ?? {}
  const found: BlockPole[] = []
  for (const { block, reference } of blockUses(input)) {
    const gain = blocks[block]!
    const loop = factorsOfReference(input, reference, sampleTime)
    if (loop === null) continue
    const inner = gain.kind === 'expression' ? new Set(orderBlocks(gain.expression, blocks)) : new Set<string>()
    for (let k = 0; k < loop.poles.re.length; k++) {
      const [re, im] = [loop.poles.re[k]!, loop.poles.im[k]!]
      if (im < 0) continue
      const place = placeInLoop(re, im, loop.sampleTime, sampleTime)
      const known = found.some(pole => (pole.block === block || inner.has(pole.block)) && isSamePole(pole, place))
      if (!known) found.push({ ...place, block, mode: gain.kind === 'modal' ? modeAt(gain, re, im) : null })
    }
  }
  return found
}

export function isSamePole(a: PlanePole, b: PlanePole, tolerance = SAME_POLE): boolean {
  return a.atOriginOfZ === b.atOriginOfZ && Math.hypot(a.re - b.re, Math.abs(a.im) - Math.abs(b.im)) <= tolerance * Math.hypot(a.re, a.im, b.re, b.im)
}

function placeInLoop(re: number, im: number, own: number | undefined, loop: number | undefined): PlanePole {
  if (own !== undefined || loop === undefined) return poleInPlane(re, im, own)
  const size = Math.exp(re * loop)
  const folded = poleInPlane(size * Math.cos(im * loop), size * Math.sin(im * loop), loop)
  return { ...folded, im: Math.abs(folded.im) }
}

function modeAt({ frequencyUnit, modes }: ModalGain, re: number, im: number): string | null {
  const unit = frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  const index = modes.findIndex(({ frequency, damping }) => {
    const w = frequency * unit
    const size = Math.hypot(re, im)
    return damping < 1 && Math.abs(w - size) <= SAME_POLE * w && Math.abs(damping * w + re) <= SAME_POLE * w
  })
  return index < 0 ? null : modes[index]!.name.trim() || `mode ${index + 1}`
}
