import type { Role } from '../types/person'

/**
 * Who may do what: the one rule file that the routes and the screens ask.
 * `roles` are those held in the system concerned; what is of a system the person has no role in is not found (404), not refused,
 * except for administrators, who may read every system and change none without a role in it.
 */
export interface AccessFacts {
  signedIn: boolean
  isAdministrator: boolean
  roles: readonly Role[]
}

type Rule = (facts: AccessFacts) => boolean

const anyone: Rule = () => true
const signedIn: Rule = facts => facts.signedIn
const administrator: Rule = facts => facts.signedIn && facts.isAdministrator
const holding = (...roles: Role[]): Rule => facts => facts.signedIn && roles.some(role => facts.roles.includes(role))
const either = (...rules: Rule[]): Rule => facts => rules.some(rule => rule(facts))

export const actionRules = {
  'use the sign-in pages': anyone,
  'use own session': anyone,
  'list own systems': signedIn,
  'analyse an input': signedIn,
  'manage people': administrator,
  'read the outbox': administrator,
  'change the brand': administrator,
  'read the brand': signedIn,
  'create a system': signedIn,
  'see loops, data and drafts': either(holding('engineer', 'checker', 'approver'), administrator),
  'change loops, criteria and drafts': holding('engineer'),
  'manage members': either(holding('engineer'), administrator),
  'freeze a revision': holding('engineer'),
  'issue a revision': holding('approver'),
  // of an edition one may not ask for, only one's own: the service looks at the job
  'cancel a rendering': holding('engineer', 'approver'),
  'read issued revisions': either(holding('engineer', 'checker', 'approver', 'customer'), administrator),
} satisfies Record<string, Rule>

export type Action = keyof typeof actionRules

/** Whether someone with these facts may do this. */
export const can = (action: Action, facts: AccessFacts): boolean => actionRules[action](facts)
