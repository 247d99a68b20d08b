import { execFileSync } from 'node:child_process'
import { readdirSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { afterEach, describe, expect, it } from 'vitest'
import { createChromiumPrinter } from '#server/adapters/chromium/chromiumPrinter'
import { findChromium } from '#server/adapters/chromium/findChromium'
import type { PdfPrinter } from '#server/adapters/chromium/PdfPrinter'

const time = new Date('2026-03-02T10:20:30Z')
/** Long enough to be caught while it is printed. */
const longDocument = `<!DOCTYPE html><title>Long</title>${'<p>All margins of every loop in every condition.</p>'.repeat(4000)}`
const shortDocument = '<!DOCTYPE html><title>Short</title><p>text</p>'
/** Those of this process only: other test files print at the same time. */
const profiles = () => readdirSync(tmpdir()).filter(name => name.startsWith(`wideberth-print-${process.pid}-`))

/** Process ids of the browsers whose profile this test's printer made. */
function browsersOf(names: readonly string[]): number[] {
  const rows = execFileSync('ps', ['-eo', 'pid,args'], { encoding: 'utf8' }).split('\n')
  return rows.filter(row => names.some(name => row.includes(name)) && !row.includes('--type=')).map(row => Number(row.trim().split(' ')[0]))
}

const pause = (time: number) => new Promise(resolve => setTimeout(resolve, time))

describe('the printer', () => {
  let printer: PdfPrinter | undefined
  const before = new Set(profiles())
  const ours = () => profiles().filter(name => !before.has(name))

  afterEach(async () => {
    await printer?.close()
    printer = undefined
  })

  it('says what to install when there is no Chromium', async () => {
    printer = createChromiumPrinter({ executablePath: null })
    await expect(printer.print({ html: shortDocument, title: 'Short', time })).rejects.toThrow(/Chromium was not found.*apt-get install chromium/)
  })

  it('says that a Chromium does not start', async () => {
    printer = createChromiumPrinter({ executablePath: '/bin/false' })
    await expect(printer.print({ html: shortDocument, title: 'Short', time })).rejects.toThrow('/bin/false did not start')
  })

  it('finds none where the path named is no program', () => {
    expect(findChromium({ WIDEBERTH_CHROMIUM: '/no/such/program', PATH: process.env.PATH })).toBeNull()
  })

  it('prints the document all the same when its browser is killed while it prints', async () => {
    printer = createChromiumPrinter()
    await printer.print({ html: shortDocument, title: 'Short', time })
    const printing = printer.print({ html: longDocument, title: 'Long', time })
    await pause(400)
    const killed = browsersOf(ours())
    expect(killed).toHaveLength(1)
    for (const id of killed) process.kill(id, 'SIGKILL')
    expect((await printing).subarray(0, 5).toString()).toBe('%PDF-')
    expect(browsersOf(ours())).not.toEqual(killed)
  })

  it('ends a print that is aborted, and prints the next', async () => {
    printer = createChromiumPrinter()
    const abort = new AbortController()
    const printing = printer.print({ html: longDocument, title: 'Long', time, signal: abort.signal })
    setTimeout(() => abort.abort(new Error('cancelled')), 1200)
    await expect(printing).rejects.toThrow('cancelled')
    expect((await printer.print({ html: shortDocument, title: 'Short', time })).subarray(0, 5).toString()).toBe('%PDF-')
  })

  it('replaces its browser after the documents it is good for, and leaves no profile behind', async () => {
    printer = createChromiumPrinter({ documentsPerBrowser: 1 })
    await printer.print({ html: shortDocument, title: 'Short', time })
    const first = browsersOf(ours())
    await printer.print({ html: shortDocument, title: 'Short', time })
    expect(browsersOf(ours())).not.toEqual(first)
    await printer.close()
    expect(ours()).toEqual([])
  })
})
