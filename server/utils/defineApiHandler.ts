import { randomUUID } from 'node:crypto'
import type { EventHandler, H3Event } from 'h3'
import type { z } from 'zod'
import { AppError } from '#shared/errors/AppError'
import type { Role } from '#shared/types/person'
import { routeActions, type RouteKey } from '#shared/access/routeActions'
import { assertSameOrigin } from '../access/assertSameOrigin'
import { authorize } from '../access/authorize'
import { describeFailure } from '../http/describeFailure'
import { parseInput } from '../http/parseInput'
import { readJsonBody } from '../http/readJsonBody'
import { readSessionCookie } from '../http/sessionCookie'
import { logger } from '../log/logger'
import type { Actor, OpenContext, ServiceContext } from '../services/context'
import { findSession } from '../services/sessions/findSession'

/** The names in brackets of a route. */
type ParamNames<Path extends string> = Path extends `${string}[${infer Name}]${infer Rest}` ? Name | ParamNames<Rest> : never
type ParamsOf<Key extends RouteKey> = { [Name in ParamNames<Key>]: Name extends `${string}Id` ? number : string }
type IsOpen<Key extends RouteKey> = (typeof routeActions)[Key] extends 'use the sign-in pages' | 'use own session' ? true : false
type NoSchema = z.ZodUndefined

export interface ApiRequest<Key extends RouteKey, Body, Query> {
  event: H3Event
  /** who asks; null on the pages that need no sign-in */
  actor: IsOpen<Key> extends true ? Actor | null : Actor
  /** what services are given */
  context: IsOpen<Key> extends true ? OpenContext : ServiceContext
  /** ids are numbers; anything else in the path is as it was typed */
  params: ParamsOf<Key>
  body: Body
  query: Query
  /** the system the route is about, null where it is about none */
  systemId: number | null
  /** the roles of the person in that system */
  roles: Role[]
}

export interface ApiOptions<Body extends z.ZodType, Query extends z.ZodType> {
  /** Schema of a JSON body. Without it no body is read: a handler of raw bytes or files reads the request itself. */
  body?: Body
  query?: Query
  /** bytes a JSON body may hold. @default 1,000,000 */
  bodyLimit?: number
  /** @default 200 */
  status?: number
}

const readParams = (event: H3Event): Record<string, number | string> => Object.fromEntries(Object.entries(getRouterParams(event, { decode: true })).map(([name, text]) => {
  if (!name.endsWith('Id')) return [name, text]
  if (!/^[1-9]\d{0,14}$/.test(text)) throw new AppError('notFound', 'There is nothing here, or nothing that you may see.')
  return [name, Number(text)]
}))

/**
 * The one way to define an API route. In this order: a change must come from our own pages; the session is read; the rule of
 * `shared/access` for this route is asked with the facts of the system concerned; the input is read by its schemas; then `handle` runs
 * and its result is the reply. Every failure becomes a reply in one place.
 *
 * @param key the route as in `routeActions`, so that a route without a rule does not compile
 */
export function defineApiHandler<Key extends RouteKey, Body extends z.ZodType = NoSchema, Query extends z.ZodType = NoSchema>(
  key: Key,
  options: ApiOptions<Body, Query>,
  handle: (request: ApiRequest<Key, z.output<Body>, z.output<Query>>) => unknown,
): EventHandler {
  return defineEventHandler(async (event) => {
    const requestId = randomUUID()
    try {
      assertSameOrigin({ method: event.method, header: name => getRequestHeader(event, name) })
      setResponseHeader(event, 'cache-control', 'no-store')
      const action = routeActions[key]
      // The session's own routes must answer even where the database does not, so they look for it themselves.
      const secret = action === 'use own session' ? undefined : readSessionCookie(event)
      const clock = () => new Date()
      const actor = secret === undefined ? null : (await findSession(secret, { actor: null, clock }))?.actor ?? null
      const params = readParams(event)
      const ids = Object.fromEntries(Object.entries(params).filter((entry): entry is [string, number] => typeof entry[1] === 'number'))
      const { systemId, roles } = await authorize(action, actor, ids, key.endsWith('/restore'))
      const request = {
        event,
        actor,
        context: { actor, clock },
        params,
        query: options.query && parseInput(options.query, getQuery(event)),
        body: options.body && parseInput(options.body, await readJsonBody(event, options.bodyLimit ?? 1_000_000)),
        systemId,
        roles,
      } as ApiRequest<Key, z.output<Body>, z.output<Query>>
      if (options.status !== undefined) setResponseStatus(event, options.status)
      return await handle(request)
    }
    catch (error) {
      return sendFailure(event, key, error, requestId)
    }
  })
}

function sendFailure(event: H3Event, key: RouteKey, error: unknown, requestId: string) {
  const { status, reply, unexpected } = describeFailure(error, requestId)
  if (unexpected) logger.error({ err: error, route: key, requestId }, 'A request failed.')
  else if (status === 403 || status === 429) logger.warn({ route: key, code: reply.error.code, requestId }, reply.error.message)
  if (event.node.res.headersSent) {
    // A reply that broke off while it was streamed cannot be taken back; cutting it tells the reader that it is not whole.
    event.node.res.destroy()
    return undefined
  }
  setResponseStatus(event, status)
  if (status === 429 && error instanceof AppError && typeof error.details === 'object' && error.details !== null && 'waitSeconds' in error.details) {
    setResponseHeader(event, 'retry-after', Number(error.details.waitSeconds))
  }
  return reply
}
