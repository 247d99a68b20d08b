import { execFileSync } from 'node:child_process'
import { mkdtempSync, readdirSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { createChromiumPrinter } from '#server/adapters/chromium/chromiumPrinter'
import type { ProducedArtefact } from '#server/reports/produceReport'
import { buildAnalysis, buildCell, buildSnapshot } from '../../factories/buildSnapshot'
import { printSnapshot } from '../../factories/printSnapshot'

const printer = createChromiumPrinter()
const folder = mkdtempSync(join(tmpdir(), 'wideberth-report-'))
const snapshot = buildSnapshot({
  report: { title: 'Stability margins \u2265 all axes', documentNumber: 'WB-0042', remarks: 'Every axis. \u0141\u00f3d\u017a.' },
  cells: [...buildSnapshot().cells.slice(0, 3), buildCell('SL-P', 'C2', buildAnalysis({ summary: null, stability: { verdict: 'unstable', basis: 'counted', openLoopUnstablePoles: 0, encirclements: -2, closedLoopUnstablePoles: 2 } }))],
})
let made: Record<ProducedArtefact['kind'], ProducedArtefact>
const run = (program: string, ...parts: string[]) => execFileSync(program, parts, { cwd: folder, encoding: 'utf8' })

beforeAll(async () => {
  made = await printSnapshot(snapshot, printer)
  writeFileSync(join(folder, 'report.pdf'), made.pdf.bytes)
  writeFileSync(join(folder, 'report.zip'), made.zip.bytes)
}, 120_000)

afterAll(async () => {
  await printer.close()
  rmSync(folder, { recursive: true })
})

describe('the PDF of a draft', () => {
  it('is tagged, of the size asked for, titled, and dated at the freeze', () => {
    const info = run('pdfinfo', '-isodates', 'report.pdf')
    expect(info).toMatch(/Tagged:\s+yes/)
    expect(info).toMatch(/Page size:.*A4/)
    expect(info).toMatch(/Title:\s+WB-0042 B draft 2: Stability margins/)
    expect(info).toMatch(/CreationDate:\s+2026-03-02T10:20:30Z/)
    expect(info).toMatch(/ModDate:\s+2026-03-02T10:20:30Z/)
    expect(info).toMatch(/JavaScript:\s+no/)
  })

  it('embeds every font, and none but ours', () => {
    const rows = run('pdffonts', 'report.pdf').trim().split('\n').slice(2)
    expect(rows.length).toBeGreaterThan(2)
    for (const row of rows) {
      expect(row).toMatch(/\+NotoSans/)
      expect(row).toMatch(/ yes yes yes /)
    }
  })

  it('bookmarks every loop', () => {
    // pdftohtml writes the outline of a PDF as XML
    const outline = run('pdftohtml', '-xml', '-stdout', '-i', 'report.pdf')
    for (const loop of snapshot.loops) expect(outline).toMatch(new RegExp(`<item page="\\d+">\\d+ ${loop.code} ${loop.name}`))
    expect(outline).toMatch(/<item page="\d+">1 Summary/)
  })

  it('says its number, its state and the page on every page but its cover, and is stamped a draft', () => {
    const text = run('pdftotext', '-layout', 'report.pdf', '-')
    const pages = text.split('\f').slice(0, -1)
    for (const [index, page] of pages.entries()) {
      expect(page).toContain(`page ${index + 1} of ${pages.length}`)
      if (index > 0) expect(page).toContain('WB-0042 \u00b7 B draft 2')
    }
    expect(text).toContain('Draft, not issued')
  })

  it('says \u2018unstable\u2019 of the unstable loop and prints no margin for it', () => {
    const text = run('pdftotext', '-layout', 'report.pdf', '-')
    const chapter = text.slice(text.lastIndexOf('C2 Extended'), text.indexOf('Criteria, operating conditions', text.lastIndexOf('C2 Extended')))
    expect(chapter).toContain('Closed loop unstable')
    expect(chapter).not.toContain('gain may rise')
  })
})

describe('the HTML of a draft', () => {
  it('names nothing outside itself', () => {
    const html = made.html.bytes.toString('utf8').replace(/base64,[A-Za-z0-9+/=]+/g, '')
    expect(html.match(/(?:src|href)="(?!#|data:)[^"]*"/g)).toBeNull()
    expect(html.match(/https?:\/\/(?!www\.w3\.org\/)[^"' ]+/g)).toBeNull()
  })

  it('carries the fonts of the letters it uses, and no others', () => {
    const html = made.html.bytes.toString('utf8')
    const faces = html.match(/@font-face\{font-family:'[^']+'/g) ?? []
    expect(faces.some(face => face.includes('Noto Sans Math'))).toBe(true)
    expect(html).toContain('U+100-2BA')
    expect(html).not.toContain('U+460-52F')
  })

  it('gives every id once', () => {
    const ids = [...made.html.bytes.toString('utf8').matchAll(/ id="([^"]+)"/g)].map(match => match[1])
    expect(ids.length).toBe(new Set(ids).size)
  })
})

describe('the package of a draft', () => {
  it('passes its own sums and holds the document, tables, responses, figures and the snapshot', () => {
    run('unzip', '-q', 'report.zip', '-d', 'package')
    expect(execFileSync('sha256sum', ['-c', '--strict', 'SHA256SUMS'], { cwd: join(folder, 'package'), encoding: 'utf8' })).not.toContain('FAILED')
    expect(readdirSync(join(folder, 'package')).sort()).toEqual(['SHA256SUMS', 'figures', 'report.html', 'report.pdf', 'responses', 'snapshot.json', 'tables'])
    expect(readdirSync(join(folder, 'package', 'responses')).sort()).toEqual(['SL-P-C1.csv', 'SL-P-C2.csv', 'SL-R-C1.csv', 'SL-R-C2.csv'])
    expect(readFileSync(join(folder, 'package', 'report.pdf')).equals(made.pdf.bytes)).toBe(true)
    expect(JSON.parse(readFileSync(join(folder, 'package', 'snapshot.json'), 'utf8'))).toEqual(snapshot)
  })

  it('is byte for byte the same when it is made again, its PDF included', async () => {
    const again = await printSnapshot(snapshot, printer)
    expect([again.html, again.pdf, again.zip].map(({ bytes }, index) => bytes.equals([made.html, made.pdf, made.zip][index]?.bytes ?? Buffer.alloc(0)))).toEqual([true, true, true])
  })
})

describe('a report of many conditions', () => {
  it('draws the governing one large and the nine worst of the others, says how many it leaves to the tables, and keeps every one there', async () => {
    const conditions = Array.from({ length: 14 }, (_, index) => ({ code: `K${index + 1}`, name: `Condition ${index + 1}`, coordinates: [], tags: [], notes: '' }))
    const loops = snapshot.loops.slice(0, 1)
    const { html, zip } = await printSnapshot(buildSnapshot({ conditions, loops, cells: conditions.map(({ code }) => buildCell('SL-R', code)) }), printer)
    const text = html.bytes.toString('utf8')
    expect(text).toContain('4 more are in the tables alone')
    // one crossing chart, four large figures, two small ones each of nine conditions
    expect(text.match(/<figure /g)).toHaveLength(1 + 4 + 2 * 9)
    for (const { name } of conditions) expect(text).toContain(`${name} <span`)
    writeFileSync(join(folder, 'many.zip'), zip.bytes)
    expect(run('unzip', '-l', 'many.zip').match(/responses\//g)).toHaveLength(14)
  })
})

describe('an issued edition on Letter', () => {
  it('carries the approver, the date of issue as both dates of the PDF, and no stamp', async () => {
    const letter = buildSnapshot({ brand: { ...snapshot.brand, pageSize: 'Letter' } })
    const { pdf } = await printSnapshot(letter, printer, { edition: 'issued', label: 'B', approvedBy: 'Ines Duval', issuedAt: '2026-03-09T08:00:00.000Z' })
    writeFileSync(join(folder, 'issued.pdf'), pdf.bytes)
    expect(run('pdfinfo', '-isodates', 'issued.pdf')).toMatch(/CreationDate:\s+2026-03-09T08:00:00Z[\s\S]*Page size:\s+612 x 792/)
    const text = run('pdftotext', '-layout', 'issued.pdf', '-')
    expect(text).toContain('Ines Duval, 2026-03-09 08:00 UTC')
    expect(text).not.toContain('DRAFT')
    expect(pdf.fileName).toBe('WB-0042-B.pdf')
  })
})
