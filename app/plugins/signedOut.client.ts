import { onSignedOut } from '~/services/apiClient'

/** When the session has ended: to the sign-in page, with the way back. Drafts of open forms stay in the tab. */
export default defineNuxtPlugin(() => {
  const router = useRouter()
  const { data, rawToken } = useAuthState()
  onSignedOut(() => {
    const route = router.currentRoute.value
    if (route.path === '/sign-in') return
    data.value = null
    rawToken.value = null
    void router.push({ path: '/sign-in', query: { redirect: route.fullPath, ended: 'yes' } })
  })
})
