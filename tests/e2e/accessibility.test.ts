import type { Browser, BrowserContext, Page } from 'playwright-core'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { axeFaults, type AxeFault } from './axeFaults'
import { openBrowser, signIn } from './openBrowser'
import { startDemoServer, type DemoServer } from './startDemoServer'

const password = 'keep-a-wide-berth'

let server: DemoServer
let browser: Browser
let engineer: Page
let administrator: Page
/** addresses of the demo's first system, found through the application's own answers */
const places = { system: '', loop: '', source: '', report: '', revision: '' }

async function openSignedIn(email: string): Promise<Page> {
  const page = await newPage()
  await signIn(page, server.url, email, password)
  return page
}

async function newPage(): Promise<Page> {
  // the page's own policy admits no script of a test
  const context: BrowserContext = await browser.newContext({ viewport: { width: 1280, height: 900 }, bypassCSP: true })
  return context.newPage()
}

/** Every fault of the page as it stands once `landmark` is there. */
async function faultsAt(page: Page, path: string, landmark: string): Promise<AxeFault[]> {
  await page.goto(server.url + path)
  await page.getByRole('heading', { name: landmark }).first().waitFor()
  await page.waitForLoadState('networkidle')
  return axeFaults(page)
}

async function findPlaces(): Promise<void> {
  const read = async <Reply>(path: string): Promise<Reply> => {
    const reply = await engineer.request.get(`${server.url}/api/${path}`)
    expect(reply.ok(), path).toBe(true)
    return await reply.json() as Reply
  }
  const systems = await read<{ id: number, name: string }[]>('systems')
  const id = systems.find(({ name }) => name.includes('gangway'))?.id
  const { loops } = await read<{ loops: { id: number, code: string }[] }>(`systems/${id}`)
  // the measured loop, whose table folds the dips within the noise
  const loop = loops.find(({ code }) => code === 'LU-R')?.id
  const { sources } = await read<{ sources: { id: number, kind: string }[] }>(`loops/${loop}`)
  const [first] = await read<{ report: { id: number }, revisions: { id: number }[] }[]>(`systems/${id}/reports`)
  places.system = `/systems/${id}`
  places.loop = `${places.system}/loops/${loop}`
  places.source = `${places.loop}/sources/${sources.find(({ kind }) => kind === 'expression')?.id}`
  places.report = `/reports/${first?.report.id}`
  places.revision = `/revisions/${first?.revisions[0]?.id}`
}

beforeAll(async () => {
  server = await startDemoServer()
  browser = await openBrowser()
  engineer = await openSignedIn('engineer@tern.example')
  administrator = await openSignedIn('administrator@tern.example')
  await findPlaces()
}, 600_000)

afterAll(async () => {
  await browser?.close()
  await server?.stop()
})

describe('every screen keeps WCAG 2.2 A and AA as far as axe can tell', () => {
  it('signing in', async () => expect(await faultsAt(await newPage(), '/sign-in', 'Sign in')).toEqual([]))
  it('the systems', async () => expect(await faultsAt(engineer, '/systems', 'Systems')).toEqual([]))
  it('the board', async () => expect(await faultsAt(engineer, places.system, 'Where every loop crosses')).toEqual([]))
  it('a measured loop', async () => expect(await faultsAt(engineer, places.loop, 'Every crossing, in order of frequency')).toEqual([]))
  it('the source editor with its live result', async () => expect(await faultsAt(engineer, places.source, 'Every crossing')).toEqual([]))
  it('the set-up with its parameters', async () => expect(await faultsAt(engineer, `${places.system}/set-up?part=parameters`, 'Set-up')).toEqual([]))
  it('a report', async () => expect(await faultsAt(engineer, places.report, 'What the next revision holds')).toEqual([]))
  it('a revision', async () => expect(await faultsAt(engineer, places.revision, 'Revision')).toEqual([]))
  it('the people', async () => expect(await faultsAt(administrator, '/people', 'People')).toEqual([]))
  it('the brand', async () => expect(await faultsAt(administrator, '/brand', 'Brand')).toEqual([]))
})
