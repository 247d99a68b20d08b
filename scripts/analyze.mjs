// npm run -s analyze [file]: one entry of the analysis contract, or a list, as JSON in a file or on standard input; the results as JSON on standard
// output. Exit 1 where an entry could not be analysed (its error stands in its place), 2 where nothing could be run.
import { readFileSync } from 'node:fs'
import { bundle } from './bundle.mjs'

function readInput(file) {
  try {
    return readFileSync(file ?? 0, 'utf8')
  }
  catch (error) {
    console.error(file ? `Cannot read ${file}: ${error.message}` : `Cannot read standard input: ${error.message}`)
    process.exit(2)
  }
}

function parse(text) {
  try {
    return { value: JSON.parse(text) }
  }
  catch (error) {
    return { failure: { error: { message: `the input is not JSON: ${error.message}`, path: '' } } }
  }
}

const { analyseEntries, hasFailure } = await import(await bundle('shared/analysis/analyseEntries.ts', 'analyze'))
const { value, failure } = parse(readInput(process.argv[2]))
const result = failure ?? analyseEntries(value, { onFault: error => console.error(error) })
process.stdout.write(`${JSON.stringify(result, null, process.stdout.isTTY ? 2 : 0)}\n`)
if (hasFailure(result)) process.exitCode = 1
