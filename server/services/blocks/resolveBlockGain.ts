import { AnalysisInputError } from '#shared/analysis/AnalysisInputError'
import { AppError } from '#shared/errors/AppError'
import { blockGainFromDefinition, type BlockFacts } from '#shared/sources/blockGainFromDefinition'
import type { BlockDefinition, BlockGain } from '#shared/types/block'
import type { System } from '#shared/types/system'
import { readMatrixUpload } from '../uploads/readMatrixUpload'
import { readPoints } from '../uploads/readPoints'

/**
 * The gain of a block as the engine takes it, its uploaded file read. Throws AnalysisInputError with the path in the definition, and AppError 'invalid input'
 * with every bad line in `details.problems` where the file cannot be read.
 */
export async function resolveBlockGain(definition: BlockDefinition, system: Pick<System, 'id' | 'frequencyUnit'>): Promise<BlockGain> {
  const { frequencyUnit } = system
  if (definition.kind === 'measured') {
    const { points, problems } = await readPoints(system.id, definition.uploadId, definition.mapping).catch(atUpload)
    if (problems.length > 0) throw unreadable(problems, 'mapping')
    return blockGainFromDefinition(definition, { frequencyUnit, points })
  }
  const facts: BlockFacts = { frequencyUnit }
  if (definition.kind === 'stateSpace') {
    const outputs = definition.outputs.length > 0 ? definition.outputs.length : null
    const { sets, problems } = await readMatrixUpload(system.id, definition.uploadId, { states: definition.states, outputs })
    if (problems.length > 0) throw unreadable(problems, 'uploadId')
    facts.sets = sets
  }
  return blockGainFromDefinition(definition, facts)
}

/** A missing upload is told at the field of the block, not at that of a source. */
function atUpload(error: unknown): never {
  if (error instanceof AppError && error.code === 'invalidInput') throw new AnalysisInputError(error.message, 'uploadId')
  throw error
}

function unreadable(problems: { line: number, message: string }[], path: string): AppError {
  const [first] = problems
  const where = first && first.line > 0 ? `line ${first.line}: ` : ''
  return new AppError('invalidInput', `The file cannot be read like this: ${where}${first?.message ?? ''}`, { path, details: { problems } })
}
