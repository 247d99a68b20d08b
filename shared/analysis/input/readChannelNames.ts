import { AnalysisInputError } from '../AnalysisInputError'
import { describeValue } from './describeValue'
import { inputLimits } from './inputLimits'
import { isGiven } from './isGiven'
import { readList } from './readList'

/**
 * Names of the inputs or outputs of a block, [] where they are only counted.
 *
 * @throws AnalysisInputError for a number of names other than that of the channels, a name that stands twice or could not be written in G[output, input]
 */
export function readChannelNames(value: unknown, path: 'inputs' | 'outputs', channels: number): string[] {
  if (!isGiven(value)) return []
  const names = readList(value, path, 'names', 0, inputLimits.channels).map((entry, index) => {
    const here = `${path}[${index}]`
    if (typeof entry !== 'string') throw new AnalysisInputError(`${here} must be a name, not ${describeValue(entry)}.`, here)
    if (entry.length > inputLimits.channelNameLength) throw new AnalysisInputError(`${here} has ${entry.length} characters; at most ${inputLimits.channelNameLength} are read.`, here)
    if (entry !== entry.trim() || entry === '' || /[,[\]]/.test(entry)) throw new AnalysisInputError(`${here}, "${entry}", cannot be written as a channel: no commas, no square brackets, no spaces around it.`, here)
    if (/^\d+$/.test(entry)) throw new AnalysisInputError(`${here} is a number: channels without names are counted from 1 anyway.`, here)
    return entry
  })
  const twice = names.findIndex((name, index) => names.indexOf(name) !== index)
  if (twice >= 0) throw new AnalysisInputError(`${path}[${twice}] repeats the name "${names[twice]}".`, `${path}[${twice}]`)
  if (names.length > 0 && names.length !== channels) {
    throw new AnalysisInputError(`${path} has ${names.length} names for ${channels} ${channels === 1 ? 'channel' : 'channels'}: name all of them or none.`, path)
  }
  return names
}
