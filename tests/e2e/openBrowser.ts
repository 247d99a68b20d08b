import { existsSync, mkdirSync } from 'node:fs'
import { join } from 'node:path'
import { chromium, type Browser, type Page } from 'playwright-core'

const screenshots = join(process.cwd(), '.cache', 'screenshots')

/** The system's Chromium, without a window. */
export function openBrowser(): Promise<Browser> {
  const executablePath = process.env.WIDEBERTH_CHROMIUM ?? ['/usr/bin/chromium', '/usr/bin/chromium-browser'].find(path => existsSync(path))
  return chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-gpu', '--disable-background-networking', '--disable-component-update', '--disable-sync'] })
}

/**
 * A page that notes every request to another host and every error of its scripts: `faults` must stay empty.
 * Screenshots are kept in .cache/screenshots.
 */
export async function openPage(browser: Browser, url: string, width = 1280) {
  const context = await browser.newContext({ viewport: { width, height: 900 }, acceptDownloads: true })
  const page = await context.newPage()
  const faults: string[] = []
  page.on('request', (request) => {
    const asked = new URL(request.url())
    if (['http:', 'https:', 'ws:', 'wss:'].includes(asked.protocol) && asked.origin !== url) faults.push(`request to ${asked.origin}`)
  })
  page.on('pageerror', error => faults.push(`script error: ${error.message}`))
  return { page, context, faults }
}

/** Signs in through the sign-in page. */
export async function signIn(page: Page, url: string, email: string, password: string): Promise<void> {
  await page.goto(`${url}/sign-in`)
  await page.waitForLoadState('networkidle')
  await page.getByLabel('E-mail').fill(email)
  await page.getByLabel('Password').fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL('**/systems')
}

/** Keeps a picture of the whole page. */
export async function keepScreenshot(page: Page, name: string): Promise<void> {
  mkdirSync(screenshots, { recursive: true })
  await page.screenshot({ path: join(screenshots, `${name}.png`), fullPage: true })
}
