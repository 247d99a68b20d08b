import { ensureDebianPrograms } from './setUp/ensureDebianPrograms.mjs'
import { ensurePackages } from './setUp/ensurePackages.mjs'
import { dataFolder } from './setUp/paths.mjs'
import { requireStep } from './setUp/runStep.mjs'

/** `npm run dev`: the development server with hot reload, on the same data folder as `npm start`. */
await ensurePackages()
await ensureDebianPrograms(['chromium'])
await requireStep('The development server', 'npx', ['--no-install', 'nuxt', 'dev'], {
  env: { UV_THREADPOOL_SIZE: '16', WIDEBERTH_DATA: dataFolder(), NUXT_TELEMETRY_DISABLED: '1' },
})
