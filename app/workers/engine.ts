import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import { checkExpression } from '#shared/analysis/expressions/checkExpression'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { MeasurementProblem } from '#shared/importers/MeasurementProblem'
import { previewMeasurement, type MeasurementPreview } from '#shared/importers/previewMeasurement'
import { readMeasurement } from '#shared/importers/readMeasurement'
import { buildLoopFigureData, type CurveSource } from '#shared/plots/buildLoopFigureData'
import { curveSourceOf } from '#shared/plots/curveSourceOf'
import type { LoopFigureData } from '#shared/plots/FigureData'
import { loopInputFromDefinition, type DefinitionFacts } from '#shared/sources/loopInputFromDefinition'
import type { LoopAnalysis, LoopInput } from '#shared/types/analysis'
import type { Criterion, Judgement } from '#shared/types/criterion'
import type { MeasuredDefinition, SourceDefinition } from '#shared/types/source'
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

export interface DrawRequest {
  title: string
  requiredVectorMargin: number | null
  curves: [DrawnCurve, ...DrawnCurve[]]
}

export interface DrawnCurve {
  name: string
  input: LoopInput
  analysis: LoopAnalysis
}

const requiredVectorMarginOf = (criteria: readonly Criterion[]) => criteria.find(criterion => criterion.quantity === 'vectorMargin')?.limit ?? null

const curveSource = ({ name, input, analysis }: DrawnCurve): CurveSource => curveSourceOf(name, input, analysis, prepareLoopGain(input))

function analyseDefinition({ title, name, definition, facts, criteria }: LiveRequest): LiveAnalysis | AnalysisFailed {
  try {
    const input = readLoopInput(loopInputFromDefinition(definition, facts))
    const analysis = analyseLoop(input)
    const figures = draw({ title, requiredVectorMargin: requiredVectorMarginOf(criteria), curves: [{ name, input, analysis }] })
    return { analysis, judgement: judgeAnalysis(analysis, criteria), figures }
  }
  catch (error) {
    if (error instanceof AnalysisInputError) return { failure: { message: error.message, path: error.path, ...error.position !== undefined && { position: error.position } } }
    throw error
  }
}

function draw({ title, requiredVectorMargin, curves: [first, ...others] }: DrawRequest): LoopFigureData {
  return buildLoopFigureData({ title, requiredVectorMargin, curves: [curveSource(first), ...others.map(curveSource)] })
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

/** Text of the file that was opened last; it stays in the worker, since it may be large. */
let openedText = ''

/** What the screens ask of the engine; it runs in a worker, so that typing never waits for it. */
export const engine = {
  checkExpression,

  /** Analyses a model as it is typed. Failures of the input are part of the answer, with the field and the place. */
  analyse: (request: LiveRequest): LiveAnalysis | AnalysisFailed => analyseDefinition(request),

  /** The figures of a loop that was analysed before. */
  draw,

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
