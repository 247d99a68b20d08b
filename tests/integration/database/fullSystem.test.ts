import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { limits } from '#shared/schemas/limits'
import { ConditionRow } from '#server/database/models/ConditionRow'
import { LoopRow } from '#server/database/models/LoopRow'
import { copyCondition } from '#server/services/conditions/copyCondition'
import { deleteCondition } from '#server/services/conditions/deleteCondition'
import { restoreCondition } from '#server/services/conditions/restoreCondition'
import { copyLoop } from '#server/services/loops/copyLoop'
import { deleteLoop } from '#server/services/loops/deleteLoop'
import { restoreLoop } from '#server/services/loops/restoreLoop'
import { buildCondition, buildLoop } from '../../factories/buildSystem'
import { contextOf } from '../../factories/contextOf'
import { openTestDatabase } from '../../factories/openTestDatabase'
import { seedTeam, type SeededTeam } from '../../factories/seedTeam'

let database: Awaited<ReturnType<typeof openTestDatabase>>
let team: SeededTeam
const engineer = () => contextOf(team.people.engineer)
const numbered = (count: number) => Array.from({ length: count }, (_, index) => ({ code: `N${index}`, name: `N${index}`, notes: '', position: index + 10, version: 1, createdAt: '2026-12-01T09:00:00.000Z' }))

beforeAll(async () => {
  database = await openTestDatabase()
  team = await seedTeam()
})
afterAll(() => database.close())

describe('a system that holds as many rows as it may', () => {
  it('takes no further loop: neither a new one, nor a copy, nor one restored', async () => {
    const systemId = team.system.id
    await deleteLoop((await buildLoop(systemId, engineer(), { code: 'GONE' })).id, engineer())
    const gone = await LoopRow.unscoped().findOne({ where: { code: 'GONE' }, rejectOnEmpty: true })
    await LoopRow.bulkCreate(numbered(limits.rows - 1).map(row => ({ ...row, systemId, axis: '', breakPoint: '', otherLoops: '', loopStates: [] })))
    const refused = { code: 'refused', message: `A system holds at most ${limits.rows} loops.` }
    await expect(buildLoop(systemId, engineer())).rejects.toMatchObject(refused)
    await expect(copyLoop(team.loop.id, { code: 'COPY', name: 'Copy' }, engineer())).rejects.toMatchObject(refused)
    await expect(restoreLoop(gone.id, engineer())).rejects.toMatchObject(refused)
  })

  it('takes no further operating condition either', async () => {
    const systemId = team.system.id
    const gone = await buildCondition(systemId, engineer(), { code: 'GONE' })
    await deleteCondition(gone.id, engineer())
    await ConditionRow.bulkCreate(numbered(limits.rows - 1).map(row => ({ ...row, systemId, coordinates: [], tags: [] })))
    const refused = { code: 'refused', message: `A system holds at most ${limits.rows} operating conditions.` }
    await expect(buildCondition(systemId, engineer())).rejects.toMatchObject(refused)
    await expect(copyCondition(team.condition.id, { code: 'COPY', name: 'Copy' }, engineer())).rejects.toMatchObject(refused)
    await expect(restoreCondition(gone.id, engineer())).rejects.toMatchObject(refused)
  })
})
