import { fileURLToPath } from 'node:url'
import { availableParallelism } from 'node:os'
import { isMainThread } from 'node:worker_threads'
import { Piscina } from 'piscina'
import { analyseFactored } from '#shared/analysis/analyseFactored'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { factorsFromCoefficients } from '#shared/analysis/factors/factorsFromCoefficients'
import { factorsOfInput } from '#shared/analysis/factorsOfInput'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import type { ExpressionInput, LoopAnalysis, LoopInput, ZerosPolesInput } from '#shared/types/analysis'
import { constant, delay, difference, expressionOf, polynomial, product, quotient, sum, type LoopTree } from '../../tests/oracle/LoopTree'
import { benchLoop } from './engine/benchFamily'
import { expandRoots } from './engine/expandRoots'
import { plainEvaluation } from './engine/plainEvaluation'
import { plainTree } from './engine/plainTree'
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

const over = (numerator: number[], denominator: number[]) => quotient(polynomial(numerator), polynomial(denominator))

/** Sums of modes, predictors and inner loops with several dead times. */
function generalLoops(): [string, LoopTree, number][] {
  const threeModes = product(over([20], [1, 1]), sum(sum(
    product(over([1], [1, 5]), delay(0.01)), product(over([0.3], [1, 0.4, 100]), delay(0.02))), product(over([0.1], [1, 0.2, 400]), delay(0.05))))
  const model = over([2, 2], [1, 1, 0])
  const predictor = quotient(product(model, delay(0.5)), sum(constant(1), product(model, difference(constant(1), delay(0.5)))))
  const twoPaths = difference(product(over([5], [1, 2, 1]), delay(0.1)), product(over([2], [1, 2]), delay(0.3)))
  const inner = product(over([10], [1, 4]), delay(0.02))
  const innerLoop = product(over([3], [1, 0]), quotient(inner, sum(constant(1), product(constant(0.5), inner))))
  const modes = Array.from({ length: 10 }, (_, i): LoopTree => product(over([1 / (i + 1)], [1, 0.1 * (i + 1), (i + 1) ** 2 * 25]), delay(0.001 * (i + 1))))
  const tenModes = product(over([800], [1, 0]), modes.slice(1).reduce(sum, modes[0]!))
  return [
    ['three modes, three dead times', threeModes, -60], ['predictor', predictor, -30], ['two paths', twoPaths, -40], ['inner loop with dead time', innerLoop, -60],
    ['ten modes, ten dead times', tenModes, -60],
  ]
}

function expressions(): void {
  console.log(`  general expressions with several dead times against a plain evaluation of the tree, without allocation, at ${POINTS} points (goal: at most 5 up to 100 finds)`)
  const frequencies = logSpaced(1e-2, 1e4, POINTS)
  for (const [name, tree, gainFloor] of generalLoops()) {
    const input: ExpressionInput = { expression: expressionOf(tree), gainFloor }
    const plain = plainTree(tree)
    for (let i = 0; i < 5; i += 1) {
      plain(frequencies)
      analyseLoop(input)
    }
    const analysis = analyseLoop(input)
    const engine = leastMilliseconds(() => analyseLoop(input), 9)
    const evaluation = leastMilliseconds(() => plain(frequencies), 9)
    console.log(`    ${name}: ratio ${(engine / evaluation).toPrecision(3)} (${engine.toPrecision(3)} ms against ${evaluation.toPrecision(3)}), ${findsOf(analysis)} finds, ${analysis.coverage.proven ? 'proven' : `not proven: ${analysis.coverage.exceptions[0]?.reason}`}`)
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
