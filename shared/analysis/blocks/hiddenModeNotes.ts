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
  const leaves = used.map(({ block, loop: leaf, sampled }) => {
    const factors = rationalPart(leaf, sampled ? sampleTime : undefined)
    const place = ({ re, im }: { re: number, im: number }) => inDomain(re, im, sampleTime !== undefined && !sampled ? sampleTime : undefined)
    return {
      block,
      poles: Array.from(factors.poles.re, (re, k) => place({ re, im: factors.poles.im[k]! })),
      // those that a zero of the block itself cancels: a state that its channel does not show
      own: cancelledPoles(factors).map(place),
    }
  })
  return cancelled.map(({ re, im, onBoundary }): StructureNote => {
    const isHere = (pole: { re: number, im: number }) => Math.hypot(pole.re - re, pole.im - im) <= SAME_POLE * Math.hypot(re, im)
    const hider = leaves.find(({ own }) => own.some(isHere))
    if (hider) hider.own.splice(hider.own.findIndex(isHere), 1)
    const owners = hider ? [hider.block] : [...new Set(leaves.filter(({ poles }) => poles.some(isHere)).map(({ block }) => block))]
    const place = im === 0 ? format(re) : `${format(re)} +- j${format(im)}`
    return {
      block: owners[0] ?? '',
      code: onBoundary ? 'hidden boundary' : 'hidden unstable',
      message: `A zero cancels the pole at ${sampleTime === undefined ? 's' : 'z'} = ${place}${owners.length === 0 ? '' : ` of ${owners.join(' or ')}`}: the mode is not seen in L, the closed loop keeps it, and it is ${onBoundary ? 'on the stability boundary' : 'unstable'}.`,
    }
  })
}

function inDomain(re: number, im: number, sampleTime: number | undefined): { re: number, im: number } {
  if (sampleTime === undefined) return { re, im }
  const size = Math.exp(re * sampleTime)
  return { re: size * Math.cos(im * sampleTime), im: size * Math.sin(im * sampleTime) }
}

const format = (value: number) => String(Number(value.toPrecision(6)))
