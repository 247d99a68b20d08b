import { AnalysisInputError } from '../analysis/AnalysisInputError'
import type { MatrixSet } from '../importers/MatrixSet'
import type { FrequencyUnit, MeasuredPoint } from '../types/analysis'
import type { BlockDefinition, BlockGain, SecondOrderSection, SectionsDefinition, SectionsGain, StateSpaceDefinition, StateSpaceGain } from '../types/block'
import { readSectionNumber } from './readSectionNumber'
import { scaleOfFrequency } from './scaleOfFrequency'

/** What a definition needs of its surroundings. */
export interface BlockFacts {
  /** unit of the loop's input, in which the engine takes the frequencies of measured points */
  frequencyUnit: FrequencyUnit
  /** of a measured block: the points read from its upload, in the unit of its mapping */
  points?: readonly MeasuredPoint[]
  /** of a state-space block: the sets of matrices read from its upload */
  sets?: readonly MatrixSet[]
}

/**
 * The gain of a block as the engine takes it: the one way from what is stored, on the server and in the editor alike. Sections keep the numbers that were
 * typed, matrices those of the file.
 *
 * @throws AnalysisInputError with the path in the definition ('rows[2][1]', 'set') of what cannot be read
 */
export function blockGainFromDefinition(definition: BlockDefinition, facts: BlockFacts): BlockGain {
  switch (definition.kind) {
    case 'stateSpace': return stateSpaceGain(definition, facts.sets ?? [])
    case 'sections': return sectionsGain(definition)
    case 'measured': {
      const { points = [], frequencyUnit } = facts
      const { averages, openLoopUnstablePoles, openLoopOriginPoles } = definition
      if (points.length === 0) throw new AnalysisInputError('No points were read from the file.', 'mapping')
      const scale = scaleOfFrequency(definition.mapping.frequencyUnit, frequencyUnit)
      return {
        kind: 'measured', points: points.map(point => ({ ...point, frequency: point.frequency * scale })),
        ...(averages !== undefined && { averages }),
        ...(openLoopUnstablePoles !== undefined && { openLoopUnstablePoles }),
        ...(openLoopOriginPoles !== undefined && { openLoopOriginPoles }),
      }
    }
    default: return definition
  }
}

function stateSpaceGain(definition: StateSpaceDefinition, sets: readonly MatrixSet[]): StateSpaceGain {
  const { a, b, c, d, ...set } = chosenSet(definition, sets)
  const { sampleTime = set.sampleTime } = definition
  if (set.sampleTime !== undefined && sampleTime !== set.sampleTime) {
    throw new AnalysisInputError(`The file says that these matrices are sampled every ${set.sampleTime} s, not ${sampleTime} s.`, 'sampleTime')
  }
  const inputs = channelsOf('inputs', definition.inputs, set.inputs, b[0]?.length ?? 0)
  const outputs = channelsOf('outputs', definition.outputs, set.outputs, c.length)
  return { kind: 'stateSpace', a, b, c, d, inputs, outputs, ...(sampleTime !== undefined && { sampleTime }) }
}

function chosenSet({ set }: StateSpaceDefinition, sets: readonly MatrixSet[]): MatrixSet {
  const names = sets.map(({ name }) => name)
  const [first] = sets
  if (first === undefined) throw new AnalysisInputError('No matrices were read from the file.', 'uploadId')
  if (set === null) {
    if (sets.length === 1) return first
    throw new AnalysisInputError(`The file holds ${sets.length} sets of matrices (${namesInShort(names)}): choose one.`, 'set')
  }
  const chosen = sets.find(({ name }) => name === set)
  if (chosen === undefined) throw new AnalysisInputError(`The file has no set ${set}; it has ${namesInShort(names)}.`, 'set')
  return chosen
}

const namesInShort = (names: readonly string[]) => names.length > 5 ? `${names.slice(0, 5).join(', ')} and ${names.length - 5} more` : names.join(', ')

function channelsOf(noun: 'inputs' | 'outputs', typed: readonly string[], ofFile: readonly string[], count: number): string[] {
  if (typed.length === 0) return [...ofFile]
  if (typed.length !== count) throw new AnalysisInputError(`${typed.length} ${noun} are named, the matrices have ${count}.`, noun)
  return [...typed]
}

function sectionsGain({ rows, gain, sampleTime }: SectionsDefinition): SectionsGain {
  const read = (text: string, path: string) => {
    const value = readSectionNumber(text)
    if (value === null) throw new AnalysisInputError(`"${text.trim().slice(0, 40)}" is no number and no fraction of two: write it like -0.98 or 16384/32768.`, path)
    return value
  }
  return {
    kind: 'sections',
    sections: rows.map((row, index) => row.map((cell, column) => read(cell, `rows[${index}][${column}]`)) as SecondOrderSection),
    gain: read(gain, 'gain'),
    sampleTime,
  }
}
