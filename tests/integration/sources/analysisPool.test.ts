import { mkdtemp, rm, writeFile } from 'node:fs/promises'
import { availableParallelism, tmpdir } from 'node:os'
import { join } from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { analyseInPool, closeAnalysisPool, runInPool } from '#server/adapters/analysisPool/analysisPool'

/** A worker that misbehaves as it is told, in the place of the engine. */
const unruly = `export default (value) => {
  if (value === 'hang') for (;;) {}
  if (value === 'throw') throw new Error('a fault')
  if (value === 'die') process.exit(1)
  return { answered: value }
}`

let folder = ''
beforeAll(async () => {
  folder = await mkdtemp(join(tmpdir(), 'wideberth-'))
  const file = join(folder, 'unruly.mjs')
  await writeFile(file, unruly)
  process.env.WIDEBERTH_ANALYSIS_WORKER = file
})
afterAll(async () => {
  await closeAnalysisPool()
  await rm(folder, { recursive: true })
})

describe('the pool of analysis threads', () => {
  it('stops what never ends, says so, and answers the next', async () => {
    const [hung, next] = await Promise.all([analyseInPool('hang', 500), analyseInPool('after')])
    expect(hung).toEqual({ error: { message: 'The analysis took longer than 0.5 s and was stopped.', path: '' } })
    expect(next).toEqual({ answered: 'after' })
  })

  it('has what is patient wait for all others, also for those that come later', async () => {
    const count = 20 * availableParallelism()
    const ended: string[] = []
    const patient = Array.from({ length: count }, (_, index) => runInPool('analysis', index, undefined, { patient: true }).then(() => ended.push('patient')))
    await Promise.all([...patient, analyseInPool('urgent').then(() => ended.push('urgent'))])
    expect(ended).toHaveLength(count + 1)
    expect(ended.indexOf('urgent')).toBeLessThan(count - 1)
  })

  it.each(['throw', 'die'])('outlives a thread that should %s', async (fault) => {
    expect(await analyseInPool(fault)).toMatchObject({ error: { message: expect.stringContaining('fault of the engine') as string } })
    expect(await analyseInPool('after')).toEqual({ answered: 'after' })
  })
})
