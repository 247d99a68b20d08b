import { spawnSync } from 'node:child_process'
import { cpSync, mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, describe, expect, it } from 'vitest'
import { checkLoops } from './checkLoop'

const project = fileURLToPath(new URL('../..', import.meta.url))
const folder = mkdtempSync(join(tmpdir(), 'analyze-'))
afterAll(() => rmSync(folder, { recursive: true }))

function analyze(input: string, file?: string, cwd = project) {
  const { status, stdout, stderr } = spawnSync(process.execPath, [join(project, 'scripts/analyze.mjs'), ...file ? [file] : []], { input, encoding: 'utf8', cwd, maxBuffer: 1 << 28 })
  return { status, stderr, result: stdout === '' ? undefined : JSON.parse(stdout) }
}

const good = { name: 'rate', numerator: [3], denominator: [1, 3, 3, 1] }

describe('npm run analyze', () => {
  it('answers what is not JSON with an error, and exits 1', () => {
    const { status, result } = analyze('{"numerator": [1')
    expect(status).toBe(1)
    expect(result.error.message).toMatch(/not JSON/)
    expect(result.error.path).toBe('')
  })

  it('answers a file that is not there in words, and exits 2', () => {
    const { status, stderr } = analyze('', join(folder, 'none.json'))
    expect(status).toBe(2)
    expect(stderr).toMatch(/none\.json/)
  })

  it('gives an object for an object, from standard input, and exits 0', () => {
    const { status, result, stderr } = analyze(JSON.stringify(good))
    expect([status, stderr]).toEqual([0, ''])
    expect(result.name).toBe('rate')
    expect(result.phaseCrossovers[0].frequency).toBeCloseTo(Math.sqrt(3), 12)
  })

  it('gives a list for a list in the same order, faults in their places, and exits 1; from a file and from another folder', () => {
    const file = join(folder, 'entries.json')
    writeFileSync(file, JSON.stringify([{ ...good, name: 'a' }, { denominator: [1], numerator: ['x'] }, null, { ...good, name: 'b' }]))
    const { status, result } = analyze('', file, folder)
    expect(status).toBe(1)
    expect(result.map((r: { name?: string, error?: { message: string, path: string } }) => r.name ?? typeof r.error?.message)).toEqual(['a', 'string', 'string', 'b'])
    expect(result[1].error.path).toBe('numerator[0]')
  })

  it('gives an empty list for an empty list', () => {
    expect(analyze('[]')).toMatchObject({ status: 0, result: [] })
  })

  it('takes all textbook loops at once', () => {
    const entries = checkLoops.map(l => ({
      name: l.id, numerator: l.num, denominator: l.den, ...l.delay > 0 ? { deadTime: l.delay } : {}, ...l.Ts === null ? {} : { sampleTime: l.Ts },
    }))
    const { status, result } = analyze(JSON.stringify(entries))
    expect(status).toBe(0)
    expect(result.map((r: { name: string }) => r.name)).toEqual(checkLoops.map(l => l.id))
  })

  it('says what to run where the packages are missing', () => {
    mkdirSync(join(folder, 'clone'))
    cpSync(join(project, 'scripts'), join(folder, 'clone/scripts'), { recursive: true })
    cpSync(join(project, 'shared'), join(folder, 'clone/shared'), { recursive: true })
    const { status, stderr } = spawnSync(process.execPath, ['scripts/analyze.mjs'], { input: '{}', encoding: 'utf8', cwd: join(folder, 'clone') })
    expect(status).toBe(2)
    expect(stderr).toMatch(/npm ci/)
  })
})
