import { judgeAnalysis } from '#shared/analysis/criteria/judgeAnalysis'
import type { BlockDraft } from '#shared/schemas/block'
import { AppError } from '#shared/errors/AppError'
import { isMoved } from '#shared/workflow/isMoved'
import type { Block } from '#shared/types/block'
import type { Criterion } from '#shared/types/criterion'
import type { AnalysedSource } from '#shared/types/source'
import type { BlockEffect, EffectSide } from '#shared/types/structure'
import type { SourceRow } from '../../database/models/SourceRow'
import type { OpenContext } from '../context'
import { analyseSources } from '../sources/analyseSources'
import { listSourcesOfRecord } from '../sources/listSourcesOfRecord'
import { readSystem } from '../systems/readSystem'
import { assertBlockNameFree } from './assertBlockNameFree'
import { assertGains } from './assertGains'
import { BlockGains } from './BlockGains'

/**
 * What a drafted block would do to every loop and condition whose source of record needs it, directly or by other blocks: analysed as stored and as drafted, in
 * order of loops, then conditions. Nothing is stored. Throws as storing it would where the draft cannot be read; a name that was changed counts as the stored one,
 * which the expressions have.
 */
export async function readBlockEffects(systemId: number, draft: BlockDraft, context: OpenContext): Promise<BlockEffect[]> {
  const { system, loops, conditions, blocks, criteria } = await readSystem(systemId)
  const stored = blocks.find(block => block.id === draft.blockId)
  if (draft.blockId !== null && !stored) throw new AppError('notFound', 'There is no such block.')
  const drafted = draftedBlock(systemId, draft, stored)
  const others = blocks.filter(block => block.id !== draft.blockId)
  if (stored === undefined) await assertBlockNameFree(systemId, draft.name)
  await assertGains(drafted, others, system)
  const after = [...others, drafted]
  const sources = await listSourcesOfRecord(loops.map(loop => loop.id), conditions.map(condition => condition.id))
  const [gainsBefore, gainsAfter] = [new BlockGains(blocks, system), new BlockGains(after, system)]
  const needing = sources.filter(source => needs(source, drafted.name, gainsBefore) || needs(source, drafted.name, gainsAfter))
  const asStored = await analyseSources(needing, system, context, { blocks })
  const asDrafted = await analyseSources(needing, system, context, { blocks: after, keep: false })
  const found = new Map(needing.map((source, index) => [`${source.loopId} ${source.conditionId}`, effectOf(asStored[index], asDrafted[index], criteria)]))
  return loops.flatMap(loop => conditions.flatMap((condition): BlockEffect[] => {
    const sides = found.get(`${loop.id} ${condition.id}`)
    return sides ? [{ loopId: loop.id, conditionId: condition.id, ...sides }] : []
  }))
}

const draftedBlock = (systemId: number, { name, role, definition, byCondition }: BlockDraft, stored: Block | undefined): Block =>
  ({ id: 0, version: 0, systemId, unitIn: '', unitOut: '', notes: '', position: 0, ...stored, name: stored?.name ?? name, role, definition, byCondition })

function needs({ definition, conditionId }: SourceRow, name: string, blocks: BlockGains): boolean {
  return definition.kind === 'expression' && blocks.neededIn(conditionId, definition.expression).blocks.includes(name)
}

function effectOf(stored: AnalysedSource | undefined, drafted: AnalysedSource | undefined, criteria: Criterion[]): Pick<BlockEffect, 'before' | 'after' | 'moved'> {
  const [before, after] = [sideOf(stored, criteria), sideOf(drafted, criteria)]
  return { before, after, moved: isMoved(before, after) }
}

function sideOf(analysed: AnalysedSource | undefined, criteria: Criterion[]): EffectSide | null {
  if (!analysed) return null
  const { analysis, failure } = analysed
  return {
    verdict: analysis?.stability.verdict ?? 'undetermined',
    summary: analysis?.summary ?? null,
    vectorMargin: analysis?.vectorMargin ?? null,
    failure: failure?.message ?? null,
    judgement: judgeAnalysis(analysis, criteria),
  }
}
