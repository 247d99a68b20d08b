import { callApi } from './apiClient'

/** Routes that nobody needs to be signed in for. Signing in and out itself goes through the authentication module. */
export const signInClient = {
  needsFirstAdministrator: () => callApi<{ needsFirstAdministrator: boolean }>('GET', '/api/auth/set-up').then(reply => reply.needsFirstAdministrator),
  createFirstAdministrator: (fields: { name: string, email: string, password: string }) => callApi<Record<string, never>>('POST', '/api/auth/set-up', { body: fields }),
  requestReset: (email: string) => callApi<Record<string, never>>('POST', '/api/auth/reset-request', { body: { email } }),
  setPassword: (token: string, password: string) => callApi<Record<string, never>>('POST', '/api/auth/password', { body: { token, password } }),
}
