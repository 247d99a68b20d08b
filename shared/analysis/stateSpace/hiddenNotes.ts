import type { StructureNote } from '../../types/analysis'
import type { StateSpaceGain } from '../../types/block'
import type { HiddenMode } from './cancelHiddenModes'

/** Modes named in one note; of more their number is told. */
const NAMED = 6

/** One note for all modes that the input does not reach and one for all that the output does not see. Those on or beyond the stability boundary are told of once more, one by one, for the loop. */
export function hiddenNotes(hidden: readonly HiddenMode[], gain: StateSpaceGain, output: number, input: number): Omit<StructureNote, 'block'>[] {
  const variable = gain.sampleTime === undefined ? 's' : 'z'
  return (['unreachable', 'unobservable'] as const).flatMap((kind) => {
    const modes = hidden.filter(mode => mode.kind === kind && mode.pole.im >= 0)
    if (modes.length === 0) return []
    const places = modes.slice(0, NAMED).map(({ pole, exact }) => `${place(pole.re, pole.im)}${exact ? '' : ' (to rounding of the matrices)'}`).join(', ')
    const more = modes.length > NAMED ? ` and ${modes.length - NAMED} more` : ''
    const what = modes.length === 1 ? 'The mode' : `${modes.length} modes`
    const channel = kind === 'unreachable' ? `reached from input ${gain.inputs[input] ?? input + 1}` : `seen at output ${gain.outputs[output] ?? output + 1}`
    return [{
      code: kind,
      message: `${what} at ${variable} = ${places}${more} cannot be ${channel}: L does not show ${modes.length === 1 ? 'it' : 'them'}, and no feedback around this channel moves ${modes.length === 1 ? 'it' : 'them'}.`,
    }]
  })
}

function place(re: number, im: number): string {
  return im === 0 ? format(re) : `${format(re)} +- j${format(im)}`
}

const format = (value: number) => String(Number(value.toPrecision(6)))
