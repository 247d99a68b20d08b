import { createServer } from 'node:http'
import type { AddressInfo } from 'node:net'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createChromiumPrinter } from '#server/adapters/chromium/chromiumPrinter'
import { buildSnapshot } from '../../factories/buildSnapshot'
import { printSnapshot } from '../../factories/printSnapshot'

const printer = createChromiumPrinter()
const hits: string[] = []
const server = createServer((request, reply) => {
  hits.push(request.url ?? '')
  reply.end('x')
})
let outside: string

beforeAll(async () => {
  await new Promise<void>(resolve => server.listen(0, '127.0.0.1', resolve))
  outside = `http://127.0.0.1:${(server.address() as AddressInfo).port}`
})

afterAll(async () => {
  await printer.close()
  await new Promise(resolve => server.close(resolve))
})

describe('a report whose texts are hostile', () => {
  it('is printed with these texts as text, and asks no one for anything', async () => {
    const attack = `"><script src="${outside}/script"></script><img src=${outside}/img><style>@import "${outside}/import";</style><meta http-equiv=refresh content="0;url=${outside}/refresh">`
    const base = buildSnapshot()
    const snapshot = buildSnapshot({
      brand: { ...base.brand, teamName: attack, addressLine: attack, accent: `red;background:url(${outside}/accent)` },
      system: { ...base.system, name: attack, customer: attack, description: attack },
      report: { title: `T ${attack}`, documentNumber: `</style>${attack}`, remarks: `![x](${outside}/markdown) ${attack}\n\n<iframe src="${outside}/frame"></iframe>` },
      loops: base.loops.map(loop => ({ ...loop, name: attack, notes: attack, breakPoint: attack, remarks: `[a](${outside}/link) ${attack}` })),
    })
    const { pdf, html } = await printSnapshot(snapshot, printer)
    expect(pdf.bytes.subarray(0, 5).toString()).toBe('%PDF-')
    expect(html.bytes.toString('utf8')).toContain('&lt;script')
    expect(hits).toEqual([])
  })
})

describe('the printer, should a document with foreign markup ever reach it', () => {
  const time = new Date('2026-03-02T10:20:30Z')

  it('fetches nothing and runs nothing', async () => {
    const html = `<!DOCTYPE html><title>Report</title><style>@import "${outside}/import"; @font-face { font-family: x; src: url(${outside}/font) } p { font-family: x; background: url(${outside}/background) }</style>
      <p>text</p><img src="${outside}/img"><iframe src="${outside}/frame"></iframe><object data="${outside}/object"></object><link rel="stylesheet" href="${outside}/link">
      <svg><image href="${outside}/image"/><use href="${outside}/use#a"/></svg><script>document.title = 'changed'; fetch('${outside}/fetch')</script>`
    const pdf = await printer.print({ html, title: 'Report', time })
    expect(pdf.subarray(0, 5).toString()).toBe('%PDF-')
    expect(hits).toEqual([])
  })

  it('reads no file of this machine', async () => {
    const pdf = await printer.print({ html: '<!DOCTYPE html><title>Report</title><iframe src="file:///etc/hostname"></iframe><p>text</p>', title: 'Report', time })
    expect(pdf.subarray(0, 5).toString()).toBe('%PDF-')
  })

  it('refuses a document that is not the one it was given any more', async () => {
    await expect(printer.print({ html: '<!DOCTYPE html><title>Another</title>', title: 'Report', time })).rejects.toThrow('its title reads \'Another\'')
  })

  it('is not led to another page by a refresh', async () => {
    const printed = printer.print({ html: `<!DOCTYPE html><meta http-equiv="refresh" content="0;url=${outside}/refresh"><title>Report</title><p>text</p>`, title: 'Report', time })
    await printed.then(pdf => expect(pdf.subarray(0, 5).toString()).toBe('%PDF-'), error => expect(String(error)).toMatch(/title reads|failed twice/))
    expect(hits).toEqual([])
  })
})
