import { rm } from 'node:fs/promises'
import PQueue from 'p-queue'
import puppeteer from 'puppeteer-core'
import type { Browser, Page } from 'puppeteer-core'
import { AppError } from '#shared/errors/AppError'
import type { PdfPrinter, PrintRequest } from './PdfPrinter'
import { findChromium } from './findChromium'
import { createProfile, removeStaleProfiles } from './printProfile'
import { serveOnce } from './serveOnce'
import { settlePdf } from './settlePdf'

export interface ChromiumOptions {
  /** @default the one found */
  executablePath?: string | null
  /** ms; a print that takes longer ends with the browser killed. @default 120000 */
  timeout?: number
  /** documents after which a browser is replaced. @default 50 */
  documentsPerBrowser?: number
  /** ms without work after which the browser is closed. @default 1800000 */
  idleTime?: number
}

interface Running {
  browser: Browser
  profile: string
  printed: number
}

const missing = 'Chromium was not found, so the PDF cannot be printed. Install it (Debian: apt-get install chromium) or set WIDEBERTH_CHROMIUM to its path, then render again.'

/** Chromium's own sandbox does not start for root; every other user keeps it. */
const flags = () => [
  '--no-proxy-server',
  '--host-resolver-rules=MAP * ~NOTFOUND, EXCLUDE 127.0.0.1',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
  '--disable-gpu',
  '--disable-dev-shm-usage',
  '--no-first-run',
  '--mute-audio',
  '--font-render-hinting=none',
  ...(process.getuid?.() === 0 ? ['--no-sandbox'] : []),
]

/** Only the document itself and what it carries as data: may be loaded. */
async function closeTheNetwork(page: Page, url: string): Promise<void> {
  await page.setJavaScriptEnabled(false)
  await page.setRequestInterception(true)
  page.on('request', (request) => {
    const mayPass = request.url() === url || request.url().startsWith('data:')
    // A request that is gone with its page has no one left to answer.
    const answered = mayPass ? request.continue() : request.abort('blockedbyclient')
    answered.catch(() => undefined)
  })
}

/**
 * Prints with one warm Chromium, one document at a time, each in a browser context of its own.
 * The browser is renewed after a crash (the print is tried once more), after a number of documents, and closed when idle.
 */
export function createChromiumPrinter(options: ChromiumOptions = {}): PdfPrinter {
  const { timeout = 120_000, documentsPerBrowser = 50, idleTime = 30 * 60_000 } = options
  const queue = new PQueue({ concurrency: 1 })
  let running: Running | null = null
  let idleTimer: NodeJS.Timeout | undefined

  async function stop(): Promise<void> {
    clearTimeout(idleTimer)
    const ended = running
    running = null
    if (!ended) return
    const child = ended.browser.process()
    await Promise.race([ended.browser.close(), new Promise(resolve => setTimeout(resolve, 3000).unref())]).catch(() => undefined)
    child?.kill('SIGKILL')
    await rm(ended.profile, { recursive: true, force: true, maxRetries: 3 })
  }

  async function warmBrowser(): Promise<Running> {
    if (running && (!running.browser.connected || running.printed >= documentsPerBrowser)) await stop()
    if (running) return running
    const executablePath = options.executablePath === undefined ? findChromium() : options.executablePath
    if (!executablePath) throw new AppError('unavailable', missing)
    await removeStaleProfiles()
    const profile = createProfile()
    try {
      // Over a pipe, Chromium ends with this process, however that ends.
      const browser = await puppeteer.launch({ executablePath, headless: true, pipe: true, args: flags(), userDataDir: profile, handleSIGINT: false, handleSIGTERM: false, handleSIGHUP: false })
      running = { browser, profile, printed: 0 }
      return running
    }
    catch (cause) {
      await rm(profile, { recursive: true, force: true })
      throw new AppError('unavailable', `Chromium at ${executablePath} did not start, so the PDF cannot be printed. Run it once by hand to see why, then render again.`, { cause })
    }
  }

  async function printOnce({ html, title, time, signal }: PrintRequest): Promise<Buffer> {
    const current = await warmBrowser()
    signal?.throwIfAborted()
    const context = await current.browser.createBrowserContext()
    const onAbort = () => void context.close().catch(() => undefined)
    signal?.addEventListener('abort', onAbort, { once: true })
    const served = await serveOnce(html)
    try {
      const page = await context.newPage()
      await closeTheNetwork(page, served.url)
      await page.goto(served.url, { waitUntil: 'load', timeout })
      const seen = await page.title()
      if (seen !== title) throw new AppError('refused', `The document changed while it was loaded for printing: its title reads '${seen}' in place of '${title}'.`)
      const pdf = await page.pdf({ preferCSSPageSize: true, printBackground: true, tagged: true, outline: true, waitForFonts: true, timeout })
      current.printed += 1
      return settlePdf(pdf, time)
    }
    finally {
      signal?.removeEventListener('abort', onAbort)
      await served.close()
      await context.close().catch(() => undefined)
    }
  }

  async function print(request: PrintRequest): Promise<Buffer> {
    for (let attempt = 1; ; attempt++) {
      try {
        return await printOnce(request)
      }
      catch (error) {
        request.signal?.throwIfAborted()
        if (error instanceof AppError) throw error
        await stop()
        if (attempt === 2) {
          throw new AppError('unavailable', 'Chromium failed twice while printing the PDF. The draft is untouched; render again, and if it fails again look at the memory of this machine.', { cause: error })
        }
      }
    }
  }

  return {
    print: request => queue.add(async () => {
      clearTimeout(idleTimer)
      try {
        return await print(request)
      }
      finally {
        idleTimer = setTimeout(() => void queue.add(stop), idleTime)
        idleTimer.unref()
      }
    }),
    close: () => queue.add(stop),
  }
}
