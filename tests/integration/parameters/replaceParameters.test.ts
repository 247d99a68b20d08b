import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { replaceParameters } from '#server/services/parameters/replaceParameters'
import type { ServiceContext } from '#server/services/context'
import { buildPerson } from '../../factories/buildPerson'
import { buildSystem } from '../../factories/buildSystem'
import { contextOf } from '../../factories/contextOf'
import { openTestDatabase } from '../../factories/openTestDatabase'

describe('replacing the parameters of a system', () => {
  let context: ServiceContext
  let close: () => Promise<void>

  beforeAll(async () => {
    close = (await openTestDatabase()).close
    context = contextOf(await buildPerson())
  })
  afterAll(() => close())

  const entry = (name: string) => ({ name, unit: '', notes: '', values: {} })

  it('refuses a list made before somebody else added a parameter, and keeps theirs', async () => {
    const system = await buildSystem(context)
    const first = await replaceParameters(system.id, [entry('k')], context, [])
    const madeFrom = first.map(parameter => parameter.id)
    const both = await replaceParameters(system.id, [...first, entry('theirs')], context, madeFrom)
    await expect(replaceParameters(system.id, [{ ...both[0]!, unit: '1/s' }], context, madeFrom)).rejects.toMatchObject({ code: 'conflict', details: { current: both } })
  })

  it('takes a parameter away that the list was made from and no longer holds', async () => {
    const system = await buildSystem(context)
    const first = await replaceParameters(system.id, [entry('k'), entry('gone')], context, [])
    const left = await replaceParameters(system.id, first.slice(0, 1), context, first.map(parameter => parameter.id))
    expect(left.map(parameter => parameter.name)).toEqual(['k'])
  })
})
