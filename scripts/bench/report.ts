// The PDF of the demo's report from its stored snapshot, against what Chromium alone needs to print the finished HTML.
import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { monitorEventLoopDelay } from 'node:perf_hooks'
import { join } from 'node:path'
import { pathToFileURL } from 'node:url'
import puppeteer from 'puppeteer-core'
import type { Browser } from 'puppeteer-core'
import { loopGains } from '#server/reports/figures/loopGains'
import type { ReportSnapshot } from '#shared/types/snapshot'
import { closeAnalysisPool } from '#server/adapters/analysisPool/analysisPool'
import { createChromiumPrinter } from '#server/adapters/chromium/chromiumPrinter'
import { findChromium } from '#server/adapters/chromium/findChromium'
import { closeDatabase, openDatabase } from '#server/database/database'
import { migrateDatabase } from '#server/database/migrateDatabase'
import { migrations } from '#server/database/migrations/migrations'
import { gangway } from '#server/demo/gangway'
import { storeDemoPeople } from '#server/demo/storeDemoPeople'
import { storeDemoSystem } from '#server/demo/storeDemoSystem'
import { buildReportView } from '#server/reports/buildReportView'
import { writeSnapshot } from '#server/reports/snapshotText'
import { collectSnapshot } from '#server/reports/collectSnapshot'
import { createHtmlRenderer } from '#server/reports/createHtmlRenderer'
import { drawReportFigures } from '#server/reports/figures/drawReportFigures'
import { readAssetsFromFolder } from '#server/reports/readAssetsFromFolder'
import { sha256Of } from '#server/reports/sha256Of'
import { createReport } from '#server/services/reports/createReport'
import { findReport } from '#server/services/reports/findReport'

const rounds = 5
const median = (values: number[]) => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? Number.NaN

/** The demo's report as it is frozen, from a database of its own. */
async function frozenDemo(folder: string): Promise<{ text: string, collecting: number }> {
  process.env.WIDEBERTH_ANALYSIS_WORKER = join(folder, 'analysis-worker.mjs')
  // Loaded from its own place, for it finds the sources from there.
  const { bundleWorker } = await import(pathToFileURL(join(process.cwd(), 'scripts/workers/bundleWorker.mjs')).href) as typeof import('../workers/bundleWorker.mjs')
  await bundleWorker('analysis-worker', process.env.WIDEBERTH_ANALYSIS_WORKER)
  const file = join(folder, 'wideberth.sqlite')
  await migrateDatabase(file, migrations)
  openDatabase(file)
  try {
    const [actor] = (await storeDemoPeople(new Date())).values()
    if (!actor) throw new Error('the demo has no people')
    const context = { actor, clock: () => new Date('2026-01-05T09:00:00Z') }
    const system = await storeDemoSystem(gangway, context)
    const { id } = await createReport(system.id, gangway.report, context)
    const report = await findReport(id)
    const start = performance.now()
    const text = writeSnapshot(await collectSnapshot(report, { letter: 'A', draftNumber: 1, changeNote: 'First issue' }, context))
    return { text, collecting: performance.now() - start }
  }
  finally {
    await closeDatabase()
    await closeAnalysisPool()
  }
}

/** ms that a warm Chromium needs for a finished file, and nothing of ours. */
async function printAlone(browser: Browser, file: string): Promise<number> {
  const start = performance.now()
  const page = await browser.newPage()
  await page.goto(pathToFileURL(file).href, { waitUntil: 'load' })
  await page.pdf({ preferCSSPageSize: true, printBackground: true, tagged: true, outline: true })
  await page.close()
  return performance.now() - start
}

async function launchAlone(): Promise<Browser> {
  const executablePath = findChromium()
  if (!executablePath) throw new Error('Chromium was not found')
  return puppeteer.launch({ executablePath, headless: true, args: process.getuid?.() === 0 ? ['--no-sandbox'] : [] })
}

const folder = await mkdtemp(join(tmpdir(), 'wideberth-bench-'))
const printer = createChromiumPrinter()
const alone = await launchAlone()
try {
  const { text, collecting } = await frozenDemo(folder)
  const renderHtml = await createHtmlRenderer(readAssetsFromFolder(process.cwd()))
  const steps = { figures: [] as number[], html: [] as number[], pdf: [] as number[], all: [] as number[], alone: [] as number[], ratio: [] as number[], delay: [] as number[], longest: [] as number[] }
  let html = ''
  let size = 0
  for (let round = 0; round <= rounds; round++) {
    const delay = monitorEventLoopDelay({ resolution: 5 })
    delay.enable()
    const start = performance.now()
    const snapshot = JSON.parse(text) as ReportSnapshot
    const drawn = await drawReportFigures(snapshot, { ...loopGains, progress: async () => undefined })
    const drawnAt = performance.now()
    const edition = { edition: 'draft' as const, label: 'A draft 1', preparedBy: snapshot.frozenBy, preparedAt: snapshot.frozenAt, approvedBy: null, issuedAt: null, snapshotSha256: sha256Of(text) }
    const view = buildReportView(snapshot, edition, drawn)
    html = await renderHtml(view)
    const laidOutAt = performance.now()
    size = (await printer.print({ html, title: view.documentTitle, time: new Date(snapshot.frozenAt) })).length
    const end = performance.now()
    delay.disable()
    await writeFile(join(folder, 'report.html'), html)
    // One after the other in each round, so that both meet the same load of the machine.
    const printedAlone = await printAlone(alone, join(folder, 'report.html'))
    // The first round warms up.
    if (round === 0) continue
    steps.alone.push(printedAlone)
    steps.delay.push(delay.percentile(99) / 1e6)
    steps.longest.push(delay.max / 1e6)
    steps.ratio.push((end - start) / printedAlone)
    steps.figures.push(drawnAt - start)
    steps.html.push(laidOutAt - drawnAt)
    steps.pdf.push(end - laidOutAt)
    steps.all.push(end - start)
  }
  const pairs = (JSON.parse(text) as ReportSnapshot).cells.length
  console.log(`  ${pairs} loop-condition pairs; snapshot ${(text.length / 1e6).toFixed(1)} MB, collected in ${collecting.toFixed(0)} ms; HTML ${(html.length / 1e6).toFixed(1)} MB, PDF ${(size / 1e6).toFixed(1)} MB`)
  console.log(`  from snapshot to PDF, median of ${rounds}: ${median(steps.all).toFixed(0)} ms (figures ${median(steps.figures).toFixed(0)}, HTML ${median(steps.html).toFixed(0)}, print ${median(steps.pdf).toFixed(0)}); event loop held up 99th percentile ${median(steps.delay).toFixed(0)} ms, longest ${median(steps.longest).toFixed(0)} ms`)
  console.log(`  Chromium alone on the finished HTML: ${median(steps.alone).toFixed(0)} ms; ratio, median of rounds, ${median(steps.ratio).toFixed(2)} (goal: at most 1.5)`)
}
finally {
  await Promise.all([printer.close(), alone.close()])
  await rm(folder, { recursive: true, force: true })
}
