import { describe, expect, it } from 'vitest'
import { csvOf } from '#server/reports/package/csvOf'
import { createNameGiver, fileNameOf } from '#server/reports/package/fileNameOf'
import { tablesOf } from '#server/reports/package/tablesOf'
import { zipOf } from '#server/reports/package/zipOf'
import { buildAnalysis, buildCell, buildSnapshot } from '../../factories/buildSnapshot'

describe('CSV of the package', () => {
  it('writes a text that begins like a formula so that no spreadsheet runs it, and leaves numbers alone', () => {
    expect(csvOf(['a'], [['=1+1'], ['@x'], ['-cmd'], [-3.5], [-0]])).toBe('a\r\n\'=1+1\r\n\'@x\r\n\'-cmd\r\n-3.5\r\n0\r\n')
    expect(csvOf(['a'], [[' =1+1'], ['\n=1+1']])).toBe('a\r\n\' =1+1\r\n"\'\n=1+1"\r\n')
  })

  it('quotes commas, quotes and line ends (RFC 4180, section 2)', () => {
    expect(csvOf(['a', 'b'], [['x, y', 'say "z"\nnow']])).toBe('a,b\r\n"x, y","say ""z""\nnow"\r\n')
  })

  it('keeps every digit of a number', () => {
    expect(csvOf(['a'], [[0.1 + 0.2], [1e-12]])).toBe('a\r\n0.30000000000000004\r\n1e-12\r\n')
  })

  it('gives no margins of a loop that is not stable, only places and distances', () => {
    const unstable = buildAnalysis({ summary: null, stability: { verdict: 'unstable', basis: 'counted', openLoopUnstablePoles: 0, encirclements: -2, closedLoopUnstablePoles: 2 } })
    const snapshot = buildSnapshot({ cells: [buildCell('SL-R', 'C1', unstable)] })
    const table = (name: string) => String(tablesOf(snapshot).find(file => file.name === `tables/${name}.csv`)?.data).split('\r\n')
    expect(table('crossings').slice(1, 3)).toEqual(['SL-R,C1,gain crossover,23.25,falling,,,,1.476,,,', 'SL-R,C1,phase crossover,163.9,falling,,,,0.847,,,'])
    expect(table('closest-approaches')[1]).toBe('SL-R,C1,158.2,0.846,,,,,')
    expect(table('summary-margins')[1]).toBe('SL-R,C1,design model,expression,unstable,unstable,proven,,,,,,,0.846,158.2,,')
    expect(table('criteria').slice(1, 7).map(row => row.split(',')[5])).toEqual(['', '', '', '', '', ''])
  })
})

describe('names inside the package', () => {
  it('holds nothing a file system could take for a path, a device or an option', () => {
    expect([fileNameOf('../../etc/passwd'), fileNameOf('-rf'), fileNameOf('NUL'), fileNameOf(''), fileNameOf('\u00c5xe 1')]).toEqual(['etc-passwd', 'rf', 'NUL_', 'unnamed', 'Axe-1'])
    // A device's name stays one before a point, and a name cut to length ends in no point.
    expect([fileNameOf('con.1'), fileNameOf(`${'x'.repeat(59)}.y`), fileNameOf('console')]).toEqual(['con_.1', 'x'.repeat(59), 'console'])
  })

  it('gives two loops whose codes read alike different names', () => {
    const nameOf = createNameGiver()
    expect([nameOf('SL-P', '.csv'), nameOf('sl-p', '.csv'), nameOf('SL-P', '.svg')]).toEqual(['SL-P.csv', 'sl-p-2.csv', 'SL-P.svg'])
  })

  it('refuses a path that leaves the archive', async () => {
    await expect(zipOf([{ name: 'a/../../b', data: '' }])).rejects.toThrow('no path inside an archive')
  })

  it('is byte for byte the same for the same files', async () => {
    const files = [{ name: 'a.txt', data: 'one' }, { name: 'b/c.txt', data: Buffer.from([0, 1, 2]) }]
    expect((await zipOf(files)).equals(await zipOf(files))).toBe(true)
  })
})
