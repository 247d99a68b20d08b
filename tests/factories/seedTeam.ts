import type { Loop, OperatingCondition, System } from '#shared/types/system'
import type { Source } from '#shared/types/source'
import { replaceMembers } from '#server/services/members/replaceMembers'
import { buildPerson } from './buildPerson'
import { buildCondition, buildLoop, buildSource, buildSystem } from './buildSystem'
import { contextOf } from './contextOf'

/** One address for each standing a person can have towards a system. */
export const teamEmails = {
  engineer: 'engineer@example.org',
  checker: 'checker@example.org',
  approver: 'approver@example.org',
  customer: 'customer@example.org',
  administrator: 'administrator@example.org',
  outsider: 'outsider@example.org',
} as const

export interface SeededTeam {
  system: System
  loop: Loop
  condition: OperatingCondition
  source: Source
}

/** A system with one loop in one condition, and a person for each role in it, besides an administrator and an outsider without any. */
export async function seedTeam(): Promise<SeededTeam> {
  const engineer = await buildPerson({ name: 'Ada Engineer', email: teamEmails.engineer })
  for (const role of ['checker', 'approver', 'customer', 'outsider'] as const) await buildPerson({ name: `Bo ${role}`, email: teamEmails[role] })
  await buildPerson({ name: 'Cy administrator', email: teamEmails.administrator, isAdministrator: true })
  const context = contextOf(engineer)
  const system = await buildSystem(context, { name: 'Gangway', customer: 'A yard', documentNumber: 'D-1' })
  await replaceMembers(system.id, (['engineer', 'checker', 'approver', 'customer'] as const).map(role => ({ email: teamEmails[role], roles: [role] })), context)
  const loop = await buildLoop(system.id, context, { code: 'SL-P', name: 'Slew position' })
  const condition = await buildCondition(system.id, context, { code: 'CALM', name: 'Calm sea' })
  const source = await buildSource(loop.id, condition.id, context)
  return { system, loop, condition, source }
}
