// What the editor's worker needs for one loop of order 10 while one types, in the real Chromium: analysis, input reading included.
import { build } from 'esbuild'
import { chromium } from 'playwright-core'
import { findChromium } from '#server/adapters/chromium/findChromium'
import type { LoopInput } from '#shared/types/analysis'
import { benchLoop } from './engine/benchFamily'
import { expandRoots } from './engine/expandRoots'

const loops = 40
const rounds = 5

/** The same loop as typed: quotient of its polynomials, with its dead time. */
function typed(seed: number): LoopInput {
  const loop = benchLoop(seed, [10, 10], seed % 2 === 1)
  const { numerator, denominator } = expandRoots(loop)
  const text = (coefficients: number[]) => coefficients.map((value, index) => `(${value})*s^${coefficients.length - 1 - index}`).join('+')
  return { expression: `(${text(numerator)})/(${text(denominator)})${loop.deadTime ? `*exp(-${loop.deadTime}*s)` : ''}` }
}

/** What the worker runs: each input once to warm up, then the least of some rounds; answers the times in ms. */
const workerSource = `
import { analyseEntries } from './shared/analysis/analyseEntries'
self.onmessage = ({ data: { inputs, rounds } }) => {
  for (const input of inputs) analyseEntries(input)
  self.postMessage(inputs.map((input) => {
    let least = Infinity
    for (let round = 0; round < rounds; round++) {
      const start = performance.now()
      analyseEntries(input)
      least = Math.min(least, performance.now() - start)
    }
    return least
  }))
}`

const bundled = await build({ stdin: { contents: workerSource, resolveDir: process.cwd(), loader: 'ts' }, bundle: true, write: false, format: 'iife', target: 'es2022', alias: { '#shared': `${process.cwd()}/shared` }, logLevel: 'error' })
const script = bundled.outputFiles[0]?.text ?? ''
const executablePath = findChromium()
if (executablePath === null) throw new Error('No Chromium was found.')
const browser = await chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-gpu', '--disable-background-networking'] })
try {
  const page = await browser.newPage()
  const ask = `({ script, inputs, rounds }) => new Promise((resolve, reject) => {
    const worker = new Worker(URL.createObjectURL(new Blob([script], { type: 'text/javascript' })))
    worker.onmessage = event => resolve(event.data)
    worker.onerror = event => reject(new Error(event.message))
    worker.postMessage({ inputs, rounds })
  })`
  const inputs = Array.from({ length: loops }, (_, seed) => typed(seed))
  const times = await page.evaluate(`(${ask})(${JSON.stringify({ script, inputs, rounds })})`) as number[]
  const ordered = [...times].sort((a, b) => a - b)
  const at = (share: number) => (ordered[Math.min(ordered.length - 1, Math.floor(share * ordered.length))] ?? Number.NaN).toFixed(2)
  console.log(`  typed loop of order 10 in a worker of Chromium: ms median ${at(0.5)}, 90th percentile ${at(0.9)}, most ${at(1)} (goal: median under 4)`)
}
finally {
  await browser.close()
}
