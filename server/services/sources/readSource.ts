import type { AnalysedSource } from '#shared/types/source'
import { presentSystem } from '../../presenters/presentSystem'
import type { OpenContext } from '../context'
import { analyseSources } from './analyseSources'
import { findSource } from './findSource'
import { findSystemOfSource } from './findSystemOfSource'

/** A source with what the engine was handed and what it said. */
export async function readSource(sourceId: number, context: OpenContext): Promise<AnalysedSource> {
  const source = await findSource(sourceId)
  const system = await findSystemOfSource(source)
  const [analysed] = await analyseSources([source], presentSystem(system), context)
  if (!analysed) throw new Error(`Source ${sourceId} was not analysed.`)
  return analysed
}
