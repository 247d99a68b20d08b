import { join } from 'node:path'
import { defineNuxtModule } from '@nuxt/kit'
import { bundleWorker, workers } from '../scripts/workers/bundleWorker.mjs'

/**
 * Bundles the worker threads of the server, which Nitro does not, into the folder of its entry: once in a build, and in development each
 * time the server is compiled again.
 */
export default defineNuxtModule({
  meta: { name: 'workers' },
  setup(_, nuxt) {
    nuxt.hook('nitro:init', (nitro) => {
      nitro.hooks.hook('compiled', async () => {
        for (const name of Object.keys(workers)) await bundleWorker(name, join(nitro.options.output.serverDir, `${name}.mjs`))
      })
    })
  },
})
