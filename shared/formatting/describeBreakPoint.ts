import type { BreakAt, OtherLoopState } from '../types/system'
import { significantDigits } from './significantDigits'

export interface BreakPointFacts {
  /** the signal in words */
  breakPoint: string
  breakAt?: BreakAt | null
  /** what was said of the other loops in words */
  otherLoops: string
  /** other loops that are not at nominal, by their codes */
  states: readonly { code: string, state: OtherLoopState['state'], gain?: number }[]
  /** how many loops the system has; with all others stated nothing is said of those at nominal */
  loopCount?: number
}

/**
 * Where a loop is opened and what the other loops do meanwhile, as its title line says it:
 * 'opened at the output of C (servo valve command); SL-P open, LU-R held at gain 0.5, all others at nominal'.
 */
export function describeBreakPoint(facts: BreakPointFacts): string {
  const text = facts.otherLoops.trim()
  // Words alone stand for the list; beside a list they add to it.
  const others = facts.states.length > 0 ? [statesInWords(facts), ...(text === '' ? [] : [text])] : [text === '' ? 'one path at a time, all others at nominal' : text]
  return [placeInWords(facts), ...others].join('; ')
}

function placeInWords({ breakAt, breakPoint }: BreakPointFacts): string {
  const signal = breakPoint.trim()
  if (breakAt) return `opened at the ${breakAt.side} of ${breakAt.block}${signal === '' ? '' : ` (${signal})`}`
  return signal === '' ? 'not said where it is opened' : `opened at ${signal}`
}

function statesInWords({ states, loopCount }: BreakPointFacts): string {
  const stated = states.map(({ code, state, gain }) =>
    `${code} ${state}${state === 'held' && gain !== undefined ? ` at gain ${shortest(gain)}` : ''}`)
  return [...stated, ...(loopCount !== undefined && states.length >= loopCount - 1 ? [] : ['all others at nominal'])].join(', ')
}

/** A gain as it was typed where that is short. */
function shortest(gain: number): string {
  const typed = String(gain)
  return typed.length <= 8 ? typed : significantDigits(gain)
}
