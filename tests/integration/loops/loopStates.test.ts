import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { loopChangeSchema } from '#shared/schemas/loop'
import type { Loop, System } from '#shared/types/system'
import type { ServiceContext } from '#server/services/context'
import { copySystem } from '#server/services/systems/copySystem'
import { deleteLoop } from '#server/services/loops/deleteLoop'
import { listLoops } from '#server/services/loops/listLoops'
import { restoreLoop } from '#server/services/loops/restoreLoop'
import { updateLoop } from '#server/services/loops/updateLoop'
import { buildPerson } from '../../factories/buildPerson'
import { buildLoop, buildSystem } from '../../factories/buildSystem'
import { contextOf } from '../../factories/contextOf'
import { openTestDatabase } from '../../factories/openTestDatabase'

describe('what the other loops do while one is open', () => {
  let context: ServiceContext
  let close: () => Promise<void>
  let system: System
  let rate: Loop
  let position: Loop
  const statesOf = async (systemId: number, code: string) => (await listLoops(systemId)).find(loop => loop.code === code)?.loopStates

  beforeAll(async () => {
    close = (await openTestDatabase()).close
    context = contextOf(await buildPerson())
    system = await buildSystem(context)
    rate = await buildLoop(system.id, context, { code: 'SL-R' })
    position = await buildLoop(system.id, context, { code: 'SL-P' })
  })
  afterAll(() => close())

  it.each([
    ['a gain of a loop that is not held', [{ loopId: 1, state: 'open', gain: 2 }], ['loopStates', 0]],
    ['a held loop without its gain', [{ loopId: 1, state: 'held' }], ['loopStates', 0, 'gain']],
    ['another word', [{ loopId: 1, state: 'nominal' }], ['loopStates', 0, 'state']],
    ['a loop twice', [{ loopId: 1, state: 'open' }, { loopId: 1, state: 'closed' }], ['loopStates']],
  ])('is not %s', (_, loopStates, path) => {
    expect(loopChangeSchema.safeParse({ version: 1, loopStates }).error?.issues[0]?.path).toEqual(path)
  })

  it('is not told of the loop itself, of a loop of another system, nor of a block that is not there', async () => {
    const foreign = await buildLoop((await buildSystem(context)).id, context)
    await expect(updateLoop(rate.id, { version: 1, loopStates: [{ loopId: rate.id, state: 'open' }] }, context)).rejects.toMatchObject({ code: 'invalidInput', path: 'loopStates[0].loopId' })
    await expect(updateLoop(rate.id, { version: 1, loopStates: [{ loopId: position.id, state: 'open' }, { loopId: foreign.id, state: 'open' }] }, context)).rejects.toMatchObject({ code: 'invalidInput', path: 'loopStates[1].loopId' })
    await expect(updateLoop(rate.id, { version: 1, breakAt: { block: 'C', side: 'output' } }, context)).rejects.toMatchObject({ code: 'invalidInput', path: 'breakAt.block' })
    expect(await statesOf(system.id, 'SL-R')).toEqual([])
  })

  it('is kept of a loop that is deleted, and seen again once that is restored', async () => {
    await updateLoop(rate.id, { version: 1, loopStates: [{ loopId: position.id, state: 'held', gain: 0.5 }] }, context)
    await deleteLoop(position.id, context)
    expect(await statesOf(system.id, 'SL-R')).toEqual([])
    await restoreLoop(position.id, context)
    expect(await statesOf(system.id, 'SL-R')).toEqual([{ loopId: position.id, state: 'held', gain: 0.5 }])
  })

  it('names, in a copy of the system, the loops of the copy', async () => {
    const copy = await copySystem(system.id, 'Copy', context)
    const twin = (await listLoops(copy.id)).find(loop => loop.code === 'SL-P')
    expect(await statesOf(copy.id, 'SL-R')).toEqual([{ loopId: twin?.id, state: 'held', gain: 0.5 }])
  })
})
