import { writeFile } from 'node:fs/promises'
import { dirname, join } from 'node:path'
import { databaseFile } from '../database/databaseFile'
import { makeDemo } from '../demo/makeDemo'

/**
 * With WIDEBERTH_MAKE_DEMO=1 this process fills its empty database with the demo and ends: `npm start` runs it so in a folder
 * of its own and moves that in once it is whole. The file `demo-data` tells that the data are the demo's.
 */
export default defineNitroPlugin((nitro) => {
  if (process.env.WIDEBERTH_MAKE_DEMO !== '1') return
  nitro.hooks.hook('database:open', () => {
    makeDemo(words => console.error(words)).then(async () => {
      await writeFile(join(dirname(databaseFile()), 'demo-data'), '')
      await nitro.hooks.callHook('close')
      process.exit(0)
    }).catch((error: unknown) => {
      console.error('The demo data could not be made.', error)
      process.exit(1)
    })
  })
})
