import type { FrequencyUnit } from '#shared/types/analysis'
import type { Block, BlockDefinition, BlockRole } from '#shared/types/block'
import type { BlockFields } from './blocksClient'
import { readTypedGain } from './readTypedGain'
import { emptyGain, typedGain, type TypedGain } from './TypedGain'
import type { TypedProblem } from './TypedSource'

/** A block as it stands in the editor. */
export interface TypedBlock {
  name: string
  role: BlockRole
  unitIn: string
  unitOut: string
  notes: string
  /** in every condition that has none of its own; null where there is none */
  shared: TypedGain | null
  /** by condition id */
  own: Record<string, TypedGain>
}

export const newBlock = (unit: FrequencyUnit): TypedBlock => ({ name: '', role: 'plant', unitIn: '', unitOut: '', notes: '', shared: emptyGain(unit), own: {} })

/** The texts of a stored block. */
export function typedBlock({ name, role, unitIn, unitOut, notes, definition, byCondition }: Block, unit: FrequencyUnit): TypedBlock {
  return {
    name, role, unitIn, unitOut, notes,
    shared: definition === null ? null : typedGain(definition, unit),
    own: Object.fromEntries(Object.entries(byCondition).map(([id, gain]) => [id, typedGain(gain, unit)])),
  }
}

/** The block that was typed, or every field that cannot be read by its path in what the routes take: 'definition.gain', 'byCondition.7.rows[0][1]'. */
export function readTypedBlock(typed: TypedBlock): { fields: BlockFields } | { problems: TypedProblem[] } {
  const problems: TypedProblem[] = []
  const read = (gain: TypedGain, path: string): BlockDefinition | null => {
    const answer = readTypedGain(gain)
    if ('definition' in answer) return answer.definition
    problems.push(...answer.problems.map(problem => ({ ...problem, path: `${path}.${problem.path}` })))
    return null
  }
  const name = typed.name.trim()
  if (!/^[A-Za-z]\w*$/.test(name)) problems.push({ path: 'name', message: name === '' ? 'Type the name, as expressions take it.' : 'A name for expressions is a letter, then letters, digits and underscores.' })
  const definition = typed.shared === null ? null : read(typed.shared, 'definition')
  const byCondition: Record<number, BlockDefinition> = {}
  for (const [id, gain] of Object.entries(typed.own)) {
    const own = read(gain, `byCondition.${id}`)
    if (own !== null) byCondition[Number(id)] = own
  }
  const { role, unitIn, unitOut, notes } = typed
  return problems.length > 0 ? { problems } : { fields: { name, role, unitIn: unitIn.trim(), unitOut: unitOut.trim(), notes: notes.trim(), definition, byCondition } }
}
