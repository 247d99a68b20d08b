import type { Actor, ServiceContext } from '#server/services/context'

/** A context for services: this person, and a clock that stands at a given time, or goes. */
export const contextOf = (actor: Actor, time?: string): ServiceContext => ({ actor, clock: () => time === undefined ? new Date() : new Date(time) })
