import type { ExpressionInput, LoopInput, LoopStructure, MeasuredInput, MeasuredPoint, StructureNote } from '../../types/analysis'
import type { BlockGain, MeasuredGain } from '../../types/block'
import { AnalysisInputError } from '../AnalysisInputError'
import { lowerExpression, type LoweredExpression } from '../expressions/lowerExpression'
import { parseExpression } from '../expressions/parseExpression'
import { BlockScope } from './BlockScope'
import { commonSampleTime } from './commonSampleTime'
import { exactLeafSource } from './exactLeafSource'
import { orderBlocks } from './orderBlocks'
import { powerOfBlock } from './powerOfBlock'
import type { Complex, Response } from './responseAlgebra'
import { responseLeafSource } from './responseLeafSource'

/** Frequencies of two responses are those of one sweep when they differ by no more than rounding of their text. */
const SAME_FREQUENCY = 1e-9

/** A measured loop, and how it was built where that was from blocks. */
export interface MeasuredLoop {
  input: MeasuredInput
  /** the block whose points it stands at; null for a loop that was measured itself */
  block: string | null
  structure?: LoopStructure
}

/**
 * The loop as a measured one: as it is where it was measured itself, point by point where one of the blocks it needs was measured; null for a model.
 * Over a measured block, sampled blocks are taken at exp(jwT), holds and dead times by their response. Coherence and averages go along where L is proportional
 * to one measured block, and so do the numbers of its open-loop poles, with those of everything else added.
 *
 * @throws AnalysisInputError for measured blocks with different frequencies, and at a point where another block has no value
 */
export function measuredInputOf(input: LoopInput): MeasuredLoop | null {
  if ('measured' in input) return { input, block: null }
  if (!('expression' in input) || !input.blocks) return null
  const { blocks } = input
  const needed = orderBlocks(input.expression, blocks)
  const measured = needed.filter(name => blocks[name]!.kind === 'measured')
  return measured.length === 0 ? null : pointByPoint(input, blocks, needed, measured)
}

function pointByPoint(input: ExpressionInput, blocks: Record<string, BlockGain>, needed: string[], measured: string[]): MeasuredLoop {
  const [first] = measured as [string]
  const gainOf = (name: string) => blocks[name] as MeasuredGain
  const unit = input.frequencyUnit === 'Hz' ? 2 * Math.PI : 1
  const sampleTime = commonSampleTime(input.sampleTime, needed, blocks)
  refuseImproper({ ...input, ...sampleTime !== undefined && { sampleTime } }, blocks, needed, measured)
  for (const name of measured) refuseOtherFrequencies(gainOf(first).points, gainOf(name).points, first, name)

  let at = 0
  const responses = new Map<string, Response>(measured.map(name => [name, () => gainOf(name).points[at]!]))
  const leaves = responseLeafSource(sampleTime, responses)
  const scope = new BlockScope(input, leaves)
  const part = scope.evaluate()
  if (part === null) throw scope.zero()
  const { value } = scope.arithmetic.settle(part, scope.tree.position)

  const notes: StructureNote[] = [...leaves.notes]
  const accuracy = leaves.accuracy()
  const note = (block: string, code: StructureNote['code'], message: string) => notes.push({ block, code, message })
  const proportional = measured.length === 1 && powerIn(input, blocks, needed, first) === 1
  const { averages, points } = gainOf(first)
  const withCoherence = measured.filter(name => gainOf(name).points.some(point => point.coherence !== undefined))
  for (const name of proportional ? [] : withCoherence) {
    note(name, 'coherence dropped', `L is not proportional to the measured block ${name} alone: the coherence of its points says nothing of L, and no confidence circles are drawn.`)
  }
  const inReach = points.filter(({ frequency }) => sampleTime === undefined || frequency * unit * sampleTime <= Math.PI * (1 + 1e-12))
  if (inReach.length < points.length) {
    note(first, 'other', `${points.length - inReach.length} of the ${points.length} points of ${first} lie above half the sampling frequency and are left out.`)
  }
  if (needed.some(name => blocks[name]!.kind === 'hold')) {
    note(first, 'other', `The loop is taken point by point, the hold by its frequency response: what sampling folds down from above half the sampling frequency is not in it.`)
  }
  const loopPoints = inReach.map((point, index): MeasuredPoint => {
    at = index
    const { re, im } = finiteValue(value(point.frequency * unit), `blocks.${first}.points[${index}]`, point.frequency, input)
    return { frequency: point.frequency, re, im, ...proportional && point.coherence !== undefined && { coherence: point.coherence } }
  })
  const { expression: _, parameters: _parameters, sampleTime: _sampleTime, blocks: _blocks, ...common } = input
  return {
    block: first,
    input: {
      ...common,
      measured: { quantity: 'loopGain', points: loopPoints, ...proportional && averages !== undefined && { averages } },
      ...proportional && openLoopPoles(input, first, gainOf(first), message => note(first, 'other', message)),
    },
    structure: { ...sampleTime !== undefined && { sampleTime }, ...accuracy && { accuracy }, approximated: false, notes },
  }
}

function finiteValue(value: Complex, path: string, frequency: number, input: ExpressionInput): Complex {
  if (Number.isFinite(value.re) && Number.isFinite(value.im)) return value
  throw new AnalysisInputError(`At ${frequency} ${input.frequencyUnit ?? 'rad/s'} the loop gain has no value: another block has a pole there. Leave the point out.`, path)
}

function refuseOtherFrequencies(points: MeasuredPoint[], others: MeasuredPoint[], first: string, name: string): void {
  const wrong = points.findIndex(({ frequency }, i) => others[i] === undefined || Math.abs(others[i].frequency - frequency) > SAME_FREQUENCY * frequency)
  if (wrong < 0 && points.length === others.length) return
  const index = wrong < 0 ? points.length : wrong
  throw new AnalysisInputError(
    `The measured blocks ${first} and ${name} have different frequencies, first at point ${index + 1}: give both at the same ones, nothing is interpolated between points.`, `blocks.${name}.points[${Math.min(index, others.length - 1)}]`)
}

/** Values at points do not tell an improper block: those without a measured one in them are built exactly too, which refuses it. */
function refuseImproper(input: ExpressionInput, blocks: Record<string, BlockGain>, needed: string[], measured: string[]): void {
  const models = needed.filter((name) => {
    const gain = blocks[name]!
    return gain.kind === 'expression' && !orderBlocks(gain.expression, blocks).some(inner => measured.includes(inner))
  })
  if (models.length > 0) void new BlockScope({ ...input, expression: models.join(' + ') }, exactLeafSource())
}

/** How often the measured block is a factor of the loop. */
function powerIn(input: ExpressionInput, blocks: Record<string, BlockGain>, needed: string[], measured: string): number | null {
  const names = { variable: 's' as const, parameterNames: Object.keys(input.parameters ?? {}), blocks }
  const powers = new Map<string, number | null>([[measured, 1]])
  const ofBlock = (name: string) => powers.has(name) ? powers.get(name)! : 0
  for (const name of needed) {
    const gain = blocks[name]!
    if (gain.kind === 'expression') powers.set(name, powerOfBlock(parseExpression(gain.expression, names), ofBlock))
  }
  return powerOfBlock(parseExpression(input.expression, names), ofBlock)
}

/** Stated poles of the measured block and counted ones of the rest, which is L with 1 in the block's place. */
function openLoopPoles(input: ExpressionInput, name: string, stated: MeasuredGain, tell: (message: string) => void): Pick<MeasuredInput, 'openLoopUnstablePoles' | 'openLoopOriginPoles'> {
  const rest = countPoles(input, name)
  if ('reason' in rest) {
    tell(`The open-loop poles of what stands beside ${name} were not counted: ${rest.reason}`)
    return {}
  }
  const { openLoopUnstablePoles, openLoopOriginPoles } = stated
  return {
    ...openLoopUnstablePoles !== undefined && { openLoopUnstablePoles: openLoopUnstablePoles + rest.unstable },
    ...(openLoopOriginPoles !== undefined || rest.origin > 0) && { openLoopOriginPoles: (openLoopOriginPoles ?? 0) + rest.origin },
  }
}

function countPoles(input: ExpressionInput, measured: string): { unstable: number, origin: number } | { reason: string } {
  const blocks = Object.fromEntries(Object.entries(input.blocks ?? {}).map(([name, gain]): [string, BlockGain] => {
    if (name === measured) return [name, { kind: 'expression', expression: '1' }]
    // the poles behind a hold do not depend on its kind, and this one takes a plant of 1
    return [name, gain.kind === 'hold' ? { kind: 'hold', hold: 'zeroOrder', sampleTime: gain.sampleTime } : gain]
  }))
  let rest: LoweredExpression
  try {
    rest = lowerExpression({ ...input, blocks })
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return { reason: error.message }
    throw error
  }
  if (rest.kind !== 'factored') return { reason: 'several dead times stand in a sum.' }
  const { poles, sampleTime } = rest.loop
  let unstable = 0
  let origin = 0
  for (let k = 0; k < poles.re.length; k++) {
    const [re, im] = [poles.re[k]!, poles.im[k]!]
    if (poles.onBoundary[k]) origin += (sampleTime === undefined ? re === 0 : re === 1) && im === 0 ? 1 : 0
    else if (sampleTime === undefined ? re > 0 : Math.hypot(re, im) > 1) unstable++
  }
  return { unstable, origin }
}
