import { createHash } from 'node:crypto'
import { ENGINE_VERSION } from '#shared/analysis/engineVersion'
import type { AnalysisFailure } from '#shared/types/analysis'
import type { EngineAnswer, EngineAnswers } from '#shared/types/structure'
import { runInPool } from '../../adapters/analysisPool/analysisPool'
import { writeTransaction } from '../../database/database'
import { AnalysisRow } from '../../database/models/AnalysisRow'
import { canonicalJson } from '../../reports/canonicalJson'
import { nowOf, type OpenContext } from '../context'

/** Questions that are being answered at this moment, by hash: the same one asked twice is computed once. */
const running = new Map<string, Promise<unknown>>()

/** An analysis goes by its input alone, as it always has. */
const hashOf = (task: keyof EngineAnswers, question: unknown) =>
  createHash('sha256').update(canonicalJson(task === 'analysis' ? question : { task, question })).digest('hex')

/**
 * What the engine answers to each question, in their order. Known answers come from the database; new ones are computed and, unless `keep` says
 * otherwise, kept; failures are not. What is not kept is a draft's: it lets all others go first, since there may be a thousand of it at every pause in typing.
 */
export function runEngine<Task extends keyof EngineAnswers>(task: Task, questions: readonly unknown[], context: OpenContext, options?: { keep?: boolean }): Promise<(EngineAnswers[Task] | AnalysisFailure)[]>
/** With `known` nothing is computed: null stands for what is not known yet. */
export function runEngine<Task extends keyof EngineAnswers>(task: Task, questions: readonly unknown[], context: OpenContext, options: { known: boolean }): Promise<(EngineAnswers[Task] | AnalysisFailure | null)[]>
export async function runEngine<Task extends keyof EngineAnswers>(task: Task, questions: readonly unknown[], context: OpenContext, { keep = true, known: onlyKnown = false }: { keep?: boolean, known?: boolean } = {}): Promise<(EngineAnswers[Task] | AnalysisFailure | null)[]> {
  type Answer = EngineAnswers[Task] | AnalysisFailure
  const hashes = questions.map(question => hashOf(task, question))
  const known = await knownAnswers(hashes)
  const fresh = new Map<string, EngineAnswer>()
  const answers = await Promise.all(questions.map(async (question, index): Promise<Answer | null> => {
    const hash = hashes[index] as string
    const kept = known.get(hash)
    if (kept) return kept as Answer
    if (onlyKnown) return null
    const answer = await askOnce(hash, task, question, !keep) as Answer
    if (!('error' in answer)) fresh.set(hash, answer)
    return answer
  }))
  if (keep && fresh.size > 0) {
    const rows = [...fresh].map(([inputHash, result]) => ({ inputHash, engineVersion: ENGINE_VERSION, result, createdAt: nowOf(context) }))
    await writeTransaction(() => AnalysisRow.bulkCreate(rows, { ignoreDuplicates: true }))
  }
  return answers
}

async function knownAnswers(hashes: string[]): Promise<Map<string, EngineAnswer>> {
  const rows = await AnalysisRow.findAll({ where: { inputHash: [...new Set(hashes)], engineVersion: ENGINE_VERSION } })
  return new Map(rows.map(row => [row.inputHash, row.result]))
}

function askOnce(hash: string, task: keyof EngineAnswers, question: unknown, patient: boolean): Promise<unknown> {
  let answer = running.get(hash)
  if (!answer) {
    answer = runInPool(task, question, undefined, { patient }).finally(() => running.delete(hash))
    running.set(hash, answer)
  }
  return answer
}
