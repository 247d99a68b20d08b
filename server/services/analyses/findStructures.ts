import type { AnalysisFailure } from '#shared/types/analysis'
import type { AnalysedSource } from '#shared/types/source'
import type { ClosedLoopPoles, SourceDifference } from '#shared/types/structure'
import type { OpenContext } from '../context'
import { runEngine } from './runEngine'

/** What the engine says of a loop in a condition beside its analysis. */
export interface LoopStructureFacts {
  closedLoopPoles: ClosedLoopPoles | null
  /** one for each of the other sources, in their order */
  differences: SourceDifference[]
}

export interface SourcesOfCell {
  ofRecord: AnalysedSource | undefined
  others: AnalysedSource[]
}

const compared = ({ source, input, analysis }: AnalysedSource) => ({ name: source.name, input, analysis })
const failed = <Answer extends object>(answer: Answer | AnalysisFailure): answer is AnalysisFailure => 'error' in answer

/** Answers in the order of `cells`; null where a cell asks nothing. */
async function ask<Cell, Answer>(cells: readonly Cell[], questionOf: (cell: Cell) => object | null, run: (questions: object[]) => Promise<Answer[]>): Promise<(Answer | null)[]> {
  const questions = cells.map(questionOf)
  const answers = await run(questions.filter(question => question !== null))
  let next = 0
  return questions.map(question => (question === null ? null : answers[next++] ?? null))
}

/** Closed-loop poles of the sources of record, and how far the others lie from them. Computed in the pool and kept; what cannot be answered says why in its `reason`. */
export async function findStructures(cells: readonly SourcesOfCell[], context: OpenContext): Promise<LoopStructureFacts[]> {
  const inputOf = ({ ofRecord }: SourcesOfCell) => (ofRecord?.analysis ? ofRecord.input : null)
  const poles = await ask(cells, inputOf, questions => runEngine('closedLoopPoles', questions, context))
  const pairs = cells.flatMap(({ ofRecord, others }) => (ofRecord ? others.map(other => ({ reference: compared(ofRecord), other: compared(other) })) : []))
  const differences = await runEngine('sourceDifference', pairs, context)
  let next = 0
  return cells.map(({ ofRecord, others }, index): LoopStructureFacts => {
    const unit = ofRecord?.input?.frequencyUnit ?? 'rad/s'
    const ofCell = ofRecord ? others.map(() => next++) : []
    const pole = poles[index] ?? null
    return {
      closedLoopPoles: pole && (failed(pole) ? { frequencyUnit: unit, poles: [], reason: pole.error.message } : pole),
      differences: ofCell.map((place) => {
        const difference = differences[place]!
        const { reference, other } = pairs[place]!
        return failed(difference) ? { frequencyUnit: unit, reference: reference.name, other: other.name, bands: [], basis: '', reason: difference.error.message } : difference
      }),
    }
  })
}
