import type { Board } from '#shared/types/system'
import type { OpenContext } from '../context'
import { judgeCells } from './judgeCells'
import { readSystem } from './readSystem'

/** The board of a system: every loop in every condition, by its source of record. */
export async function readBoard(systemId: number, context: OpenContext): Promise<Board> {
  const { system, loops, conditions, criteria } = await readSystem(systemId)
  const cells = await judgeCells(system, loops, conditions.map(condition => condition.id), criteria, loops, context)
  return { system, loops, conditions, criteria, cells }
}
