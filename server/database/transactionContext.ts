import { AsyncLocalStorage } from 'node:async_hooks'

type Slots = Map<string, unknown>

const storage = new AsyncLocalStorage<Slots>()

/**
 * The namespace Sequelize keeps its running transaction in, so that every query inside `writeTransaction` joins it by itself:
 * one that forgot would wait five seconds for the writer it is part of, then fail.
 */
export const transactionContext = {
  get: (key: string): unknown => storage.getStore()?.get(key),
  set: (key: string, value: unknown): void => {
    storage.getStore()?.set(key, value)
  },
  run: <T>(work: (slots: Slots) => T): T => {
    const slots: Slots = new Map(storage.getStore())
    return storage.run(slots, () => work(slots))
  },
  /** Runs work with no transaction, whatever surrounds the call. */
  runFresh: <T>(work: () => T): T => storage.run(new Map(), work),
  bind: <T>(work: T): T => work,
}
