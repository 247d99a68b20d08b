import { mkdtempSync, readFileSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath, pathToFileURL } from 'node:url'
import { build } from 'esbuild'
import { afterAll, describe, expect, it } from 'vitest'
import type { LoopAnalysis } from '#shared/types/analysis'
import { compareWithOracle } from '../oracle/compareWithOracle'
import { generateLoop, LOOP_FAMILIES } from '../oracle/generateLoop'

const project = fileURLToPath(new URL('../..', import.meta.url))
const folder = mkdtempSync(join(tmpdir(), 'planted-'))
afterAll(() => rmSync(folder, { recursive: true }))

interface Fault { name: string, file: string, right: string, wrong: string }

/** Builds the engine with one line of it changed. */
async function engineWith({ name, file, right, wrong }: Fault): Promise<(input: unknown) => LoopAnalysis> {
  const path = join(project, file)
  const source = readFileSync(path, 'utf8')
  expect(source.split(right), `'${right}' must stand once in ${file}`).toHaveLength(2)
  const outfile = join(folder, `${name.replaceAll(/\W+/g, '-')}.mjs`)
  await build({
    stdin: {
      contents: `import { analyseLoop } from '#shared/analysis/analyseLoop'
        import { readLoopInput } from '#shared/analysis/readLoopInput'
        export const analyse = input => analyseLoop(readLoopInput(input))`,
      resolveDir: project,
    },
    alias: { '#shared': join(project, 'shared') },
    bundle: true, format: 'esm', platform: 'node', outfile, logLevel: 'error',
    plugins: [{
      name: 'plant',
      setup: ({ onLoad }) => onLoad({ filter: /\.ts$/ }, args => args.path === path ? { contents: source.replace(right, wrong), loader: 'ts' } : undefined),
    }],
  })
  return (await import(pathToFileURL(outfile).href)).analyse
}

/** The first loop, out of 10 of each family, on which the oracle contradicts the engine; null: on none. */
function firstContradicted(analyse: (input: unknown) => LoopAnalysis): string | null {
  for (const family of LOOP_FAMILIES) {
    for (let seed = 0; seed < 10; seed += 1) {
      const { differences } = compareWithOracle(generateLoop(family, seed), analyse)
      if (differences.length > 0) return `${family} ${seed}: ${differences[0]}`
    }
  }
  return null
}

const ISOLATOR = 'shared/numeric/series/RootIsolator.ts'
const FAULTS: Fault[] = [
  { name: 'no fault', file: ISOLATOR, right: 'if (Math.abs(c[0]!) > spread + bound0) continue', wrong: 'if (Math.abs(c[0]!) > spread + bound0) continue' },
  { name: 'a box is dismissed too readily', file: ISOLATOR, right: 'if (Math.abs(c[0]!) > spread + bound0) continue', wrong: 'if (Math.abs(c[0]!) > 0.7 * spread + bound0) continue' },
  { name: 'a function is taken for monotone that is not', file: ISOLATOR, right: 'if (Math.abs(c[1]!) > bend1 + bound1) {', wrong: 'if (Math.abs(c[1]!) > 0.6 * bend1 + bound1) {' },
  { name: 'two crossings of one hump are dropped', file: ISOLATOR, right: 'if (up * atFrom < 0) continue', wrong: 'if (!opposite) continue' },
]

/** When written, the three faults were contradicted on 91, 4 and 13 of the 160 loops. */
describe('an engine built with a fault in its isolation is contradicted by the oracle', () => {
  for (const fault of FAULTS) {
    it(fault.name, async () => {
      const contradiction = firstContradicted(await engineWith(fault))
      if (fault.right === fault.wrong) expect(contradiction).toBeNull()
      else expect(contradiction).not.toBeNull()
    })
  }
})
