import { availableParallelism } from 'node:os'
import { parseArgs } from 'node:util'
import { isMainThread, parentPort, Worker, workerData } from 'node:worker_threads'
import { analyseLoop } from '#shared/analysis/analyseLoop'
import { readLoopInput } from '#shared/analysis/readLoopInput'
import { compareWithOracle } from '../../tests/oracle/compareWithOracle'
import { compareWithTree } from '../../tests/oracle/compareWithTree'
import { generateLoop, LOOP_FAMILIES, type LoopFamily } from '../../tests/oracle/generateLoop'
import { compareWithRationalTree } from '../../tests/oracle/compareWithRationalTree'
import { generateRationalTree, RATIONAL_TREE_FAMILIES, type RationalTreeFamily } from '../../tests/oracle/generateRationalTree'
import { generateTree, TREE_FAMILIES, type TreeFamily } from '../../tests/oracle/generateTree'

type Family = LoopFamily | TreeFamily | RationalTreeFamily

interface Share { family: Family, from: number, to: number, step: number, orders: [number, number] }
interface Row { seed: number, differences: string[], exceptions: string[], setAside: string[], fault?: string }

const analyse = (input: unknown) => analyseLoop(readLoopInput(input))
const isTree = (family: Family): family is TreeFamily => (TREE_FAMILIES as readonly string[]).includes(family)
const isRationalTree = (family: Family): family is RationalTreeFamily => (RATIONAL_TREE_FAMILIES as readonly string[]).includes(family)

function compareOne(family: Family, seed: number, orders: [number, number]) {
  if (isRationalTree(family)) return compareWithRationalTree(generateRationalTree(family, seed), analyse)
  return isTree(family) ? compareWithTree(generateTree(family, seed), analyse) : compareWithOracle(generateLoop(family, seed, orders), analyse)
}

/** Compares one share of a family's loops; every row that is not plain agreement is told. */
function compareShare({ family, from, to, step, orders }: Share): Row[] {
  const rows: Row[] = []
  for (let seed = from; seed < to; seed += step) {
    try {
      rows.push({ seed, ...compareOne(family, seed, orders) })
    }
    catch (error) {
      rows.push({ seed, differences: [], exceptions: [], setAside: [], fault: error instanceof Error ? (error.stack ?? error.message).split('\n').slice(0, 3).join(' ') : String(error) })
    }
  }
  return rows
}

async function main(): Promise<void> {
  const { values } = parseArgs({
    options: {
      count: { type: 'string', default: '3000' },
      start: { type: 'string', default: '0' },
      family: { type: 'string' },
      orders: { type: 'string', default: '2-9' },
      show: { type: 'string', default: '5' },
    },
  })
  const all: Family[] = [...LOOP_FAMILIES, ...RATIONAL_TREE_FAMILIES, ...TREE_FAMILIES]
  const families = all.filter(f => values.family === undefined || f === values.family)
  if (families.length === 0) throw new Error(`no family '${values.family}'; there are: ${all.join(', ')}`)
  const orders = values.orders.split('-').map(Number) as [number, number]
  const start = Number(values.start)
  const each = Math.ceil(Number(values.count) / families.length)
  const threads = availableParallelism()
  let total = 0
  let differing = 0
  let excepted = 0
  let aside = 0
  const began = performance.now()
  for (const family of families) {
    const shares = Array.from({ length: threads }, (_, i): Share => ({ family, from: start + i, to: start + each, step: threads, orders }))
    const parts = await Promise.all(shares.map(share => new Promise<Row[]>((resolve, reject) => {
      const worker = new Worker(new URL(import.meta.url), { workerData: share })
      worker.once('message', resolve)
      worker.once('error', reject)
    })))
    const rows = parts.flat().sort((a, b) => a.seed - b.seed)
    const bad = rows.filter(r => r.differences.length > 0 || r.fault)
    const exceptions = rows.filter(r => r.exceptions.length > 0)
    total += rows.length
    differing += bad.length
    excepted += exceptions.length
    aside += rows.filter(r => r.setAside.length > 0).length
    console.log(`${family.padEnd(28)} ${String(rows.length).padStart(5)} loops, ${bad.length} differ, ${exceptions.length} with exceptions, ${rows.filter(r => r.setAside.length > 0).length} set aside`)
    for (const row of bad.slice(0, Number(values.show))) console.log(`  seed ${row.seed}: ${row.fault ?? row.differences.slice(0, 3).join('; ')}`)
    for (const row of exceptions.slice(0, Number(values.show))) console.log(`  seed ${row.seed}, exception: ${row.exceptions.slice(0, 2).join('; ')}`)
    for (const row of rows.filter(r => r.setAside.length > 0).slice(0, 2)) console.log(`  seed ${row.seed}, set aside: ${row.setAside.slice(0, 2).join('; ')}`)
  }
  console.log(`${total} loops of order ${values.orders} in ${((performance.now() - began) / 1000).toFixed(1)} s: ${differing} differ, ${excepted} with exceptions (${(100 * excepted / total).toFixed(2)} %), ${aside} set aside`)
  if (differing > 0) process.exitCode = 1
}

if (isMainThread) await main()
else parentPort!.postMessage(compareShare(workerData as Share))
