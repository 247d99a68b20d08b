import { ApiError } from './ApiError'

export type ApiMethod = 'GET' | 'POST' | 'PUT' | 'PATCH' | 'DELETE'

interface CallOptions {
  body?: unknown
  query?: Record<string, string | number>
  signal?: AbortSignal
}

let signedOut: (() => void) | null = null

/** Registers what happens in the browser when a route answers that nobody is signed in. */
export function onSignedOut(handler: () => void): void {
  signedOut = handler
}

/**
 * The one way from the browser to the API. The reply is what shared/types says of the route; a refusal is thrown as
 * an ApiError. An ended session goes to the sign-in page with the way back, and is thrown too, so that forms stay as they are.
 */
export async function callApi<Reply>(method: ApiMethod, path: string, options: CallOptions = {}): Promise<Reply> {
  try {
    const body = options.body as BodyInit | Record<string, unknown> | undefined
    return await $fetch<Reply>(path, { method, body, query: options.query, signal: options.signal, retry: false }) as Reply
  }
  catch (failure) {
    const error = ApiError.from(failure)
    if (error.code === 'signedOut' && signedOut !== null) signedOut()
    throw error
  }
}
