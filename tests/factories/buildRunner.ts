import type { PdfPrinter } from '#server/adapters/chromium/PdfPrinter'
import { createJobRunner } from '#server/jobs/createJobRunner'
import type { JobRunner, JobRunnerOptions } from '#server/jobs/createJobRunner'
import { createRenderRevision } from '#server/jobs/handlers/renderRevision'
import { createHtmlRenderer } from '#server/reports/createHtmlRenderer'
import { readAssetsFromFolder } from '#server/reports/readAssetsFromFolder'

/** The server's runner of jobs with a printer of the test's choice and the project's own templates; faults of the program fail the test. */
export function buildRunner(printer: PdfPrinter, options: Partial<JobRunnerOptions> = {}): JobRunner & { faults: unknown[] } {
  const renderer = createHtmlRenderer(readAssetsFromFolder(process.cwd()))
  const faults: unknown[] = []
  const runner = createJobRunner({
    handlers: { renderRevision: createRenderRevision({ renderHtml: () => renderer, printer }) },
    progressTime: 0,
    pollTime: 200,
    onFault: error => faults.push(error),
    ...options,
  })
  return { ...runner, faults }
}
