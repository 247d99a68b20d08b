import { AnalysisInputError } from '../analysis/AnalysisInputError'
import type { FrequencyUnit, LoopInput, MeasuredPoint } from '../types/analysis'
import type { BlockGain } from '../types/block'
import type { MeasuredDefinition, SourceDefinition } from '../types/source'
import { namesNeeded } from './namesNeeded'
import { scaleOfFrequency } from './scaleOfFrequency'

export interface DefinitionFacts {
  /** unit of the system: that of the input, and so of the analysis */
  frequencyUnit: FrequencyUnit
  /** by name, in the operating condition */
  parameters: Record<string, number>
  /** by name, in the operating condition: those of the system that have a gain there */
  blocks?: Readonly<Record<string, BlockGain>>
  /** points read from the upload of a measured response, in the unit of its mapping */
  points?: readonly MeasuredPoint[]
}

/**
 * What the engine is handed for a source in an operating condition: the one way from a stored definition, on the server and in the
 * editor alike. Frequencies of measured points are turned into the system's unit; the dead time of an expression becomes its factor exp(-s T).
 * Only the parameters and blocks that an expression needs, by its blocks too, are handed on: a change of another one leaves its analysis as it was.
 *
 * @throws AnalysisInputError for a dead time beside an expression in z, which has to be written as powers of z, and for a measured
 * response without points.
 */
export function loopInputFromDefinition(definition: SourceDefinition, facts: DefinitionFacts): LoopInput {
  const { frequencyUnit } = facts
  switch (definition.kind) {
    case 'coefficients': {
      const { kind: _, ...source } = definition
      return { frequencyUnit, ...source }
    }
    case 'zerosPoles': {
      const { kind: _, ...source } = definition
      return { frequencyUnit, ...source }
    }
    case 'expression': {
      const { expression, deadTime = 0, sampleTime } = definition
      const named = namedBy(expression, facts)
      if (sampleTime !== undefined) {
        if (deadTime !== 0) throw new AnalysisInputError('An expression in z takes no dead time beside it: write whole samples of delay as z^-n.', 'deadTime')
        return { frequencyUnit, expression, ...named, sampleTime }
      }
      return { frequencyUnit, expression: deadTime === 0 ? expression : `(${expression})*exp(-s*${deadTime})`, ...named }
    }
    case 'measured':
      return measuredInput(definition, facts)
  }
}

function namedBy(expression: string, { parameters, blocks = {} }: DefinitionFacts): { parameters: Record<string, number>, blocks?: Record<string, BlockGain> } {
  const needed = namesNeeded(expression, name => Object.hasOwn(blocks, name) ? blocks[name] : undefined)
  const chosen = <Value>(from: Readonly<Record<string, Value>>, names: readonly string[]) => Object.fromEntries(names.flatMap(name => Object.hasOwn(from, name) ? [[name, from[name] as Value]] : []))
  return { parameters: chosen(parameters, needed.others), ...(needed.blocks.length > 0 && { blocks: chosen(blocks, needed.blocks) }) }
}

function measuredInput(definition: MeasuredDefinition, { frequencyUnit, points = [] }: DefinitionFacts): LoopInput {
  const { mapping, averages, stayedStable, openLoopUnstablePoles, openLoopOriginPoles } = definition
  if (points.length === 0) throw new AnalysisInputError('No points were read from the file.', 'measured.points')
  const scale = scaleOfFrequency(mapping.frequencyUnit, frequencyUnit)
  return {
    frequencyUnit,
    measured: {
      quantity: mapping.quantity,
      points: points.map(point => ({ ...point, frequency: point.frequency * scale })),
      ...(averages !== undefined && { averages }),
      ...(stayedStable !== undefined && { stayedStable }),
    },
    ...(openLoopUnstablePoles !== undefined && { openLoopUnstablePoles }),
    ...(openLoopOriginPoles !== undefined && { openLoopOriginPoles }),
  }
}
