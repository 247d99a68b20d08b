import { AppError } from '#shared/errors/AppError'
import type { InputFault } from '#shared/schemas/readBySchema'
import { assertGains } from '../blocks/assertGains'
import { listBlocks } from '../blocks/listBlocks'
import { assertBuildable, type BuildQuestion } from '../sources/assertBuildable'
import { assertReadable } from '../sources/assertDefinition'
import { refuseManifest } from './refuseManifest'
import type { Ids, StoredManifest } from './storeManifest'

/** Expressions that are also tried whether their blocks can be put together as they say: each may take as long as an analysis. */
const mostTried = 200

/** An expression of a manifest, at its place there, that the engine is still to be asked of. */
export interface ManifestQuestion {
  path: string
  questions: BuildQuestion[]
}

/**
 * Refuses a manifest with every definition in it that a route would refuse, each at its place: blocks first, and sources only where all blocks can be read.
 * To be called in the transaction that has stored it. The engine is not asked in it; what it is to be asked is answered, for `assertManifestBuildable`.
 */
export async function assertManifestDefinitions({ system, conditions, sources }: StoredManifest): Promise<ManifestQuestion[]> {
  const faults: InputFault[] = []
  const blocks = await listBlocks(system.id)
  // Circles are told before anything is stored: here the others only lend their names.
  const others = blocks.map(block => ({ ...block, definition: null, byCondition: {} }))
  for (const [index, block] of blocks.entries()) {
    const found = await faultsOf(`blocks[${index}]`, () => assertGains(block, others.filter(other => other.id !== block.id), system))
    faults.push(...found.map(fault => ({ ...fault, path: withCode(fault.path, conditions) })))
  }
  if (faults.length > 0) throw refuseManifest(faults)
  const tried = new Set<string>()
  const asked: ManifestQuestion[] = []
  for (const { path, definition, conditionIds } of sources) {
    const isTried = definition.kind === 'expression' && tried.size < mostTried && !tried.has(definition.expression)
    if (isTried) tried.add(definition.expression)
    faults.push(...await faultsOf(path, async () => {
      const questions = await assertReadable(definition, system, isTried ? conditionIds : [])
      if (questions.length > 0) asked.push({ path, questions })
    }))
  }
  if (faults.length > 0) throw refuseManifest(faults)
  return asked
}

/** Refuses a manifest with every expression in it whose blocks cannot be put together as it says. The engine is asked, so never in a write transaction. */
export async function assertManifestBuildable(asked: readonly ManifestQuestion[]): Promise<void> {
  const faults: InputFault[] = []
  for (const { path, questions } of asked) faults.push(...await faultsOf(path, () => assertBuildable(questions)))
  if (faults.length > 0) throw refuseManifest(faults)
}

/** The path of a gain in one condition by the code of that and not by its id. */
function withCode(path: string, conditions: Ids): string {
  return path.replace(/\.byCondition\.(\d+)/, (whole, id: string) => {
    const [code] = [...conditions].find(([, conditionId]) => conditionId === Number(id)) ?? []
    return code === undefined ? whole : `.byCondition.${code}`
  })
}

/** What a check refuses, at its place in the manifest; where it is about a file, every bad line. */
async function faultsOf(path: string, check: () => Promise<void>): Promise<InputFault[]> {
  try {
    await check()
    return []
  }
  catch (error) {
    if (!(error instanceof AppError)) throw error
    const place = error.path === undefined ? path : `${path}.${error.path.replace(/\buploadId$/, 'upload')}`
    return [{ path: place, message: error.message }, ...problemsOf(error.details).map(({ line, message }) => ({ path: place, message: line > 0 ? `Line ${line}: ${message}` : message }))]
  }
}

function problemsOf(details: unknown): { line: number, message: string }[] {
  if (typeof details !== 'object' || details === null || !('problems' in details)) return []
  return details.problems as { line: number, message: string }[]
}
