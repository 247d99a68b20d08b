// npm run bench [-- name ...]: runs every file of scripts/bench (or those named), each in a process of its own, one after the other. Figures are ratios
// within one run where they can be: this is no test and nothing here passes or fails.
import { spawnSync } from 'node:child_process'
import { readdirSync } from 'node:fs'
import { cpus } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { bundle, projectFolder } from './bundle.mjs'

const names = readdirSync(join(projectFolder, 'scripts/bench')).filter(name => name.endsWith('.ts')).map(name => name.slice(0, -3)).sort()
const wanted = process.argv.slice(2)
const unknown = wanted.filter(name => !names.includes(name))
if (unknown.length > 0) {
  console.error(`No bench named ${unknown.join(', ')}; there are: ${names.join(', ')}`)
  process.exit(2)
}
console.log(`Node.js ${process.version}, ${cpus().length} x ${cpus()[0]?.model.trim() ?? 'processor'}`)
for (const name of wanted.length > 0 ? wanted : names) {
  console.log(`\n${name}`)
  // packages stay outside the bundle: a bench of the server needs their bindings and worker files
  const address = await bundle(`scripts/bench/${name}.ts`, `bench-${name}`, { packages: 'external' })
  const { status } = spawnSync(process.execPath, ['--expose-gc', fileURLToPath(address)], { stdio: 'inherit', cwd: projectFolder })
  if (status !== 0) process.exitCode = 1
}
