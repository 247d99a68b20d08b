import type { H3Event } from 'h3'
import { publicAddress } from '../adapters/publicAddress'

const isSecure = () => publicAddress().protocol === 'https:'

/** The prefix makes browsers refuse the cookie from anything but this host over https; it cannot be used without https. */
const cookieName = () => isSecure() ? '__Host-wideberth-session' : 'wideberth-session'

const attributes = () => ({ httpOnly: true, sameSite: 'lax' as const, secure: isSecure(), path: '/' })

/** The secret of the session in a request, if it carries one. */
export const readSessionCookie = (event: H3Event): string | undefined => getCookie(event, cookieName())

/** Hands the secret to the browser. The session's own life is kept on the server; the cookie ends with the browser at the latest after it. */
export const writeSessionCookie = (event: H3Event, secret: string, maxAge: number): void => setCookie(event, cookieName(), secret, { ...attributes(), maxAge })

export const clearSessionCookie = (event: H3Event): void => deleteCookie(event, cookieName(), attributes())
