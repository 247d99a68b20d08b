import { z } from 'zod'
import { codeField, finiteNumber, idField, lineField, nameField, notesField, versionField } from './fields'
import { limits } from './limits'

/** The block at which a loop is opened. */
export const breakAtField = z.strictObject({ block: nameField, side: z.enum(['input', 'output'], 'Must be input or output.') }).nullable()

const loopState = z.discriminatedUnion('state', [
  z.strictObject({ loopId: idField, state: z.enum(['closed', 'open']) }),
  z.strictObject({ loopId: idField, state: z.literal('held'), gain: finiteNumber }),
], 'Must be closed, open or held at a gain.')

const loopStatesField = z.array(loopState).max(limits.rows, `At most ${limits.rows} loops.`)
  .refine(states => new Set(states.map(state => state.loopId)).size === states.length, 'Each loop must stand once.')

const fields = {
  code: codeField,
  name: nameField,
  axis: lineField,
  breakPoint: notesField,
  otherLoops: notesField,
  breakAt: breakAtField,
  loopStates: loopStatesField,
  notes: notesField,
}

export const newLoopSchema = z.strictObject({
  ...fields,
  axis: lineField.default(''),
  breakPoint: notesField.default(''),
  otherLoops: notesField.default(''),
  breakAt: breakAtField.default(null),
  loopStates: loopStatesField.default([]),
  notes: notesField.default(''),
})
export const loopChangeSchema = z.strictObject(fields).partial().extend({ version: versionField })
export const loopCopySchema = z.strictObject({ code: codeField, name: nameField })

export type NewLoop = z.output<typeof newLoopSchema>
export type LoopChange = z.output<typeof loopChangeSchema>
export type LoopCopy = z.output<typeof loopCopySchema>
