import type { Browser, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import accounts from '#server/demo/accounts.json'
import { axeFaults } from './axeFaults'
import { keepScreenshot, openBrowser, signIn } from './openBrowser'
import { startDemoServer, type DemoServer } from './startDemoServer'

interface Listed { id: number, version: number, code: string }

/** Several sources of one loop beside each other, and break points of one closed system that contradict each other, in the real browser. */
describe('sources compared, and break points that must agree', () => {
  let server: DemoServer
  let browser: Browser
  let page: Page
  let system = ''
  const loops = new Map<string, Listed>()
  let condition = 0
  const faults: string[] = []

  async function ask<Reply>(method: 'get' | 'post' | 'patch', path: string, data?: object): Promise<Reply> {
    const reply = await page.request[method](`${server.url}/api/${path}`, { data, headers: { origin: server.url } })
    expect(reply.ok(), `${method} ${path}: ${await reply.text()}`).toBe(true)
    return await reply.json() as Reply
  }
  const pathOf = (code: string) => `${system}/loops/${loops.get(code)!.id}?condition=${condition}`

  beforeAll(async () => {
    server = await startDemoServer()
    browser = await openBrowser()
    const context = await browser.newContext({ viewport: { width: 1280, height: 900 }, bypassCSP: true })
    page = await context.newPage()
    page.on('pageerror', error => faults.push(error.message))
    await signIn(page, server.url, 'engineer@tern.example', accounts.password)
    const systems = await ask<{ id: number, name: string }[]>('get', 'systems')
    const { id } = systems.find(({ name }) => name.includes('gangway'))!
    system = `/systems/${id}`
    const detail = await ask<{ loops: Listed[], conditions: Listed[] }>('get', `systems/${id}`)
    for (const loop of detail.loops) loops.set(loop.code, loop)
    condition = detail.conditions.find(({ code }) => code === 'C4')!.id
  })
  afterAll(async () => {
    await browser?.close()
    await server?.stop()
  })

  it('tells of a measured loop and its model how far they lie apart, band by band', async () => {
    await page.goto(server.url + pathOf('LU-R'))
    await page.getByRole('heading', { name: 'How far the sources lie apart' }).waitFor()
    const table = page.getByRole('region', { name: 'How far the sources lie apart' }).getByRole('table')
    await table.getByRole('row').nth(2).waitFor()
    expect(await page.getByRole('heading', { name: 'design model beside sweep 1' }).count()).toBe(1)
    expect(await table.innerText()).toMatch(/(higher|lower) [\d.]+ dB/)
    expect(await table.innerText()).toMatch(/(lags|leads) [\d.]+ deg/)
    await page.getByText('set aside: measured on the first article').waitFor()
  })

  it('overlays every source in all four figures, by keyboard, and the address keeps it', async () => {
    const box = page.getByLabel('Overlay all 2 sources')
    await box.focus()
    await page.keyboard.press('Space')
    await page.waitForURL(/overlay=1/)
    for (const name of ['Berth around the critical point', 'Return difference', 'Magnitude and phase', 'Gain over phase']) {
      const figure = page.getByRole('region', { name, exact: true })
      await figure.getByText('design model', { exact: true }).waitFor()
      await figure.getByText('sweep 1', { exact: true }).waitFor()
    }
    await page.reload()
    await page.getByRole('region', { name: 'Return difference' }).getByText('design model', { exact: true }).waitFor()
    await keepScreenshot(page, '20-sources-overlaid')
  })

  it('shows the model with the points of the measurement over it', async () => {
    await page.getByRole('link', { name: 'design model' }).click()
    await page.getByText('not of record').first().waitFor()
    expect(await page.getByLabel('Overlay all 2 sources').isChecked()).toBe(false)
    await page.getByLabel('Overlay all 2 sources').check()
    await page.getByRole('region', { name: 'Return difference' }).getByText('sweep 1', { exact: true }).waitFor()
    await keepScreenshot(page, '21-model-with-samples')
  })

  it('computes the closed-loop poles when one asks for them, by keyboard', async () => {
    await page.goto(server.url + pathOf('SL-P'))
    const tab = page.getByRole('tab', { name: 'How it is built' })
    await tab.focus()
    await page.keyboard.press('ArrowRight')
    await page.getByText(/With dead time the closed loop has endlessly many poles/).waitFor()
    await page.getByRole('tab', { name: 'Closed-loop poles', selected: true }).waitFor()
  })

  it('sets where a loop is opened and what the others do meanwhile', async () => {
    await page.goto(server.url + pathOf('SL-P'))
    await page.getByRole('button', { name: 'Edit the loop' }).click()
    const dialog = page.getByRole('dialog')
    await dialog.getByLabel('SL-R while this loop is open').selectOption('closed')
    await dialog.getByLabel('LU-P while this loop is open').selectOption('held at a gain')
    await dialog.getByRole('button', { name: 'Save the loop' }).click()
    await dialog.getByText('Type the gain it is held at.').waitFor()
    await dialog.getByLabel('Gain LU-P is held at').fill('0.5')
    await dialog.getByRole('button', { name: 'Save the loop' }).click()
    await page.getByText('LU-P held at gain 0.5, all others at nominal').waitFor()
    await keepScreenshot(page, '22-states-of-others')
  })

  it('flags both loops where break points of one closed system contradict each other', async () => {
    const read = async (code: string) => {
      const { loop } = await ask<{ loop: Listed }>('get', `loops/${loops.get(code)!.id}`)
      return loop
    }
    const [first, second] = [await read('SL-P'), await read('SL-R')]
    await ask('patch', `loops/${first.id}`, { version: first.version, loopStates: [{ loopId: second.id, state: 'closed' }] })
    await ask('patch', `loops/${second.id}`, { version: second.version, loopStates: [{ loopId: first.id, state: 'closed' }] })
    // one of the two cannot be: 3/(s - 1) is stable when closed, -3/(s + 1) is not
    await ask('post', `loops/${first.id}/sources`, { conditionIds: [condition], name: 'try', definition: { kind: 'expression', expression: '3/(s-1)' }, ofRecord: true, setAsideReason: '' })
    await ask('post', `loops/${second.id}/sources`, { conditionIds: [condition], name: 'try', definition: { kind: 'expression', expression: '-3/(s+1)' }, ofRecord: true, setAsideReason: '' })
    await page.goto(server.url + system)
    await page.getByText('Break points of one closed system disagree').waitFor()
    expect(await page.getByRole('gridcell').getByText('break points disagree').count()).toBe(2)
    await keepScreenshot(page, '23-disagreement')
    for (const [code, other] of [['SL-P', 'SL-R'], ['SL-R', 'SL-P']] as const) {
      await page.goto(server.url + pathOf(code))
      const told = page.getByRole('alert').filter({ hasText: 'disagree' })
      await told.waitFor()
      expect(await told.innerText()).toContain(`opened at ${other} the same closed loop is`)
    }
  })

  it('keeps WCAG 2.2 A and AA on the board and the loop with its sources overlaid', async () => {
    await page.goto(`${server.url}${pathOf('LU-R')}&overlay=1&part=poles`)
    await page.getByText('A measured response tells no closed-loop poles').waitFor()
    await page.waitForLoadState('networkidle')
    expect(await axeFaults(page)).toEqual([])
    await page.getByRole('button', { name: 'Edit the loop' }).click()
    await page.getByLabel('SL-R while this loop is open').waitFor()
    expect(await axeFaults(page)).toEqual([])
    await page.goto(server.url + system)
    await page.getByText('Break points of one closed system disagree').waitFor()
    expect(await axeFaults(page)).toEqual([])
  })

  it('met no script error', () => {
    expect(faults).toEqual([])
  })
})
