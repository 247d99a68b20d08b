import { listInWords } from '../formatting/listInWords'
import type { ReportSnapshot, SnapshotBlock } from '../types/snapshot'
import { isSameData } from './isSameData'

/**
 * What the later of two frozen states says differently of the blocks, a sentence a block with the loops that use it. A state frozen before
 * there were blocks has none.
 */
export function blockChanges(before: ReportSnapshot, after: ReportSnapshot): string[] {
  const [earlier, later] = [before, after].map(({ blocks }) => new Map((blocks ?? []).map(block => [block.name, block])))
  return [...new Set([...later!.keys(), ...earlier!.keys()])].flatMap((name) => {
    const [was, is] = [earlier!.get(name), later!.get(name)]
    const users = [...new Set([...loopsUsing(after, name), ...loopsUsing(before, name)])]
    const use = users.length === 0 ? 'used by no loop' : `used by ${listInWords(users)}`
    if (was === undefined) return [`block ${name} (${is!.role}) added; ${use}`]
    if (is === undefined) return [`block ${name} (${was.role}) removed; ${use}`]
    const changes = [...factChanges(was, is), ...gainChanges(was, is, conditionsOf(before, after))]
    return changes.length === 0 ? [] : [`block ${name} (${is.role}): ${changes.join(', ')}; ${use}`]
  })
}

function factChanges(was: SnapshotBlock, is: SnapshotBlock): string[] {
  return ([['role', 'role'], ['unitIn', 'unit of its input'], ['unitOut', 'unit of its output']] as const)
    .filter(([field]) => was[field] !== is[field])
    .map(([field, words]) => `${words} ${was[field] || 'none'} to ${is[field] || 'none'}`)
    .concat(was.notes === is.notes ? [] : ['notes changed'])
}

function gainChanges(was: SnapshotBlock, is: SnapshotBlock, codes: string[]): string[] {
  const kinds: Record<'added' | 'removed' | 'changed', string[]> = { added: [], removed: [], changed: [] }
  for (const code of codes) {
    // Own entries only: a condition may be called 'constructor'.
    const [old, now] = [was, is].map(({ definitions }) => Object.hasOwn(definitions, code) ? definitions[code] : undefined)
    if (isSameData(old, now)) continue
    kinds[old === undefined ? 'added' : now === undefined ? 'removed' : 'changed'].push(code)
  }
  return (['changed', 'added', 'removed'] as const).filter(kind => kinds[kind].length > 0)
    .map(kind => `gain ${kind} in ${kinds[kind].length === codes.length && codes.length > 1 ? 'every condition' : listInWords(kinds[kind])}`)
}

const conditionsOf = (before: ReportSnapshot, after: ReportSnapshot) => [...new Set([...after.conditions, ...before.conditions].map(({ code }) => code))]

/** Loops whose analysis was handed the block: the inputs hold those that are named, directly or by another block, and no others. */
function loopsUsing({ cells }: ReportSnapshot, name: string): string[] {
  return cells.flatMap(({ loopCode, input }) => input && 'blocks' in input && input.blocks && Object.hasOwn(input.blocks, name) ? [loopCode] : [])
}
