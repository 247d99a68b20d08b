import { spawn } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { dataFolder } from './setUp/paths.mjs'
import { ensureBuild } from './setUp/ensureBuild.mjs'
import { ensureDebianPrograms } from './setUp/ensureDebianPrograms.mjs'
import { ensureDemoData } from './setUp/ensureDemoData.mjs'
import { ensurePackages } from './setUp/ensurePackages.mjs'

/** `npm start`: everything from a fresh clone to a serving application; what is done already is skipped. */
await ensurePackages()
await ensureDebianPrograms(['chromium'])
const entry = await ensureBuild()
const isDemo = await ensureDemoData(entry)

const port = process.env.PORT || '3000'
const address = process.env.WIDEBERTH_URL || `http://localhost:${port}`
const server = spawn(process.execPath, [entry], {
  stdio: 'inherit',
  env: {
    ...process.env,
    NODE_ENV: 'production',
    PORT: port,
    UV_THREADPOOL_SIZE: process.env.UV_THREADPOOL_SIZE || '16',
    WIDEBERTH_DATA: dataFolder(),
    WIDEBERTH_URL: address,
  },
})
for (const signal of ['SIGINT', 'SIGTERM']) process.on(signal, () => server.kill(signal))
server.on('exit', (code, signal) => process.exit(code ?? (signal ? 0 : 1)))

const isUp = async () => {
  try {
    return (await fetch(`http://127.0.0.1:${port}/api/health`)).ok
  }
  catch {
    return false // nothing listens yet
  }
}
const deadline = Date.now() + 60_000
while (!(await isUp())) {
  if (Date.now() > deadline) {
    console.error('The server did not answer within a minute.')
    server.kill()
    process.exit(1)
  }
  await new Promise(resolve => setTimeout(resolve, 200))
}

console.log(`\nWideberth serves at ${address}   (data in ${dataFolder()})`)
if (isDemo) {
  const { password, people } = JSON.parse(readFileSync(new URL('../server/demo/accounts.json', import.meta.url), 'utf8'))
  console.log(`\nDemo accounts, all with the password  ${password}`)
  for (const { email, name, does } of people) console.log(`  ${email.padEnd(32)} ${name.padEnd(18)} ${does}`)
}
console.log('\nCtrl+C stops it.')
