import { Transaction } from 'sequelize'
import { transactionContext } from '../database/transactionContext'

/** Calls back once the running write transaction is committed, outside it; never when it is rolled back. Throws outside a transaction. */
export function afterCommit(call: () => void): void {
  const running = transactionContext.get('transaction')
  if (!(running instanceof Transaction)) throw new Error('there is no transaction to wait for')
  running.afterCommit(() => {
    transactionContext.runFresh(() => setImmediate(call))
  })
}
