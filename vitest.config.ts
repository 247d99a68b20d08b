import { fileURLToPath } from 'node:url'
import { defineVitestProject } from '@nuxt/test-utils/config'
import { defineConfig } from 'vitest/config'

const folder = (path: string) => fileURLToPath(new URL(path, import.meta.url))
const resolve = { alias: { '#shared': folder('./shared'), '#server': folder('./server'), '~': folder('./app') } }

/** One project a kind of test; `npm test` runs them all, `npm run test:unit` and its sisters one each. */
export default defineConfig({
  test: {
    projects: [
      { resolve, test: { name: 'unit', include: ['tests/unit/**/*.test.ts'], testTimeout: 60_000 } },
      { resolve, test: { name: 'reference', include: ['tests/reference/**/*.test.ts'], testTimeout: 600_000 } },
      { resolve, test: { name: 'integration', globalSetup: ['tests/integration/globalSetup.ts'], include: ['tests/integration/**/*.test.ts'], testTimeout: 60_000 } },
      { resolve, test: { name: 'api', globalSetup: ['tests/api/globalSetup.ts'], include: ['tests/api/**/*.test.ts'], testTimeout: 120_000, hookTimeout: 300_000, fileParallelism: false } },
      { resolve, test: { name: 'e2e', include: ['tests/e2e/**/*.test.ts'], testTimeout: 300_000, hookTimeout: 600_000, fileParallelism: false } },
      await defineVitestProject({ test: { name: 'nuxt', include: ['tests/nuxt/**/*.test.ts'], environment: 'nuxt', testTimeout: 30_000, hookTimeout: 60_000 } }),
    ],
  },
})
