import { closeDatabase, openDatabase } from '../database/database'
import { databaseFile } from '../database/databaseFile'
import { migrateDatabase } from '../database/migrateDatabase'
import { migrations } from '../database/migrations/migrations'
import { removeUnusedUploads } from '../services/uploads/removeUnusedUploads'

declare module 'nitropack' {
  interface NitroRuntimeHooks {
    'database:open': () => void
  }
}

/** Migrates and opens the database before the first request; a request that comes earlier waits. */
export default defineNitroPlugin((nitro) => {
  const file = databaseFile()
  const ready = migrateDatabase(file, migrations).then(async () => {
    openDatabase(file)
    await removeUnusedUploads(() => new Date())
    await nitro.hooks.callHook('database:open')
  })
  ready.catch((error: unknown) => {
    console.error(`The database ${file} cannot be opened: ${error instanceof Error ? error.message : String(error)}`)
    process.exit(1)
  })
  nitro.hooks.hook('request', async () => {
    await ready
  })
  nitro.hooks.hook('close', () => closeDatabase())
})
