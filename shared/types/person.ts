/** A role a person holds in one system. A person may hold several. */
export type Role = 'engineer' | 'checker' | 'approver' | 'customer'

export interface Person {
  id: number
  email: string
  name: string
  isAdministrator: boolean
  /** ISO 8601, UTC; set while the account is disabled */
  disabledAt: string | null
  /** An invited person who has not set a password yet. */
  invitationOpen: boolean
}

export interface Membership {
  personId: number
  systemId: number
  role: Role
}

/** What GET /api/auth/session answers of the person signed in. */
export interface SessionReply {
  person: Person
  memberships: Membership[]
}
