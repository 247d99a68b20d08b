import { can } from '#shared/access/rules'
import type { Role } from '#shared/types/person'
import type { SystemSummary } from '#shared/types/system'
import { col, fn } from 'sequelize'
import { ConditionRow } from '../../database/models/ConditionRow'
import { LoopRow } from '../../database/models/LoopRow'
import { MembershipRow } from '../../database/models/MembershipRow'
import { ReportRow } from '../../database/models/ReportRow'
import { RevisionRow } from '../../database/models/RevisionRow'
import { SystemRow } from '../../database/models/SystemRow'
import { presentSystem } from '../../presenters/presentSystem'
import type { ServiceContext } from '../context'

/** The systems a person has a role in, by name; an administrator sees all. */
export async function listSystems(context: ServiceContext): Promise<SystemSummary[]> {
  const memberships = await MembershipRow.findAll({ where: { personId: context.actor.id } })
  const where = context.actor.isAdministrator ? {} : { id: memberships.map(membership => membership.systemId) }
  const systems = await SystemRow.findAll({ where, order: ['name', 'id'] })
  const ids = systems.map(system => system.id)
  const [loopCounts, conditionCounts, newestIssues] = await Promise.all([countBySystem(LoopRow, ids), countBySystem(ConditionRow, ids), newestIssueBySystem(ids)])
  return systems.map((system) => {
    const roles = memberships.filter(membership => membership.systemId === system.id).map((membership): Role => membership.role)
    const newestIssue = newestIssues.get(system.id) ?? null
    // To a customer nothing is told of what was not issued.
    if (!can('see loops, data and drafts', { signedIn: true, isAdministrator: context.actor.isAdministrator, roles })) {
      return { ...presentSystem(system), description: '', loopCount: null, conditionCount: null, roles, newestIssue }
    }
    return { ...presentSystem(system), loopCount: loopCounts.get(system.id) ?? 0, conditionCount: conditionCounts.get(system.id) ?? 0, roles, newestIssue }
  })
}

async function countBySystem(model: typeof LoopRow | typeof ConditionRow, systemId: number[]): Promise<Map<number, number>> {
  const rows = await (model as typeof LoopRow).findAll({ where: { systemId }, attributes: ['systemId', [fn('COUNT', col('id')), 'count']], group: ['systemId'], raw: true }) as unknown as { systemId: number, count: number }[]
  return new Map(rows.map(row => [row.systemId, row.count]))
}

/** The letter of the revision issued last over all reports of each system. */
async function newestIssueBySystem(systemId: number[]): Promise<Map<number, string>> {
  const reports = await ReportRow.findAll({ where: { systemId }, attributes: ['id', 'systemId'] })
  const issued = await RevisionRow.findAll({ where: { reportId: reports.map(report => report.id), state: 'issued' }, attributes: ['reportId', 'letter', 'issuedAt'], order: ['issuedAt'] })
  const systemOfReport = new Map(reports.map(report => [report.id, report.systemId]))
  return new Map(issued.flatMap((revision) => {
    const system = systemOfReport.get(revision.reportId)
    return system === undefined ? [] : [[system, revision.letter] as const]
  }))
}
