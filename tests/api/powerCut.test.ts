import { join } from 'node:path'
import { QueryTypes } from 'sequelize'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Loop } from '#shared/types/system'
import { closeDatabase, openDatabase } from '#server/database/database'
import { seedTeam, teamEmails, type SeededTeam } from '../factories/seedTeam'
import { startServer, type TestServer } from './startServer'

let server: TestServer & { seeded: SeededTeam }
beforeAll(async () => {
  server = await startServer({ seed: seedTeam })
})
afterAll(() => server.stop())

describe('a server that is killed while people write', () => {
  it('comes back with every change it has confirmed, a whole database, and everybody still signed in', async () => {
    const engineer = await server.signedIn(teamEmails.engineer)
    const path = `/api/systems/${server.seeded.system.id}/loops`
    const confirmed: string[] = []
    for (let round = 0; round < 3; round++) {
      let isUp = true
      const writing = Array.from({ length: 8 }, async (_, writer) => {
        for (let count = 0; isUp; count++) {
          const code = `R${round}-${writer}-${count}`
          const reply = await engineer.post<Loop>(path, { code, name: code }).catch(() => null)
          if (reply?.status === 201) confirmed.push(code)
          if (reply === null) return
        }
      })
      await new Promise(resolve => setTimeout(resolve, 700))
      const restarted = server.killAndRestart()
      isUp = false
      await Promise.all([...writing, restarted])
    }
    expect(confirmed.length).toBeGreaterThan(0)
    const { status, body } = await engineer.get<{ loops: Loop[] }>(`/api/systems/${server.seeded.system.id}`)
    expect(status).toBe(200)
    const stored = new Set(body.loops.map(loop => loop.code))
    expect(confirmed.filter(code => !stored.has(code))).toEqual([])
    const database = openDatabase(join(server.folder, 'wideberth.sqlite'))
    try {
      expect(await database.query('PRAGMA integrity_check', { type: QueryTypes.SELECT })).toEqual([{ integrity_check: 'ok' }])
      expect(await database.query('PRAGMA foreign_key_check', { type: QueryTypes.SELECT })).toEqual([])
      // each loop with its line in the audit, and no line without its loop: both were written or neither
      const [row] = await database.query<{ unpaired: number }>(`
        SELECT (SELECT COUNT(*) FROM loops) - (SELECT COUNT(*) FROM audit_events WHERE event = 'loop created') AS unpaired`, { type: QueryTypes.SELECT })
      expect(row?.unpaired).toBe(0)
    }
    finally {
      await closeDatabase()
    }
  })
})
