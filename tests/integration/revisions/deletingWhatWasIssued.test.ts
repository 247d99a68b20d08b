import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { ServiceContext } from '#server/services/context'
import { deleteReport } from '#server/services/reports/deleteReport'
import { createReport } from '#server/services/reports/createReport'
import { deleteSystem } from '#server/services/systems/deleteSystem'
import { buildPerson } from '../../factories/buildPerson'
import { buildSnapshot } from '../../factories/buildSnapshot'
import { buildSystem } from '../../factories/buildSystem'
import { contextOf } from '../../factories/contextOf'
import { openTestDatabase } from '../../factories/openTestDatabase'
import { seedReport } from '../../factories/seedReport'

describe('deleting what a customer may be reading', () => {
  let close: () => Promise<void>
  let context: ServiceContext

  beforeAll(async () => {
    close = (await openTestDatabase()).close
    context = contextOf(await buildPerson())
  })
  afterAll(() => close())

  it('is refused for a report with an issued revision, and for its system', async () => {
    const system = await buildSystem(context)
    const { reportId } = await seedReport(system.id, [], [], buildSnapshot(), context.actor, context.actor)
    await expect(deleteReport(reportId, context)).rejects.toMatchObject({ code: 'refused' })
    await expect(deleteSystem(system.id, context)).rejects.toMatchObject({ code: 'refused' })
  })

  it('goes on where nothing was issued', async () => {
    const system = await buildSystem(context)
    const report = await createReport(system.id, { title: 'Margins', documentNumber: 'D-2' }, context)
    await expect(deleteReport(report.id, context)).resolves.toEqual({ id: report.id })
    await expect(deleteSystem(system.id, context)).resolves.toEqual({ id: system.id })
  })
})
