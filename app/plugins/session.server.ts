/** The authentication module asks for the session only when its own marker cookie is there; the session cookie is what counts. */
export default defineNuxtPlugin(async () => {
  const { status, getSession } = useAuth()
  if (status.value === 'authenticated') return
  const cookies = useRequestHeaders(['cookie']).cookie ?? ''
  if (/(?:^|; *)(?:__Host-)?wideberth-session=/.test(cookies)) await getSession({ force: true })
})
