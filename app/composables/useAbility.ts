import { can, type Action } from '#shared/access/rules'
import type { ComputedRef, MaybeRefOrGetter } from 'vue'

/** Whether the person signed in may do this, in this system where one is named: the same rules as the routes ask. */
export function useAbility(action: Action, systemId?: MaybeRefOrGetter<number | null>): ComputedRef<boolean> {
  const { person, memberships } = useSession()
  return computed(() => {
    const system = toValue(systemId) ?? null
    return can(action, {
      signedIn: person.value !== null,
      isAdministrator: person.value?.isAdministrator ?? false,
      roles: memberships.value.filter(membership => membership.systemId === system).map(membership => membership.role),
    })
  })
}
