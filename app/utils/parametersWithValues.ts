import type { ParameterFields } from '~/services/systemsClient'
import type { Parameter } from '#shared/types/system'
import { ApiError } from '~/services/ApiError'
import { parseNumberText } from './parseNumberText'

interface TypedValues {
  parameters: readonly Parameter[]
  /** as typed, by name */
  values: Record<string, string>
  /** the condition whose values were typed */
  conditionId: number
  /** the conditions in which a new parameter gets its value, so that none is left without one */
  newIn: readonly number[]
}

/**
 * The whole list of parameters with values typed over those stored, as it is to be saved; null where none was typed.
 * An emptied field takes the value away.
 *
 * @throws ApiError naming the parameter whose value is no number
 */
export function parametersWithValues({ parameters, values, conditionId, newIn }: TypedValues): ParameterFields[] | null {
  if (Object.keys(values).length === 0) return null
  const list: ParameterFields[] = parameters.map(({ id, version, name, unit, notes, values }) => ({ id, version, name, unit, notes, values: { ...values } }))
  for (const [name, text] of Object.entries(values)) {
    const value = parseNumberText(text)
    if (Number.isNaN(value)) throw new ApiError('invalidInput', `${name}: '${text.trim()}' is not a number. Write it like 12.5 or 1.2e3.`)
    const known = list.find(candidate => candidate.name === name)
    if (known === undefined) {
      if (value !== null) list.push({ name, unit: '', notes: '', values: Object.fromEntries(newIn.map(id => [id, value])) })
    }
    else if (value === null) known.values = Object.fromEntries(Object.entries(known.values).filter(([id]) => Number(id) !== conditionId))
    else known.values[conditionId] = value
  }
  return list
}
