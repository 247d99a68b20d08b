import { z } from 'zod'
import { finiteNumber, idField, lineText, notesField, versionField } from './fields'
import { limits } from './limits'

/** Names an expression gives a meaning of its own. */
const reservedNames = new Set(['s', 'z', 'i', 'j', 'e', 'pi', 'exp', 'sqrt', 'log', 'sin', 'cos', 'tan', 'abs'])

/** A name as expressions take it. */
export const parameterNameField = z.string().trim().max(limits.unit, `At most ${limits.unit} characters.`)
  .regex(/^[A-Za-z][A-Za-z0-9_]*$/, 'A letter, then letters, digits and underscores.')
  .refine(name => !reservedNames.has(name), 'This name has a meaning of its own in expressions.')

const parameterSchema = z.strictObject({
  id: idField.optional(),
  version: versionField.optional(),
  name: parameterNameField,
  unit: lineText.max(limits.unit, `At most ${limits.unit} characters.`),
  notes: notesField,
  /** by operating condition id */
  values: z.record(z.string().regex(/^[1-9]\d{0,15}$/, 'Must be the id of a condition.'), finiteNumber),
})

/** The parameters of a system, replaced as a whole; one without an id is new. `madeFrom`: ids of those the list was made from, so that none is lost unseen. */
export const parametersSchema = z.strictObject({
  madeFrom: z.array(idField).max(limits.parameters).optional(),
  parameters: z.array(parameterSchema).max(limits.parameters, `At most ${limits.parameters} parameters.`).superRefine((parameters, problems) => {
    const seen = new Set<string>()
    parameters.forEach(({ name }, index) => {
      if (seen.has(name)) problems.addIssue({ code: 'custom', path: [index, 'name'], message: `There are two parameters ${name}.` })
      seen.add(name)
    })
  }),
})

export type ParameterEntry = z.output<typeof parametersSchema>['parameters'][number]
