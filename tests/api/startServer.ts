import { spawn, type ChildProcess } from 'node:child_process'
import { mkdtemp, rm } from 'node:fs/promises'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { inject } from 'vitest'
import { closeDatabase, openDatabase } from '#server/database/database'
import { migrateDatabase } from '#server/database/migrateDatabase'
import { migrations } from '#server/database/migrations/migrations'
import { freePort } from '../factories/freePort'
import { ApiCaller } from './ApiCaller'

export interface TestServer {
  url: string
  /** the folder of its data */
  folder: string
  /** a caller who has not signed in */
  stranger: () => ApiCaller
  /** a caller signed in with this address and the password of all test people */
  signedIn: (email: string) => Promise<ApiCaller>
  stop: () => Promise<void>
  /** Ends the server as a power cut would, and starts it again on the same data. */
  killAndRestart: () => Promise<void>
  /** all that the server has written to its log */
  log: () => string
}

export interface ServerOptions<Seed> {
  /** Fills the database through services before the server opens it. */
  seed?: () => Promise<Seed>
  environment?: Record<string, string>
}

const ended = (child: ChildProcess) => new Promise<void>((resolve) => {
  if (child.exitCode !== null || child.signalCode !== null) resolve()
  else child.once('exit', () => resolve())
})

/** The built server on a port and a data folder of its own. */
export async function startServer<Seed = undefined>(options: ServerOptions<Seed> = {}): Promise<TestServer & { seeded: Seed }> {
  const folder = await mkdtemp(join(tmpdir(), 'wideberth-api-'))
  const file = join(folder, 'wideberth.sqlite')
  let seeded = undefined as Seed
  if (options.seed) {
    await migrateDatabase(file, migrations)
    openDatabase(file)
    try {
      seeded = await options.seed()
    }
    finally {
      await closeDatabase()
    }
  }
  const port = await freePort()
  const url = `http://localhost:${port}`
  let output = ''
  const start = async () => {
    const child = spawn(process.execPath, [inject('serverEntry')], {
      env: { ...process.env, NODE_ENV: 'production', PORT: String(port), WIDEBERTH_DATA: folder, WIDEBERTH_URL: url, WIDEBERTH_SMTP_URL: '', UV_THREADPOOL_SIZE: '16', ...options.environment },
      stdio: ['ignore', 'pipe', 'pipe'],
    })
    child.stdout.on('data', (chunk: Buffer) => output += chunk.toString())
    child.stderr.on('data', (chunk: Buffer) => output += chunk.toString())
    const deadline = Date.now() + 60_000
    while (!await fetch(`${url}/api/health`).then(reply => reply.ok, () => false)) {
      if (child.exitCode !== null || Date.now() > deadline) {
        child.kill('SIGKILL')
        throw new Error(`The server did not start:\n${output}`)
      }
      await new Promise(resolve => setTimeout(resolve, 100))
    }
    return child
  }
  const end = async (signal: 'SIGTERM' | 'SIGKILL') => {
    child.kill(signal)
    const timer = setTimeout(() => child.kill('SIGKILL'), 10_000)
    await ended(child)
    clearTimeout(timer)
  }
  let child = await start()
  const stranger = () => new ApiCaller(url)
  return {
    url,
    folder,
    seeded,
    stranger,
    signedIn: async (email) => {
      const caller = stranger()
      await caller.signIn(email)
      return caller
    },
    stop: async () => {
      await end('SIGTERM')
      await rm(folder, { recursive: true, force: true })
    },
    killAndRestart: async () => {
      await end('SIGKILL')
      child = await start()
    },
    log: () => output,
  }
}
