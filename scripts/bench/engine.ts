import { fileURLToPath } from 'node:url'
import { availableParallelism } from 'node:os'
import { isMainThread } from 'node:worker_threads'
import { Piscina } from 'piscina'
import { analyseFactored } from '#shared/analysis/analyseFactored'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { factorsFromCoefficients } from '#shared/analysis/factors/factorsFromCoefficients'
import { factorsOfInput } from '#shared/analysis/factorsOfInput'
import { prepareLoopGain } from '#shared/analysis/prepareLoopGain'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { ExpressionInput, LoopAnalysis, LoopInput, ZerosPolesInput } from '#shared/types/analysis'
import { benchLoop } from './engine/benchFamily'
import { plainEvaluation } from './engine/plainEvaluation'
import { leastMilliseconds, logSpaced, quantile, spread } from './engine/timing'

const POINTS = 10_000
const LOOPS = 300

/** What a thread of the pool does with a list of entries. */
export default function analyseList(entries: unknown[]): LoopAnalysis[] {
  return entries.map(analyseEntry)
}

function analyseEntry(entry: unknown): LoopAnalysis {
  return analyseLoop(readLoopInput(entry))
}

const findsOf = (a: LoopAnalysis) => a.gainCrossovers.length + a.phaseCrossovers.length + a.closestApproaches.length

function family(): void {
  const loops = Array.from({ length: LOOPS }, (_, seed) => benchLoop(seed, [10, 20]))
  const frequencies = logSpaced(1e-3, 1e5, POINTS)
  for (const loop of loops) {
    analyseLoop(loop)
    plainEvaluation(loop)(frequencies)
  }
  const rows = loops.map((loop) => {
    const plain = plainEvaluation(loop)
    const analysis = analyseLoop(loop)
    const engine = leastMilliseconds(() => analyseLoop(loop), 7)
    return { engine, ratio: engine / leastMilliseconds(() => plain(frequencies), 5), finds: findsOf(analysis), proven: analysis.coverage.proven }
  })
  const few = rows.filter(r => r.finds <= 30)
  const many = rows.filter(r => r.finds >= 100)
  console.log(`  ${LOOPS} seeded loops of order 10 to 20, half with dead time, from zeros and poles; complete proven analysis against plain evaluation (real and`)
  console.log(`  quadratic factors, one division) at ${POINTS} points`)
  console.log(`    up to 30 finds, ${few.length} loops: ratio ${spread(few.map(r => r.ratio))} (goal: median at most 2, 99th percentile at most 5)`)
  console.log(`    all: ratio ${spread(rows.map(r => r.ratio))}; ms ${spread(rows.map(r => r.engine))}; finds ${spread(rows.map(r => r.finds), 4)}`)
  console.log(`    100 finds and more, ${many.length} loops: microseconds a find ${spread(many.map(r => r.engine * 1000 / r.finds))} (goal: at most 15)`)
  console.log(`    not proven: ${rows.filter(r => !r.proven).length}`)
}

function expandRoots(loop: ZerosPolesInput): { numerator: number[], denominator: number[] } {
  const expand = (list: [number, number][], lead: number) => {
    let p = [lead]
    for (const [re, im] of list) {
      if (im < 0) continue
      const q = im === 0 ? [1, -re] : [1, -2 * re, re * re + im * im]
      const product = new Array<number>(p.length + q.length - 1).fill(0)
      p.forEach((a, i) => q.forEach((b, j) => {
        product[i + j]! += a * b
      }))
      p = product
    }
    return p
  }
  return { numerator: expand(loop.zeros, loop.gain), denominator: expand(loop.poles, 1) }
}

function coefficients(): void {
  for (const [order, goal] of [[24, 2], [40, 10]] as const) {
    const loops = Array.from({ length: 40 }, (_, seed) => expandRoots(benchLoop(seed, [order, order], false)))
    const convert = ({ numerator, denominator }: typeof loops[number]) => factorsFromCoefficients(numerator, denominator, { deadTime: 0 })
    const first = leastMilliseconds(() => convert(loops[0]!), 1)
    for (const loop of loops) convert(loop)
    const times = loops.map(loop => leastMilliseconds(() => convert(loop), 5))
    console.log(`  coefficients to factors, order ${order}: ms ${spread(times)}; the very first ${first.toPrecision(3)} (goal: under ${goal})`)
  }
}

/** Sums of modes and predictor loops with several dead times. */
const GENERAL: [string, ExpressionInput][] = [
  ['three modes, three dead times', { expression: '20/(s+1)*(exp(-0.01*s)/(s+5) + 0.3*exp(-0.02*s)/(s^2+0.4*s+100) + 0.1*exp(-0.05*s)/(s^2+0.2*s+400))' }],
  ['Smith predictor', { expression: '2*(1+1/s)*exp(-0.5*s)/(s+1)/(1+2*(1+1/s)/(s+1)*(1-exp(-0.5*s)))' }],
  ['two paths', { expression: '5*(exp(-0.1*s)/(s+1)^2 - 0.4*exp(-0.3*s)/(s+2))' }],
  ['inner loop with dead time', { expression: '3/s*(10*exp(-0.02*s)/(s+4))/(1+10*exp(-0.02*s)/(s+4)*0.5)' }],
  ['ten modes, ten dead times', {
    expression: `8/s*(${Array.from({ length: 10 }, (_, i) => `${(1 / (i + 1)).toFixed(3)}*exp(-${(0.001 * (i + 1)).toFixed(3)}*s)/(s^2+${(0.1 * (i + 1)).toFixed(2)}*s+${(i + 1) ** 2 * 25})`).join(' + ')})*100`,
  }],
]

function expressions(): void {
  console.log(`  general expressions with several dead times against a plain evaluation of the tree at ${POINTS} points (goal: at most 5 up to 100 finds)`)
  const frequencies = logSpaced(1e-2, 1e4, POINTS)
  for (const [name, input] of GENERAL) {
    const loop = prepareLoopGain(input)
    const value = new Float64Array(2)
    const plain = () => {
      let sum = 0
      for (const w of frequencies) if (loop.evaluate(w, value)) sum += value[0]!
      return sum
    }
    for (let i = 0; i < 5; i += 1) {
      plain()
      analyseLoop(input)
    }
    const analysis = analyseLoop(input)
    const engine = leastMilliseconds(() => analyseLoop(input), 9)
    const tree = leastMilliseconds(plain, 9)
    console.log(`    ${name}: ratio ${(engine / tree).toPrecision(3)} (${engine.toPrecision(3)} ms against ${tree.toPrecision(3)}), ${findsOf(analysis)} finds, ${analysis.coverage.proven ? 'proven' : `not proven: ${analysis.coverage.exceptions[0]?.reason}`}`)
  }
}

function preview(): void {
  const forms = Array.from({ length: 40 }, (_, seed) => {
    const loop = benchLoop(seed, [10, 10], seed % 2 === 1)
    const { numerator, denominator } = expandRoots(loop)
    const text = (p: number[]) => p.map((c, i) => `(${c})*s^${p.length - 1 - i}`).join('+')
    const input: LoopInput = { expression: `(${text(numerator)})/(${text(denominator)})${loop.deadTime ? `*exp(-${loop.deadTime}*s)` : ''}` }
    return [loop, { numerator, denominator, ...loop.deadTime ? { deadTime: loop.deadTime } : {} }, input] as const
  })
  for (const [i, name] of ['zeros and poles', 'coefficients', 'a typed expression'].entries()) {
    for (const row of forms) analyseEntry(row[i])
    const times = forms.map(row => leastMilliseconds(() => analyseEntry(row[i]), 5))
    console.log(`  preview of order 10 from ${name}, reading included: ms ${spread(times)} (goal: median under 4)`)
  }
}

function growth(): void {
  console.log('  growth with the number of phase crossovers, 2 exp(-s T)/(s + 1) with T set for their number; the limit of the lists lifted for this:')
  const crossingsAt = (gainFloor: number) => (2 * 10 ** (-gainFloor / 20)) / (2 * Math.PI)
  for (const total of [100, 1000, 10_000, 100_000]) {
    const input: ZerosPolesInput = { zeros: [], poles: [[-1, 0]], gain: 2, deadTime: total / crossingsAt(-60), gainFloor: -60 }
    const factors = factorsOfInput(input)
    let found = 0
    const time = leastMilliseconds(() => {
      found = analyseFactored(factors, input, { maxListed: 1_000_000, maxEffort: 100_000_000 }).phaseCrossovers.length
    }, total > 50_000 ? 2 : 5)
    console.log(`    ${found} crossovers: ${time.toPrecision(3)} ms, ${(time * 1000 / found).toPrecision(3)} microseconds each`)
  }
}

async function pool(): Promise<void> {
  const threads = availableParallelism()
  const loops = Array.from({ length: LOOPS }, (_, seed) => benchLoop(seed, [10, 20]))
  const lists = Array.from({ length: LOOPS / 10 }, (_, i) => loops.slice(10 * i, 10 * i + 10))
  const workers = new Piscina({ filename: fileURLToPath(import.meta.url), minThreads: threads, maxThreads: threads, execArgv: [] })
  const all = async () => {
    await Promise.all(lists.map(list => workers.run(list)))
  }
  await all()
  const times: number[] = []
  for (let i = 0; i < 5; i += 1) {
    const start = performance.now()
    await all()
    times.push(performance.now() - start)
  }
  await workers.destroy()
  console.log(`  pool of ${threads} threads: ${Math.round(LOOPS * 1000 / quantile(times, 0.5))} loops a second, in lists of ten`)
}

if (isMainThread) {
  family()
  coefficients()
  expressions()
  preview()
  growth()
  await pool()
}
