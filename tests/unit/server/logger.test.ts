import { PassThrough } from 'node:stream'
import { describe, expect, it } from 'vitest'
import { DatabaseError } from 'sequelize'
import { createLogger } from '#server/log/createLogger'

describe('the log', () => {
  it('says what a failing statement was told by the database, and nothing of the values in it', () => {
    const out = new PassThrough()
    const parent = Object.assign(new Error('SQLITE_FULL: database or disk is full'), {
      sql: 'INSERT INTO `outbox_mails` (`text`) VALUES (\'https://x/password?token=SECRET\')', parameters: { $1: 'SECRET' },
    })
    createLogger(out).error({ err: Object.assign(new DatabaseError(parent), { errors: [{ value: 'SECRET' }] }) }, 'A request failed.')
    const line = String(out.read())
    expect(line).not.toContain('SECRET')
    expect(JSON.parse(line)).toMatchObject({ msg: 'A request failed.', err: { name: 'SequelizeDatabaseError', message: 'SQLITE_FULL: database or disk is full' } })
    expect(line).toContain('logger.test.ts')
  })

  it('says what lay under a failure, too', () => {
    const out = new PassThrough()
    createLogger(out).error({ err: new Error('outer', { cause: new Error('inner') }) }, 'x')
    expect(String(out.read())).toContain('inner')
  })
})
