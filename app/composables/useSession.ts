import type { Membership, Person } from '#shared/types/person'

/** The person signed in, its memberships, and how to read them again after they changed. */
export function useSession() {
  const { data, getSession } = useAuth()
  const person = computed<Person | null>(() => data.value?.person ?? null)
  const memberships = computed<readonly Membership[]>(() => data.value?.memberships ?? [])
  const refresh = () => getSession({ force: true })
  return { person, memberships, refresh }
}
