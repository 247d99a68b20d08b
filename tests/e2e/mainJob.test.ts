import { execFileSync } from 'node:child_process'
import { mkdtempSync, readdirSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Browser, Page } from 'playwright-core'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { makeSweep } from '#server/demo/makeSweep'
import accounts from '#server/demo/accounts.json'
import { keepScreenshot, openBrowser, openPage, signIn } from './openBrowser'
import { startDemoServer, type DemoServer } from './startDemoServer'

/** The main job in the real browser, on the demo, in the order a person does it: each test goes on where the one before it stopped. */
describe('the main job, from sign-in to an issued revision', () => {
  let server: DemoServer
  let browser: Browser
  let page: Page
  let faults: string[]
  let revisionPath = ''
  const folder = mkdtempSync(join(tmpdir(), 'wideberth-download-'))

  beforeAll(async () => {
    server = await startDemoServer()
    browser = await openBrowser()
    ;({ page, faults } = await openPage(browser, server.url))
  })
  afterAll(async () => {
    await browser?.close()
    await server?.stop()
    rmSync(folder, { recursive: true, force: true })
  })

  it('turns a stranger away from a page to the sign-in page', async () => {
    await page.goto(`${server.url}/systems`)
    await page.waitForURL('**/sign-in**')
    expect(await page.getByRole('button', { name: 'Sign in' }).isVisible()).toBe(true)
  })

  it('signs the demo engineer in and shows the systems', async () => {
    await signIn(page, server.url, 'engineer@tern.example', accounts.password)
    await page.getByRole('link', { name: 'Tern 30 access gangway' }).waitFor()
    await page.getByRole('link', { name: 'Plover 48 V converter' }).waitFor()
    await page.getByRole('link', { name: 'Skua stabilised antenna mount' }).waitFor()
    await keepScreenshot(page, '01-systems')
  })

  it('exports a system as JSON, tells what is wrong in a changed file by its path, and imports the right one', async () => {
    await page.getByRole('link', { name: 'Plover 48 V converter' }).click()
    await page.getByRole('link', { name: 'Set up' }).click()
    const [download] = await Promise.all([page.waitForEvent('download'), page.getByRole('link', { name: 'Export as JSON' }).click()])
    expect(download.suggestedFilename()).toBe('Plover 48 V converter.json')
    const file = join(folder, 'converter.json')
    await download.saveAs(file)
    const text = readFileSync(file, 'utf8').replace('"Plover 48 V converter"', '"Plover, second article"')
    await page.goto(`${server.url}/systems`)
    await page.getByRole('button', { name: 'Import a system' }).click()
    const dialog = page.getByRole('dialog')
    const choose = (content: string) => dialog.locator('input[type=file]').setInputFiles({ name: 'converter.json', mimeType: 'application/json', buffer: Buffer.from(content) })
    await choose(text.replace('"expression": "1/(LM*s+RM)"', '"expression": "1/(LM*s+RX)"'))
    await dialog.getByText(/^blocks\[\d+\]\.definition\.expression$/).waitFor()
    await choose(text)
    await page.waitForURL(/\/systems\/\d+$/)
    await page.getByRole('heading', { name: 'Plover, second article' }).waitFor()
    await page.goto(`${server.url}/systems`)
  })

  it('shows the board: every loop in every condition with its verdict in words', async () => {
    await page.getByRole('link', { name: 'Tern 30 access gangway' }).click()
    await page.getByText('RO-P').first().waitFor()
    await page.getByText('gain above one: each edge is a gain crossover').first().waitFor()
    await page.getByText('Negative feedback, critical point −1').waitFor()
    await page.getByText('not met').first().waitFor()
    await keepScreenshot(page, '02-board')
  })

  it('adds a loop', async () => {
    await page.getByRole('link', { name: 'Set up' }).click()
    await page.getByRole('button', { name: 'Add a loop' }).click()
    const dialog = page.getByRole('dialog')
    await dialog.getByLabel('Code').fill('WI-R')
    await dialog.getByLabel('Name').fill('Winch rate')
    await dialog.getByLabel('Axis or channel').fill('winch')
    await dialog.getByLabel('The signal there').fill('winch valve command')
    await dialog.getByLabel('More on the other loops').fill('all other loops closed')
    await dialog.getByRole('button', { name: 'Save the loop' }).click()
    await page.getByRole('link', { name: /WI-R/ }).first().waitFor()
    await keepScreenshot(page, '03-set-up')
  })

  it('tells a fault in an expression where it stands, and shows the crossings as one types', async () => {
    await page.getByRole('link', { name: /WI-R/ }).first().click()
    await page.getByRole('link', { name: 'Add a source' }).click()
    await page.getByLabel('Name of the source').fill('design model')
    const expression = page.getByLabel('L(s), the loop gain')
    await expression.fill('25*(s+wz)/(s*(s+10)*exp(-0.01*s)')
    await page.getByText('This bracket is not closed.').waitFor()
    await page.getByText('at character 11').waitFor()
    await page.getByText('new: give it a value and it becomes a parameter of the system').waitFor()
    await expression.fill('25*(s+2)/(s*(s+10))*exp(-0.01*s)')
    // 625 (w^2 + 4) = w^2 (w^2 + 100), closed form: w^2 = (525 + sqrt(525^2 + 10000)) / 2, w = 23.02 rad/s
    await page.getByText('23.02').first().waitFor()
    await keepScreenshot(page, '04-expression')
  })

  it('stores the expression for all conditions', async () => {
    await page.getByLabel('all conditions').check()
    await page.getByRole('button', { name: 'Save the source' }).click()
    await page.getByRole('heading', { name: /Berth/ }).waitFor()
    await page.getByText('gain crossover').first().waitFor()
    await keepScreenshot(page, '05-loop')
  })

  it('refuses a CSV with a bad row by its line, and takes the right one', async () => {
    const loop = prepareLoopGain({ expression: '24*(s+2)/(s*(s+11))*exp(-0.011*s)', parameters: {} })
    const frequencies = Array.from({ length: 240 }, (_, index) => 0.05 * 10 ** (index / 80))
    const text = makeSweep({ loop, frequencies, averages: 64, noise: 0.002, seed: 7 })
    const lines = text.split('\n')
    const broken = lines.map((line, index) => index === 12 ? line.replace(/^[^,]*/, 'fault') : line).join('\n')
    await page.getByRole('link', { name: 'Add a source' }).first().click()
    await page.getByLabel('Name of the source').fill('sweep 1')
    await page.getByText('Measured response', { exact: true }).click()
    const picker = page.locator('input[type=file]')
    await picker.setInputFiles({ name: 'winch.csv', mimeType: 'text/csv', buffer: Buffer.from(broken) })
    await page.getByText('Line 13:').first().waitFor()
    await picker.setInputFiles({ name: 'winch.csv', mimeType: 'text/csv', buffer: Buffer.from(text) })
    await page.getByText('Line 13:').first().waitFor({ state: 'hidden' })
    await page.getByText('gain crossover').first().waitFor()
    await page.getByLabel('The closed loop, during the test').selectOption('It stayed stable')
    await page.getByLabel('Averages').fill('64')
    await page.getByLabel('Integrators in L').fill('1')
    await page.getByLabel('It is of record from now on').check()
    await keepScreenshot(page, '06-upload')
    await page.getByRole('button', { name: 'Save the source' }).click()
    await page.getByRole('heading', { name: /Berth/ }).waitFor()
    await page.getByText('sweep 1').first().waitFor()
    await keepScreenshot(page, '07-measured')
  })

  it('freezes a draft and shows how its rendering goes', async () => {
    await page.getByRole('link', { name: 'Reports' }).first().click()
    await page.getByRole('link', { name: 'Stability margins of all axes' }).click()
    await page.getByText('What the next revision holds').waitFor()
    await page.getByLabel('WI-R Winch rate, left out').click()
    await page.getByLabel('WI-R Winch rate', { exact: true }).waitFor()
    await page.getByRole('button', { name: 'Freeze a draft' }).click()
    await page.getByLabel('Why this revision').fill('Winch rate loop looked at for the first time')
    await page.getByRole('button', { name: 'Freeze and render' }).click()
    await page.waitForURL('**/revisions/*')
    revisionPath = new URL(page.url()).pathname
    await page.getByRole('progressbar').waitFor()
    await keepScreenshot(page, '08-rendering')
    await page.getByRole('link', { name: /^ZIP/ }).waitFor({ timeout: 240_000 })
    await page.frameLocator('iframe').getByText('Stability margins of all axes').first().waitFor()
    await keepScreenshot(page, '09-draft')
  })

  it('downloads the ZIP, whose sums are right', async () => {
    const waiting = page.waitForEvent('download')
    await page.getByRole('link', { name: /^ZIP/ }).click()
    const download = await waiting
    const file = join(folder, 'report.zip')
    await download.saveAs(file)
    execFileSync('unzip', ['-q', file, '-d', join(folder, 'report')])
    const sums = execFileSync('sha256sum', ['-c', 'SHA256SUMS'], { cwd: join(folder, 'report'), encoding: 'utf8' })
    expect(sums.split('\n').filter(line => line !== '').every(line => line.endsWith(': OK'))).toBe(true)
    expect(readdirSync(join(folder, 'report'))).toEqual(expect.arrayContaining(['report.html', 'report.pdf', 'snapshot.json', 'SHA256SUMS', 'tables', 'responses', 'figures']))
  })

  it('prints the PDF tagged, with every font embedded', () => {
    const file = join(folder, 'report', 'report.pdf')
    expect(execFileSync('pdfinfo', [file], { encoding: 'utf8' })).toMatch(/Tagged:\s+yes/)
    const fonts = execFileSync('pdffonts', [file], { encoding: 'utf8' }).trim().split('\n').slice(2)
    expect(fonts.length).toBeGreaterThan(0)
    for (const line of fonts) expect(line, line).toMatch(/\s(yes)\s+(yes|no)\s+(yes|no)\s+\d+\s+\d+$/)
  })

  it('lets the approver issue it, not the engineer who froze it', async () => {
    expect(await page.getByRole('button', { name: 'Approve and issue' }).count()).toBe(0)
    const approver = await openPage(browser, server.url)
    await signIn(approver.page, server.url, 'approver@tern.example', accounts.password)
    await approver.page.goto(server.url + revisionPath)
    await approver.page.getByRole('button', { name: 'Approve and issue' }).click()
    await approver.page.getByRole('button', { name: /^Issue revision/ }).click()
    await approver.page.getByText('issued', { exact: true }).first().waitFor({ timeout: 240_000 })
    await keepScreenshot(approver.page, '10-issued')
    expect(approver.faults).toEqual([])
    await approver.context.close()
  })

  it('shows the customer issued revisions and nothing else, at the width of a phone too', async () => {
    const customer = await openPage(browser, server.url, 390)
    await signIn(customer.page, server.url, 'customer@norrhavn.example', accounts.password)
    await customer.page.goto(`${server.url}/reports`)
    await customer.page.getByRole('link', { name: 'Stability margins of all axes' }).click()
    await customer.page.getByRole('link', { name: 'C', exact: true }).waitFor()
    expect(await customer.page.getByText('draft').count()).toBe(0)
    await keepScreenshot(customer.page, '11-customer')
    await customer.page.goto(server.url + revisionPath)
    await customer.page.frameLocator('iframe').getByText('Stability margins of all axes').first().waitFor()
    await keepScreenshot(customer.page, '12-customer-revision')
    expect(customer.faults).toEqual([])
    await customer.context.close()
  })

  it('says what changed between two revisions', async () => {
    await page.goto(`${server.url}/reports`)
    await page.getByRole('link', { name: 'Stability margins of all axes' }).click()
    await page.getByRole('button', { name: 'Compare' }).click()
    await page.getByText('Smallest margins of both').waitFor()
    await page.getByText('WI-R').first().waitFor()
    await keepScreenshot(page, '13-comparison')
  })

  it('asked no other host and met no script error', () => {
    expect(faults).toEqual([])
  })
})
