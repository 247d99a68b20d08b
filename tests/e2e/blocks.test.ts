import { createRequire } from 'node:module'
import type { AxeResults } from 'axe-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Browser, Locator, Page } from 'playwright-core'
import { keepScreenshot, openBrowser } from './openBrowser'
import { startDemoServer, type DemoServer } from './startDemoServer'

const axePath = createRequire(import.meta.url).resolve('axe-core/axe.min.js')

/** A second-order plant of one condition as it stands in an uploaded file: x'' = -w^2 x - 0.2 x' + u, with angle and rate as outputs. */
const plantOf = (condition: string, w: number, row = `-${w * w},-0.2`) => `condition, ${condition}\nA\n0,1\n${row}\nB\n0\n1\nC\n1,0\n0,1\nD\n0\n0\n`
const csv = (text: string) => ({ name: 'plant.csv', mimeType: 'text/csv', buffer: Buffer.from(text) })

/** Building a loop gain from blocks in the real browser: each test goes on where the one before it stopped. */
describe('loop gains built from blocks', () => {
  let server: DemoServer
  let browser: Browser
  let page: Page
  let system = ''
  const faults: string[] = []

  beforeAll(async () => {
    server = await startDemoServer({ demo: false })
    browser = await openBrowser()
    // the page's own policy admits no script of a test, which axe is
    const context = await browser.newContext({ viewport: { width: 1280, height: 900 }, bypassCSP: true })
    page = await context.newPage()
    page.on('pageerror', error => faults.push(`script error: ${error.message}`))
    await page.goto(`${server.url}/set-up`)
    await page.waitForLoadState('networkidle')
    await page.getByLabel('Name').fill('Ada Holm')
    await page.getByLabel('E-mail').fill('ada@works.example')
    await page.getByLabel('Password').fill('twelve characters at least')
    await page.locator('form button[type=submit]').click()
    await page.waitForURL('**/people')
    // Who makes a system is its engineer.
    const created = await post<{ id: number }>('/api/systems', { name: 'Kittiwake mast head', customer: '', documentNumber: '', frequencyUnit: 'rad/s', description: '' })
    system = `/systems/${created.id}`
    for (const [code, name] of [['C1', 'Light'], ['C2', 'Heavy']]) await post(`/api${system}/conditions`, { code, name, coordinates: [], tags: [], notes: '' })
    for (const [code, name] of [['AZ-R', 'Azimuth rate'], ['EL-R', 'Elevation rate']]) await post(`/api${system}/loops`, { code, name, axis: name, breakPoint: 'motor command', notes: '' })
  })
  afterAll(async () => {
    await browser?.close()
    await server?.stop()
  })

  async function post<Reply>(path: string, data: object): Promise<Reply> {
    const reply = await page.request.post(server.url + path, { data, headers: { origin: server.url } })
    expect(reply.ok(), `${path}: ${await reply.text()}`).toBe(true)
    return await reply.json() as Reply
  }
  const gainField = () => page.getByLabel(/^Gain of the block, in/)
  const given = (kind: string) => page.getByLabel('Given as').selectOption(kind)
  async function addBlock(name: string, role: string): Promise<void> {
    await page.goto(`${server.url}${system}/blocks/new`)
    await page.getByLabel('Name', { exact: true }).fill(name)
    await page.getByLabel('Role').selectOption(role)
  }
  async function save(name: string): Promise<void> {
    await page.getByRole('button', { name: 'Save the block' }).click()
    await page.waitForURL('**part=blocks')
    await page.getByRole('link', { name, exact: true }).first().waitFor()
  }
  /** as a spreadsheet puts it on the clipboard */
  async function paste(cell: Locator, text: string): Promise<void> {
    await cell.focus()
    await cell.evaluate((element, pasted) => {
      const data = new DataTransfer()
      data.setData('text/plain', pasted)
      element.dispatchEvent(new ClipboardEvent('paste', { clipboardData: data, bubbles: true, cancelable: true }))
    }, text)
  }
  async function faultsOfPage(): Promise<{ rule: string, places: string[] }[]> {
    await page.waitForLoadState('networkidle')
    await page.addScriptTag({ path: axePath })
    const results = await page.evaluate(async (): Promise<AxeResults> => {
      const { axe } = globalThis as unknown as { axe: typeof import('axe-core') }
      return axe.run(document, { runOnly: { type: 'tag', values: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'] } })
    })
    expect(results.passes.length, 'axe looked at the page').toBeGreaterThan(5)
    return results.violations.map(({ id, nodes }) => ({ rule: id, places: nodes.map(({ html }) => html.slice(0, 200)) }))
  }

  it('says what a block is where there is none yet', async () => {
    await page.goto(`${server.url}${system}/set-up?part=blocks`)
    await page.getByText('No block yet').waitFor()
    await page.getByRole('link', { name: 'Add a block' }).click()
    await page.getByRole('heading', { name: 'New block' }).waitFor()
  })

  it('tells a fault in the expression of a block where it stands, and shows the response once it can be read', async () => {
    await page.getByLabel('Name', { exact: true }).fill('C')
    await page.getByLabel('Role').selectOption('Controller')
    await gainField().fill('8*(s+2)/(s*(s+40)')
    await page.getByText('This bracket is not closed.').waitFor()
    await page.getByText('at character 9').waitFor()
    await gainField().fill('320*(s+2)/(s*(s+40))')
    await page.getByRole('heading', { name: 'Poles' }).waitFor()
    await page.getByText('40.00 rad/s, real').waitFor()
    await save('C')
  })

  it('tells at its field that a name is taken, and that one cannot stand in an expression', async () => {
    await addBlock('C', 'Filter')
    await gainField().fill('1')
    await page.getByRole('button', { name: 'Save the block' }).click()
    await page.getByText(/name C\b/).first().waitFor()
    expect(await page.getByLabel('Name', { exact: true }).getAttribute('aria-invalid')).toBe('true')
    await page.getByLabel('Name', { exact: true }).fill('2C')
    await page.getByRole('button', { name: 'Save the block' }).click()
    await page.getByText('A name for expressions is a letter').first().waitFor()
    await page.getByRole('link', { name: 'Cancel' }).click()
    await page.getByRole('button', { name: 'Leave' }).click()
    await page.waitForURL('**part=blocks')
  })

  it('keeps what is typed over a reload', async () => {
    await addBlock('N', 'Filter')
    await gainField().fill('(s^2+0.8*s+1600)/(s^2+40*s+1600)')
    await page.getByText('Not saved yet; kept in this tab.').waitFor()
    await page.waitForTimeout(400)
    page.once('dialog', dialog => void dialog.accept())
    await page.reload()
    await page.getByText('What you typed before is put back').waitFor()
    expect(await gainField().inputValue()).toBe('(s^2+0.8*s+1600)/(s^2+40*s+1600)')
    await save('N')
  })

  it('takes a modal table pasted from a spreadsheet, with decimal commas', async () => {
    await addBlock('Mast', 'Plant')
    await given('Modal table')
    await page.getByText('%', { exact: true }).click()
    await paste(page.getByLabel('mode of mode 1'), 'bending\t40,5\t1\t1\t60\r\ntorsion\tmany\t0,8\t1\t30\r\n')
    await page.getByRole('button', { name: 'Mode 2, frequency: \'many\' is not a number.' }).click()
    await page.keyboard.type('95')
    await page.getByRole('button', { name: 'Add a rigid term' }).click()
    await page.getByLabel('Kind of rigid term 1').selectOption('1/s')
    await page.getByLabel('gain in of rigid term 1').fill('1')
    await page.getByLabel('gain out of rigid term 1').fill('1')
    await page.getByText('40.50 rad/s, damping 0.0100').waitFor()
    await page.getByText('95.00 rad/s, damping 0.00800').waitFor()
    await keepScreenshot(page, '40-block-modal')
    await save('Mast')
  })

  it('completes names by keyboard, and tells blocks that name one another in a circle: nothing is stored', async () => {
    await addBlock('K', 'Controller')
    await gainField().pressSequentially('2*Ma')
    await page.getByRole('option', { name: /Mast/ }).waitFor()
    await page.keyboard.press('Enter')
    expect(await gainField().inputValue()).toBe('2*Mast')
    await save('K')
    await page.getByRole('link', { name: 'Mast', exact: true }).first().click()
    await given('Expression')
    await gainField().fill('1/(s+K)')
    await page.getByText(/name one another in a circle/).first().waitFor()
    await page.getByRole('button', { name: 'Save the block' }).click()
    await page.getByRole('alert').filter({ hasText: /circle/ }).first().waitFor()
    const blocks = await (await page.request.get(`${server.url}/api${system}/blocks`)).json() as { name: string, definition: { kind: string } }[]
    expect(blocks.find(({ name }) => name === 'Mast')?.definition.kind).toBe('modal')
    await page.getByRole('link', { name: 'Cancel' }).click()
    await page.getByRole('button', { name: 'Leave' }).click()
    await page.getByRole('button', { name: 'Delete K' }).click()
    await page.getByRole('button', { name: 'Delete the block' }).click()
    await page.getByText('Block K is deleted.').waitFor()
  })

  it('tells the wrong row of a file of matrices by its line, takes the right one, and gives each condition its set', async () => {
    await addBlock('G', 'Plant')
    await given('State space')
    const picker = page.locator('input[type=file]')
    await picker.setInputFiles(csv(plantOf('C1', 10) + plantOf('C2', 14, '-196')))
    await page.getByText('plant.csv is not taken until all of it is right').waitFor()
    await page.getByText(/row 2 of A has 1 number, 2 are needed/).waitFor()
    await picker.setInputFiles(csv(`inputs, torque\noutputs, angle, rate\n${plantOf('C1', 10)}${plantOf('C2', 14)}`))
    await page.getByText('plant.csv holds 2 sets of matrices.').waitFor()
    await page.getByRole('button', { name: 'Give each condition its set' }).click()
    await page.getByRole('button', { name: /C2 Heavy/ }).click()
    await page.getByLabel('to output').selectOption('rate')
    // |s| = 14 rad/s, damping 0.2 / 28, closed form
    await page.getByText('14.00 rad/s, damping 0.00714').waitFor()
    await keepScreenshot(page, '41-block-matrices')
    expect(await faultsOfPage()).toEqual([])
    await save('G')
  })

  it('lets loops be built over blocks, and lists who uses each', async () => {
    const { loops, conditions } = await (await page.request.get(`${server.url}/api${system}`)).json() as { loops: { id: number }[], conditions: { id: number }[] }
    const expressions = ['C*N*Mast*exp(-0.004*s)', '30*C*G[rate, torque]']
    for (const [index, loop] of loops.entries()) {
      await post(`/api/loops/${loop.id}/sources`, { conditionIds: conditions.map(({ id }) => id), name: 'built from blocks', definition: { kind: 'expression', expression: expressions[index] }, ofRecord: true, setAsideReason: '' })
    }
    await page.goto(`${server.url}${system}/set-up?part=blocks`)
    const row = page.getByRole('row').filter({ has: page.getByRole('link', { name: 'N', exact: true }) })
    await row.getByRole('link', { name: 'AZ-R' }).waitFor()
    expect(await row.getByRole('link', { name: 'EL-R' }).count()).toBe(0)
    await keepScreenshot(page, '42-blocks')
    expect(await faultsOfPage()).toEqual([])
  })

  it('shows which loops a changed notch moves before it is saved', async () => {
    await page.getByRole('link', { name: 'N', exact: true }).first().click()
    await page.getByText('Nothing is changed yet.').waitFor()
    await gainField().fill('(s^2+0.8*s+900)/(s^2+40*s+900)')
    const moves = page.getByRole('region', { name: 'What it moves' })
    await moves.getByText('Margins before and after').waitFor()
    await moves.getByRole('link', { name: 'AZ-R' }).first().waitFor()
    expect(await moves.getByRole('link', { name: 'EL-R' }).count()).toBe(0)
    await keepScreenshot(page, '43-block-moves')
    expect(await faultsOfPage()).toEqual([])
    const blocks = await (await page.request.get(`${server.url}/api${system}/blocks`)).json() as { name: string, definition: { expression?: string } }[]
    expect(blocks.find(({ name }) => name === 'N')?.definition.expression).toBe('(s^2+0.8*s+1600)/(s^2+40*s+1600)')
  })

  it('asks when somebody else saved the block meanwhile, and keeps mine', async () => {
    const blocks = await (await page.request.get(`${server.url}/api${system}/blocks`)).json() as { id: number, name: string, version: number }[]
    const notch = blocks.find(({ name }) => name === 'N')!
    const theirs = await page.request.patch(`${server.url}/api/blocks/${notch.id}`, { data: { version: notch.version, notes: 'tuned on site' }, headers: { origin: server.url } })
    expect(theirs.ok()).toBe(true)
    await page.getByRole('button', { name: 'Save the block' }).click()
    await page.getByText('Somebody else changed this block meanwhile.').waitFor()
    await page.getByRole('button', { name: 'Keep mine' }).click()
    await page.waitForURL('**part=blocks')
    await page.getByText('(s^2+0.8*s+900)/(s^2+40*s+900)').waitFor()
  })

  it('does not delete a block that a loop names, and says which', async () => {
    await page.getByRole('button', { name: 'Delete N', exact: true }).click()
    await page.getByRole('button', { name: 'Delete the block' }).click()
    await page.getByText(/Not done\./).waitFor()
    expect(await page.getByText(/AZ-R/).count()).toBeGreaterThan(0)
  })

  it('stays within a telephone\'s width', async () => {
    await page.setViewportSize({ width: 390, height: 800 })
    for (const path of [`${system}/set-up?part=blocks`, `${system}/blocks/new`]) {
      await page.goto(server.url + path)
      await page.waitForLoadState('networkidle')
      expect(await page.evaluate(() => document.documentElement.scrollWidth), path).toBeLessThanOrEqual(390)
    }
    await keepScreenshot(page, '44-block-narrow')
  })

  it('made no error in any script on the way', () => {
    expect(faults).toEqual([])
  })
})
