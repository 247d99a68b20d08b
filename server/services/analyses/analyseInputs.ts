import { createHash } from 'node:crypto'
import { ENGINE_VERSION } from '#shared/analysis/engineVersion'
import type { AnalysisFailure, LoopAnalysis, LoopInput } from '#shared/types/analysis'
import { analyseInPool } from '../../adapters/analysisPool/analysisPool'
import { writeTransaction } from '../../database/database'
import { AnalysisRow } from '../../database/models/AnalysisRow'
import { canonicalJson } from '../../reports/canonicalJson'
import { nowOf, type OpenContext } from '../context'

export type InputResult = LoopAnalysis | AnalysisFailure

/** Analyses that run at this moment, by hash: the same input asked for twice is computed once. */
const running = new Map<string, Promise<InputResult>>()

const hashOf = (input: LoopInput) => createHash('sha256').update(canonicalJson(input)).digest('hex')

/** What the engine says of each input, in their order. Known answers come from the database; new ones are computed and kept, failures are not. */
export async function analyseInputs(inputs: LoopInput[], context: OpenContext): Promise<InputResult[]> {
  const hashes = inputs.map(hashOf)
  const known = await knownAnalyses(hashes)
  const fresh = new Map<string, LoopAnalysis>()
  const results = await Promise.all(inputs.map(async (input, index) => {
    const hash = hashes[index] as string
    const kept = known.get(hash)
    if (kept) return kept
    const result = await analyseOnce(hash, input)
    if (!('error' in result)) fresh.set(hash, result)
    return result
  }))
  if (fresh.size > 0) {
    const rows = [...fresh].map(([inputHash, result]) => ({ inputHash, engineVersion: ENGINE_VERSION, result, createdAt: nowOf(context) }))
    await writeTransaction(() => AnalysisRow.bulkCreate(rows, { ignoreDuplicates: true }))
  }
  return results
}

async function knownAnalyses(hashes: string[]): Promise<Map<string, LoopAnalysis>> {
  const rows = await AnalysisRow.findAll({ where: { inputHash: [...new Set(hashes)], engineVersion: ENGINE_VERSION } })
  return new Map(rows.map(row => [row.inputHash, row.result]))
}

function analyseOnce(hash: string, input: LoopInput): Promise<InputResult> {
  let result = running.get(hash)
  if (!result) {
    result = analyseInPool(input).finally(() => running.delete(hash))
    running.set(hash, result)
  }
  return result
}
