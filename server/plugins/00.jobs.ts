import { createChromiumPrinter } from '../adapters/chromium/chromiumPrinter'
import { createJobRunner } from '../jobs/createJobRunner'
import { createRenderRevision } from '../jobs/handlers/renderRevision'
import { logger } from '../log/logger'
import { reportRenderer } from '../reports/reportRenderer'

/**
 * Runs the queued jobs from the moment the database is open, those a former server left too; ends the running one and Chromium with the
 * server. It stands before the database, for hooks run in the order of the plugins: a running job is given back before the database closes.
 */
export default defineNitroPlugin((nitro) => {
  const printer = createChromiumPrinter()
  const runner = createJobRunner({
    handlers: { renderRevision: createRenderRevision({ renderHtml: reportRenderer, printer }) },
    onFault: (error, jobId) => logger.error({ err: error, jobId }, 'A job failed.'),
  })
  nitro.hooks.hook('database:open', () => runner.start())
  nitro.hooks.hook('close', async () => {
    await runner.stop()
    await printer.close()
  })
})
