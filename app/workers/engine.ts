import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import { checkExpression } from '#shared/analysis/expressions/checkExpression'
import { closedLoopPoles } from '#shared/analysis/structure/closedLoopPoles'
import { shiftModes } from '#shared/analysis/structure/shiftModes'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { MeasurementProblem } from '#shared/importers/MeasurementProblem'
import { previewMeasurement, type MeasurementPreview } from '#shared/importers/previewMeasurement'
import { readMeasurement } from '#shared/importers/readMeasurement'
import type { LoopFigureData } from '#shared/plots/FigureData'
import { loopInputFromDefinition, type DefinitionFacts } from '#shared/sources/loopInputFromDefinition'
import type { LoopAnalysis } from '#shared/types/analysis'
import type { BlockGain } from '#shared/types/block'
import type { Criterion, Judgement } from '#shared/types/criterion'
import type { MeasuredDefinition, SourceDefinition } from '#shared/types/source'
import { drawCurves } from './drawCurves'
import { blockLook, type BlockLook, type LookRequest } from './blockLook'
import { UploadShelf } from './UploadShelf'

export interface AnalysisFailed {
  failure: { message: string, path: string, position?: number }
}

export interface LiveAnalysis {
  analysis: LoopAnalysis
  judgement: Judgement
  figures: LoopFigureData
}

export interface LiveRequest {
  title: string
  /** name of the curve in the figures */
  name: string
  definition: SourceDefinition
  facts: DefinitionFacts
  criteria: Criterion[]
}

const requiredVectorMarginOf = (criteria: readonly Criterion[]) => criteria.find(criterion => criterion.quantity === 'vectorMargin')?.limit ?? null

function analyseDefinition({ title, name, definition, facts, criteria }: LiveRequest): LiveAnalysis | AnalysisFailed {
  try {
    const input = readLoopInput(loopInputFromDefinition(definition, { ...facts, blocks: knownBlocks }))
    const analysis = analyseLoop(input)
    const figures = drawCurves({ title, requiredVectorMargin: requiredVectorMarginOf(criteria), curves: [{ name, input, analysis }] })
    return { analysis, judgement: judgeAnalysis(analysis, criteria), figures }
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return failureOf(error, definition)
    throw error
  }
}

/** A fault of the loop gain at its character as typed: a dead time beside an expression stands around it, in brackets that nobody typed. */
function failureOf({ message, path, position }: AnalysisInputError, definition: SourceDefinition): AnalysisFailed {
  const before = path === 'expression' && definition.kind === 'expression' && (definition.deadTime ?? 0) !== 0 ? 1 : 0
  return { failure: { message, path, ...position !== undefined && { position: Math.max(0, position - before) } } }
}

/** What a file of state-space matrices holds, without the numbers. */
export interface MatricesRead {
  sets: { name: string, states: number, inputs: string[], outputs: string[], inputCount: number, outputCount: number }[]
  problems: MeasurementProblem[]
  /** it may be plain numbers, whose number of states only a person knows */
  isPlain: boolean
}

const shelf = new UploadShelf()

function lookAtBlock(request: LookRequest): { look: BlockLook } | AnalysisFailed | { problems: MeasurementProblem[] } {
  try {
    const { problems } = shelf.factsOf(request.definition)
    return problems !== undefined ? { problems } : { look: blockLook(request, definition => shelf.factsOf(definition)) }
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return { failure: { message: error.message, path: error.path, ...error.position !== undefined && { position: error.position } } }
    throw error
  }
}

/** Gains of the system's blocks in the condition looked at; they stay in the worker, since they may be large. */
let knownBlocks: Record<string, BlockGain> = {}

/** Text of the file that was opened last; it stays in the worker, since it may be large. */
let openedText = ''

/** What the screens ask of the engine; it runs in a worker, so that typing never waits for it. */
export const engine = {
  checkExpression,

  /** The blocks that expressions may name from now on. */
  takeBlocks(gains: Record<string, BlockGain>): void {
    knownBlocks = gains
  },

  /** The poles of the closed loop, each with the open-loop pole it comes from. */
  closedLoopPoles,

  /** The margins with each flexible mode moved. */
  shiftModes,

  /** Analyses a model as it is typed. Failures of the input are part of the answer, with the field and the place. */
  analyse: (request: LiveRequest): LiveAnalysis | AnalysisFailed => analyseDefinition(request),

  /** The figures of a loop that was analysed before. */
  draw: drawCurves,

  async openFile(file: Blob): Promise<MeasurementPreview> {
    openedText = await file.text()
    return previewMeasurement(openedText)
  },

  /** Reads the opened file with the mapping, and analyses it where every row is right. */
  analyseFile(request: LiveRequest & { definition: MeasuredDefinition }): LiveAnalysis | AnalysisFailed | { problems: MeasurementProblem[] } {
    const { points, problems } = readMeasurement(openedText, request.definition.mapping)
    if (problems.length > 0) return { problems }
    return analyseDefinition({ ...request, facts: { ...request.facts, points } })
  },

  /** The text of an upload that definitions of blocks name. */
  keepUpload: (id: number, text: string): void => shelf.keep(id, text),
  hasUpload: (id: number): boolean => shelf.has(id),

  readMatrices(id: number, states: number | null): MatricesRead {
    const { sets, problems } = shelf.matrices(id, states)
    return {
      problems,
      isPlain: problems.length > 0 && !shelf.isJson(id),
      sets: sets.map(({ name, a, b, c, inputs, outputs }) => ({ name, states: a.length, inputs, outputs, inputCount: b[0]?.length ?? 0, outputCount: c.length })),
    }
  },

  previewUpload: (id: number): MeasurementPreview => shelf.preview(id),

  /** The response and poles of a block as it is drafted; the files its definitions name must have been kept. */
  lookAtBlock,
}

export type Engine = typeof engine
