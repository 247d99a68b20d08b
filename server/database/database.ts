import PQueue from 'p-queue'
import { Sequelize, Transaction } from 'sequelize'
import { configuredSqlite } from './configuredSqlite'
import { defineModels } from './models/defineModels'
import { transactionContext } from './transactionContext'

interface OpenDatabase {
  sequelize: Sequelize
  file: string
}

let open: OpenDatabase | undefined

/** One writer at a time: waiting BEGINs would block the threads the holder needs to finish. */
const writers = new PQueue({ concurrency: 1 })

/** Opens the database file (which `migrateDatabase` has brought up to date) and binds the models to it. */
export function openDatabase(file: string): Sequelize {
  if (open) throw new Error(`The database ${open.file} is open already.`)
  Sequelize.useCLS(transactionContext)
  const sequelize = new Sequelize({
    dialect: 'sqlite',
    dialectModule: configuredSqlite,
    storage: file,
    logging: false,
    retry: { max: 1 },
    define: { underscored: true, timestamps: false },
  })
  defineModels(sequelize)
  open = { sequelize, file }
  return sequelize
}

/** The open database, for what models cannot say. */
export function database(): Sequelize {
  if (!open) throw new Error('The database is not open.')
  return open.sequelize
}

/** Waits for the running write, then closes the database. */
export async function closeDatabase(): Promise<void> {
  await writers.onIdle()
  const closing = open
  open = undefined
  await closing?.sequelize.close()
}

/**
 * Runs `work` as one write transaction, after the writes asked for before it. All queries inside join it by themselves; a call inside another
 * joins that one. Never wait for the network, Chromium or mail inside. The one place where a transaction is begun.
 */
export async function writeTransaction<T>(work: (transaction: Transaction) => Promise<T>): Promise<T> {
  const running = transactionContext.get('transaction')
  if (running instanceof Transaction) return work(running)
  const result = await writers.add(() => transactionContext.runFresh(() => database().transaction({ type: Transaction.TYPES.IMMEDIATE }, work)))
  return result as T
}
