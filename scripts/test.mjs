import { mkdirSync, readFileSync, rmSync } from 'node:fs'
import { join } from 'node:path'
import { ensureBuild } from './setUp/ensureBuild.mjs'
import { ensureDebianPrograms } from './setUp/ensureDebianPrograms.mjs'
import { ensurePackages } from './setUp/ensurePackages.mjs'
import { root } from './setUp/paths.mjs'
import { runStep } from './setUp/runStep.mjs'

/**
 * `npm test`: its own set-up, then lint, type check, and every kind of test, with one line at the end.
 * Names of kinds after `--` run only those: npm test -- unit api
 */
const kinds = ['unit', 'reference', 'integration', 'nuxt', 'api', 'e2e']
const asked = process.argv.slice(2)
const unknown = asked.filter(name => !['lint', 'typecheck', ...kinds].includes(name))
if (unknown.length > 0) {
  console.error(`No such kind of test: ${unknown.join(', ')}. There are: lint, typecheck, ${kinds.join(', ')}.`)
  process.exit(2)
}
const wanted = name => asked.length === 0 || asked.includes(name)

await ensurePackages()
const programs = await ensureDebianPrograms(['chromium', 'poppler-utils', 'unzip'])
if (!programs) process.exit(1)

let passed = 0
let failed = 0
const count = (name, isGood) => {
  if (isGood) passed++
  else failed++
  console.log(`${name}: ${isGood ? 'passed' : 'FAILED'}`)
}

await runStep('npx', ['--no-install', 'nuxt', 'prepare'], { quiet: true })
if (wanted('lint')) count('lint', await runStep('npx', ['--no-install', 'eslint', '.']) === 0)
if (wanted('typecheck')) count('type check', await runStep('npx', ['--no-install', 'nuxt', 'typecheck']) === 0)
if (wanted('api') || wanted('e2e')) await ensureBuild()

const results = join(root, '.cache', 'test-results')
mkdirSync(results, { recursive: true })
for (const kind of kinds.filter(wanted)) {
  const file = join(results, `${kind}.json`)
  rmSync(file, { force: true })
  const code = await runStep('npx', ['--no-install', 'vitest', 'run', '--project', kind, '--reporter=default', '--reporter=json', `--outputFile.json=${file}`])
  let outcome
  try {
    outcome = JSON.parse(readFileSync(file, 'utf8'))
  }
  catch (error) {
    console.error(`${kind}: the test runner left no result (${error.message})`)
    failed++
    continue
  }
  passed += outcome.numPassedTests
  failed += outcome.numFailedTests
  // A file that cannot be loaded, or an error outside any test, counts as one failure.
  const brokenFiles = outcome.testResults.filter(result => result.status === 'failed' && result.assertionResults.every(test => test.status !== 'failed')).length
  failed += brokenFiles
  if (code !== 0 && outcome.numFailedTests + brokenFiles === 0) failed++
  if (outcome.numTotalTests === 0) {
    console.error(`${kind}: no test ran`)
    failed++
  }
}

console.log(`\n${passed} passed, ${failed} failed`)
process.exit(failed === 0 ? 0 : 1)
