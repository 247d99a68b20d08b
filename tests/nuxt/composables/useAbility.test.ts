import { mockNuxtImport } from '@nuxt/test-utils/runtime'
import { beforeEach, describe, expect, it, vi } from 'vitest'
import { ref } from 'vue'
import type { SessionReply } from '#shared/types/person'
import { useAbility } from '~/composables/useAbility'

const { session } = vi.hoisted(() => ({ session: { current: null as SessionReply | null } }))
mockNuxtImport('useAuth', () => () => ({ data: ref(session.current), status: ref('authenticated'), getSession: () => Promise.resolve(session.current), signIn: () => Promise.resolve(), signOut: () => Promise.resolve() }))

const person = { id: 1, email: 'a@tern.example', name: 'A', isAdministrator: false, disabledAt: null, invitationOpen: false }

describe('what the screens let a person do', () => {
  beforeEach(() => {
    session.current = { person, memberships: [{ personId: 1, systemId: 1, role: 'engineer' }, { personId: 1, systemId: 2, role: 'customer' }] }
  })

  it('is nothing for nobody', () => {
    session.current = null
    expect(useAbility('list own systems').value).toBe(false)
    expect(useAbility('change loops, criteria and drafts', 1).value).toBe(false)
  })

  it('is by the roles in the system concerned, not in another', () => {
    expect(useAbility('change loops, criteria and drafts', 1).value).toBe(true)
    expect(useAbility('change loops, criteria and drafts', 2).value).toBe(false)
    expect(useAbility('see loops, data and drafts', 2).value).toBe(false)
    expect(useAbility('read issued revisions', 2).value).toBe(true)
    expect(useAbility('see loops, data and drafts', 3).value).toBe(false)
  })

  it('lets an administrator see every system and change none', () => {
    session.current = { person: { ...person, isAdministrator: true }, memberships: [] }
    expect(useAbility('see loops, data and drafts', 3).value).toBe(true)
    expect(useAbility('change loops, criteria and drafts', 3).value).toBe(false)
    expect(useAbility('manage people').value).toBe(true)
  })

  it('follows the system that is open', () => {
    const systemId = ref<number | null>(2)
    const mayChange = useAbility('change loops, criteria and drafts', systemId)
    expect(mayChange.value).toBe(false)
    systemId.value = 1
    expect(mayChange.value).toBe(true)
  })
})
