import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { lowerExpression } from '#shared/analysis/expressions/lowerExpression'
import { namesInExpression } from '#shared/analysis/expressions/namesInExpression'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { holdResponse } from '#shared/analysis/sampling/holdResponse'
import { polesInWords } from '#shared/formatting/polesInWords'
import { buildBlockResponse } from '#shared/plots/buildBlockResponse'
import type { BlockResponseData } from '#shared/plots/FigureData'
import { blockGainFromDefinition, type BlockFacts } from '#shared/sources/blockGainFromDefinition'
import type { FrequencyUnit } from '#shared/types/analysis'
import type { BlockDefinition, BlockGain, HoldGain } from '#shared/types/block'
import type { LoopGain } from '#shared/analysis/LoopGain'
import { neededBlocks } from '~/utils/neededBlocks'

export interface LookRequest {
  /** as it stands in expressions */
  name: string
  definition: BlockDefinition
  /** places of the input and the output looked at, from 0 */
  channel: { input: number, output: number }
  /** the other blocks of the system with their gains in the condition looked at; only those needed are read */
  others: Record<string, BlockDefinition>
  /** values in that condition */
  parameters: Record<string, number>
  frequencyUnit: FrequencyUnit
}

/** What a block does by itself. */
export interface BlockLook {
  /** null where it has no response by itself, or none for these channels */
  response: BlockResponseData | null
  /** why there is no response */
  reason: string | null
  /** its poles in short, one a line; [] where it has none, or no list of them */
  poles: string[]
  /** names of the channels, or numbers; one of each where there is only one */
  inputs: string[]
  outputs: string[]
}

/** Files that definitions name, as read. */
export type UploadFacts = (definition: BlockDefinition) => Omit<BlockFacts, 'frequencyUnit'>

/**
 * The response and the poles of a block as it is drafted.
 *
 * @throws AnalysisInputError with the path in the definition; of another block that it needs, with the path 'blocks.<name>...'
 */
export function blockLook(request: LookRequest, uploads: UploadFacts): BlockLook {
  const { name, definition, channel, frequencyUnit } = request
  const own = blockGainFromDefinition(definition, { frequencyUnit, ...uploads(definition) })
  const { inputs, outputs } = channelsOf(own)
  const base = { poles: [], inputs, outputs }
  if (own.kind === 'hold') return { ...base, response: buildBlockResponse({ title: name, frequencyUnit, gain: holdGain(own), sampleTime: own.sampleTime }), reason: null }
  if (own.kind === 'deadTime') return { ...base, response: null, reason: own.unit === 's' ? 'A dead time has the gain one at every frequency, and a lag that grows with it.' : 'Its delay counts samples of the loop it stands in: it has no response by itself.' }
  const place = { input: Math.min(channel.input, inputs.length - 1), output: Math.min(channel.output, outputs.length - 1) }
  const isSingle = inputs.length === 1 && outputs.length === 1
  const expression = isSingle ? name : `${name}[${place.output + 1}, ${place.input + 1}]`
  const title = isSingle ? name : `${name}[${outputs[place.output]}, ${inputs[place.input]}]`
  try {
    const { blocks, parameters } = needed(request, own, uploads)
    const input = { frequencyUnit, expression, parameters, blocks }
    const sampleTime = sampleTimeOf(own)
    const timed = { ...input, ...sampleTime !== undefined && { sampleTime } }
    const response = buildBlockResponse({ title, frequencyUnit, gain: prepareLoopGain(timed), sampleTime, ...own.kind === 'measured' && { sampleFrequencies: own.points.map(point => point.frequency) } })
    return { ...base, response, reason: null, poles: own.kind === 'measured' ? [] : polesOf(timed, frequencyUnit) }
  }
  catch (error) {
    if (!(error instanceof AnalysisInputError)) throw error
    const prefix = `blocks.${name}.`
    // What stands in the way is the zero of this pair of channels, not the block.
    if (error.path === 'expression') return { ...base, response: null, reason: error.message }
    throw error.path.startsWith(prefix) ? new AnalysisInputError(withoutOwnName(error.message, name), error.path.slice(prefix.length), error.position) : error
  }
}

/** 'Block G: Improper' as the block's own form says it. */
const withoutOwnName = (message: string, name: string) => message.startsWith(`Block ${name}: `) ? message.slice(`Block ${name}: `.length) : message

/** The block with all that it needs, and the parameters that any of them names. */
function needed({ name, definition, others, parameters, frequencyUnit }: LookRequest, own: BlockGain, uploads: UploadFacts) {
  const wanted = neededBlocks(definition, others)
  const blocks: Record<string, BlockGain> = {}
  for (const [other, gain] of Object.entries(wanted)) blocks[other] = atBlock(other, () => blockGainFromDefinition(gain, { frequencyUnit, ...uploads(gain) }))
  blocks[name] = own
  const names = new Set(Object.values(blocks).flatMap(gain => gain.kind === 'expression' ? namesInExpression(gain.expression).map(found => found.name) : []))
  return { blocks, parameters: Object.fromEntries(Object.entries(parameters).filter(([parameter]) => names.has(parameter))) }
}

function atBlock<Value>(name: string, read: () => Value): Value {
  try {
    return read()
  }
  catch (error) {
    if (error instanceof AnalysisInputError) throw new AnalysisInputError(`The block ${name}: ${error.message}`, `blocks.${name}.${error.path}`)
    throw error
  }
}

function channelsOf(gain: BlockGain): { inputs: string[], outputs: string[] } {
  const numbered = (count: number) => Array.from({ length: count }, (_, index) => String(index + 1))
  if (gain.kind === 'stateSpace') {
    return {
      inputs: gain.inputs.length > 0 ? gain.inputs : numbered(gain.b[0]?.length ?? 1),
      outputs: gain.outputs.length > 0 ? gain.outputs : numbered(gain.c.length),
    }
  }
  if (gain.kind !== 'modal') return { inputs: ['1'], outputs: ['1'] }
  const first = gain.modes[0] ?? gain.rigid[0]
  return {
    inputs: gain.inputs.length > 0 ? gain.inputs : numbered(first?.gainIn.length ?? 1),
    outputs: gain.outputs.length > 0 ? gain.outputs : numbered(first?.gainOut.length ?? 1),
  }
}

const sampleTimeOf = (gain: BlockGain) => 'sampleTime' in gain ? gain.sampleTime : undefined

function polesOf(input: Parameters<typeof lowerExpression>[0], unit: FrequencyUnit): string[] {
  const lowered = lowerExpression(input)
  return lowered.kind === 'factored' ? polesInWords(lowered.loop.poles, unit, lowered.loop.sampleTime) : []
}

function holdGain(hold: HoldGain): LoopGain {
  return {
    evaluate: (w, out) => {
      holdResponse(hold, w, out)
      return true
    },
    axisStart: 0, axisEnd: Math.PI / hold.sampleTime, deadTime: 0, features: [{ frequency: 0.5 / hold.sampleTime, width: 0.1 / hold.sampleTime }],
  }
}
