import type { StructureNote } from '../../types/analysis'
import type { FactoredLoop } from '../FactoredLoop'
import { cancelledPoles } from '../expressions/cancelledPoles'
import { rationalPart } from '../expressions/rationalPart'
import type { UsedLeaf } from './exactLeafSource'

/** A pole behind a hold is known in z by exp(s T), to rounding. */
const SAME_POLE = 1e-9

/** One note for each pole on or beyond the stability boundary that a zero cancels exactly, with the block it comes from where one can be told. */
export function hiddenModeNotes(loop: FactoredLoop, used: readonly UsedLeaf[]): StructureNote[] {
  const cancelled = cancelledPoles(loop)
  if (cancelled.length === 0) return []
  const { sampleTime } = loop
  const owners = used.flatMap(({ block, loop: leaf, sampled }) => {
    const { poles } = rationalPart(leaf, sampled ? sampleTime : undefined)
    return Array.from(poles.re, (re, k) => ({ block, ...inDomain(re, poles.im[k]!, sampleTime !== undefined && !sampled ? sampleTime : undefined) }))
  })
  return cancelled.map(({ re, im, onBoundary }): StructureNote => {
    const owner = owners.find(pole => Math.hypot(pole.re - re, pole.im - im) <= SAME_POLE * Math.hypot(re, im))
    const place = im === 0 ? format(re) : `${format(re)} +- j${format(im)}`
    return {
      block: owner?.block ?? '',
      code: onBoundary ? 'hidden boundary' : 'hidden unstable',
      message: `A zero cancels the pole at ${sampleTime === undefined ? 's' : 'z'} = ${place}${owner ? ` of ${owner.block}` : ''}: the mode is not seen in L, the closed loop keeps it, and it is ${onBoundary ? 'on the stability boundary' : 'unstable'}.`,
    }
  })
}

function inDomain(re: number, im: number, sampleTime: number | undefined): { re: number, im: number } {
  if (sampleTime === undefined) return { re, im }
  const size = Math.exp(re * sampleTime)
  return { re: size * Math.cos(im * sampleTime), im: size * Math.sin(im * sampleTime) }
}

const format = (value: number) => String(Number(value.toPrecision(6)))
