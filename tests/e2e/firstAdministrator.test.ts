import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Browser } from 'playwright-core'
import { keepScreenshot, openBrowser, openPage, signIn } from './openBrowser'
import { startDemoServer, type DemoServer } from './startDemoServer'

describe('a start without demo data', () => {
  let server: DemoServer
  let browser: Browser
  const password = 'twelve characters at least'

  beforeAll(async () => {
    server = await startDemoServer({ demo: false })
    browser = await openBrowser()
  })
  afterAll(async () => {
    await browser?.close()
    await server?.stop()
  })

  it('asks for the first administrator, who invites a person; the link in the outbox lets that person in', async () => {
    const { page, faults } = await openPage(browser, server.url)
    await page.goto(server.url)
    await page.getByRole('link', { name: 'Set up the first administrator' }).click()
    await page.getByLabel('Name').fill('Ada Holm')
    await page.getByLabel('E-mail').fill('ada@works.example')
    await page.getByLabel('Password').fill(password)
    await page.locator('form button[type=submit]').click()
    await page.waitForURL('**/people')
    await page.getByRole('button', { name: 'Invite a person' }).click()
    const dialog = page.getByRole('dialog')
    await dialog.getByLabel('Name').fill('Bo Lind')
    await dialog.getByLabel('E-mail').fill('bo@works.example')
    await dialog.getByRole('button', { name: 'Invite', exact: true }).click()
    await page.getByText('invited, no password yet').waitFor()
    await page.getByRole('link', { name: 'Outbox' }).click()
    await page.locator('summary').first().click()
    const link = await page.locator('a[href*="/password?token="]').first().getAttribute('href')
    await keepScreenshot(page, '20-outbox')

    const invited = await openPage(browser, server.url)
    await invited.page.goto(link ?? '')
    await invited.page.getByLabel('New password').fill(password)
    await invited.page.getByRole('button', { name: 'Set the password' }).click()
    await invited.page.waitForURL('**/sign-in**')
    await signIn(invited.page, server.url, 'bo@works.example', password)
    await keepScreenshot(invited.page, '21-empty-systems')
    expect([...faults, ...invited.faults]).toEqual([])
  })

  it('takes no second first administrator', async () => {
    const { page } = await openPage(browser, server.url)
    await page.goto(`${server.url}/set-up`)
    await page.getByRole('heading', { name: 'First administrator' }).waitFor()
    await page.getByRole('link').first().waitFor()
    expect(await page.getByLabel('Password').count()).toBe(0)
  })
})
