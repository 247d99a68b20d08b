import { spawn } from 'node:child_process'
import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { ensureBuild } from '../../scripts/setUp/ensureBuild.mjs'
import { ensureDemoData } from '../../scripts/setUp/ensureDemoData.mjs'
import { freePort } from '../factories/freePort'

export interface DemoServer {
  url: string
  stop: () => Promise<void>
}

/** The built application as `npm start` serves it, on a data folder and a port of its own; with the demo's data unless asked otherwise. */
export async function startDemoServer({ demo = true } = {}): Promise<DemoServer> {
  const folder = mkdtempSync(join(tmpdir(), 'wideberth-e2e-'))
  const port = await freePort()
  const url = `http://localhost:${port}`
  const environment = { ...process.env, NODE_ENV: 'production', PORT: String(port), UV_THREADPOOL_SIZE: '16', WIDEBERTH_DATA: folder, WIDEBERTH_URL: url, WIDEBERTH_SMTP_URL: '' }
  const entry = await ensureBuild()
  if (demo) await ensureDemoData(entry, folder)
  const server = spawn(process.execPath, [entry], { env: environment, stdio: ['ignore', 'pipe', 'pipe'] })
  let said = ''
  server.stdout.on('data', (chunk: Buffer) => said += chunk.toString())
  server.stderr.on('data', (chunk: Buffer) => said += chunk.toString())
  let isStopping = false
  const ended = new Promise<void>(resolve => server.on('exit', (code, signal) => {
    if (!isStopping) console.error(`The server ended by itself (${signal ?? code}):\n${said.slice(-4000)}`)
    resolve()
  }))
  for (let tries = 0; tries < 300; tries++) {
    if (server.exitCode !== null) break
    const isUp = await fetch(`${url}/api/health`).then(reply => reply.ok, () => false)
    if (isUp) {
      return {
        url,
        stop: async () => {
          isStopping = true
          server.kill('SIGTERM')
          await ended
          rmSync(folder, { recursive: true, force: true })
        },
      }
    }
    await new Promise(resolve => setTimeout(resolve, 200))
  }
  isStopping = true
  server.kill('SIGKILL')
  throw new Error(`The server did not come up:\n${said}`)
}
