import type { Loop, OperatingCondition, System } from '#shared/types/system'
import type { Source } from '#shared/types/source'
import type { Actor } from '#server/services/context'
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
  people: Record<keyof typeof teamEmails, Actor>
  system: System
  loop: Loop
  condition: OperatingCondition
  source: Source
}

/** A system with one loop in one condition, and a person for each role in it, besides an administrator and an outsider without any. */
export async function seedTeam(): Promise<SeededTeam> {
  const people = {
    engineer: await buildPerson({ name: 'Ada Engineer', email: teamEmails.engineer }),
    checker: await buildPerson({ name: 'Bo Checker', email: teamEmails.checker }),
    approver: await buildPerson({ name: 'Cy Approver', email: teamEmails.approver }),
    customer: await buildPerson({ name: 'Dee Customer', email: teamEmails.customer }),
    administrator: await buildPerson({ name: 'Fay Administrator', email: teamEmails.administrator, isAdministrator: true }),
    outsider: await buildPerson({ name: 'Gus Outsider', email: teamEmails.outsider }),
  }
  const context = contextOf(people.engineer)
  const system = await buildSystem(context, { name: 'Gangway', customer: 'A yard', documentNumber: 'D-1' })
  await replaceMembers(system.id, (['engineer', 'checker', 'approver', 'customer'] as const).map(role => ({ email: teamEmails[role], roles: [role] })), context)
  const loop = await buildLoop(system.id, context, { code: 'SL-P', name: 'Slew position' })
  const condition = await buildCondition(system.id, context, { code: 'CALM', name: 'Calm sea' })
  const source = await buildSource(loop.id, condition.id, context)
  return { people, system, loop, condition, source }
}
