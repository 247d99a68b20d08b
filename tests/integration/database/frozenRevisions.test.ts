import { createHash } from 'node:crypto'
import { DatabaseError, UniqueConstraintError } from 'sequelize'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { database } from '#server/database/database'
import { openTestDatabase } from '../../factories/openTestDatabase'

/** Raw SQL throughout: the database itself refuses, whoever asks. */
let close: () => Promise<void>
/** Throws what SQLite said: Sequelize calls every refusal of a trigger a validation error. */
const sql = (statement: string, replacements: unknown[] = []) => database().query(statement, { replacements }).catch((error: unknown) => {
  throw error instanceof DatabaseError || error instanceof UniqueConstraintError ? error.parent : error
})
const now = '2026-12-01T12:00:00.000Z'

beforeAll(async () => {
  close = (await openTestDatabase()).close
  await sql('INSERT INTO people (id, email, name, created_at) VALUES (1, \'ada@example.org\', \'Ada\', ?), (2, \'bo@example.org\', \'Bo\', ?)', [now, now])
  await sql('INSERT INTO systems (id, name, customer, document_number, frequency_unit, description, version, created_at) VALUES (1, \'S\', \'C\', \'D\', \'Hz\', \'\', 1, ?)', [now])
  await sql('INSERT INTO reports (id, system_id, title, document_number, loop_ids, condition_ids, remarks, loop_remarks, version, created_at) VALUES (1, 1, \'R\', \'D\', \'[]\', \'[]\', \'\', \'{}\', 1, ?)', [now])
})
afterAll(() => close())

let nextId = 1
async function insertDraft(letter: string, draftNumber: number): Promise<number> {
  const id = nextId++
  await sql(`INSERT INTO revisions (id, report_id, letter, draft_number, state, change_note, snapshot, snapshot_sha256, frozen_by, frozen_by_name, frozen_at)
    VALUES (?, 1, ?, ?, 'draft', 'first', '{}', 'hash', 1, 'Ada', ?)`, [id, letter, draftNumber, now])
  return id
}
const issue = (id: number) => sql('UPDATE revisions SET state = \'issued\', issued_by = 2, issued_by_name = \'Bo\', issued_at = ? WHERE id = ?', [now, id])

describe('a frozen revision', () => {
  it('cannot begin as issued', async () => {
    await expect(sql(`INSERT INTO revisions (report_id, letter, draft_number, state, change_note, snapshot, snapshot_sha256, frozen_by, frozen_by_name, frozen_at)
      VALUES (1, 'W', 1, 'issued', '', '{}', 'h', 1, 'Ada', ?)`, [now])).rejects.toThrow('a revision begins as a draft')
  })

  it.each(['snapshot = \'{"a":1}\'', 'snapshot_sha256 = \'x\'', 'letter = \'B\'', 'draft_number = 9', 'change_note = \'other\'', 'frozen_by = 2', 'frozen_by_name = \'Eve\'', 'frozen_at = \'2027\'', 'report_id = 2', 'id = 4711'])(
    'refuses a change of %s', async (change) => {
      const id = await insertDraft('D', nextId)
      await expect(sql(`UPDATE revisions SET ${change} WHERE id = ${id}`)).rejects.toThrow('a frozen revision never changes')
    })

  it('is never deleted, nor replaced by an insert that would', async () => {
    const id = await insertDraft('E', 1)
    await expect(sql(`DELETE FROM revisions WHERE id = ${id}`)).rejects.toThrow('a frozen revision is never deleted')
    await expect(sql(`INSERT OR REPLACE INTO revisions SELECT id, report_id, letter, draft_number, state, change_note, 'forged', snapshot_sha256, frozen_by, frozen_by_name, frozen_at, NULL, NULL, NULL FROM revisions WHERE id = ${id}`))
      .rejects.toThrow('a frozen revision is never replaced')
  })

  it('goes from draft to issued to superseded, and nowhere else', async () => {
    const id = await insertDraft('A', 1)
    await expect(sql(`UPDATE revisions SET state = 'superseded' WHERE id = ${id}`)).rejects.toThrow('a revision goes from draft to issued')
    await expect(sql(`UPDATE revisions SET state = 'issued' WHERE id = ${id}`)).rejects.toThrow('a revision goes from draft to issued')
    await expect(sql(`UPDATE revisions SET issued_by_name = 'Bo' WHERE id = ${id}`)).rejects.toThrow('is set once, with its issue')
    await issue(id)
    await expect(sql(`UPDATE revisions SET state = 'draft' WHERE id = ${id}`)).rejects.toThrow('a revision goes from draft to issued')
    await expect(sql(`UPDATE revisions SET issued_at = '2027' WHERE id = ${id}`)).rejects.toThrow('is set once, with its issue')
    await expect(sql(`UPDATE revisions SET state = 'superseded', issued_by_name = 'Eve' WHERE id = ${id}`)).rejects.toThrow('is set once, with its issue')
    await sql(`UPDATE revisions SET state = 'superseded' WHERE id = ${id}`)
    await expect(sql(`UPDATE revisions SET state = 'issued' WHERE id = ${id}`)).rejects.toThrow('a revision goes from draft to issued')
  })

  it('holds its letter alone once issued, and is the only valid one of its report', async () => {
    const [first, second, other] = [await insertDraft('F', 1), await insertDraft('F', 2), await insertDraft('G', 1)]
    await issue(first)
    await expect(issue(second)).rejects.toThrow('UNIQUE')
    await expect(issue(other)).rejects.toThrow('UNIQUE')
    await sql(`UPDATE revisions SET state = 'superseded' WHERE id = ${first}`)
    await expect(issue(second)).rejects.toThrow('UNIQUE')
    await issue(other)
    await sql(`UPDATE revisions SET state = 'withdrawn' WHERE id = ${other}`)
  })
})

describe('an artefact of a revision', () => {
  const bytes = Buffer.from('%PDF of a draft')
  const sha256 = createHash('sha256').update(bytes).digest('hex')
  let revision = 0
  beforeAll(async () => {
    revision = await insertDraft('H', 1)
    await sql('INSERT INTO artefact_blobs (sha256, bytes) VALUES (?, ?)', [sha256, bytes])
    await sql('INSERT INTO artefacts (revision_id, edition, kind, file_name, media_type, size, sha256) VALUES (?, \'draft\', \'pdf\', \'r.pdf\', \'application/pdf\', 15, ?)', [revision, sha256])
  })

  it('keeps its bytes: no update, no delete, no replacement', async () => {
    await expect(sql('UPDATE artefact_blobs SET bytes = x\'00\'')).rejects.toThrow('stored bytes never change')
    await expect(sql('DELETE FROM artefact_blobs')).rejects.toThrow('stored bytes are never deleted')
    await expect(sql('INSERT OR REPLACE INTO artefact_blobs (sha256, bytes) VALUES (?, x\'00\')', [sha256])).rejects.toThrow('stored bytes are never replaced')
  })

  it('may have its bytes stored again by another artefact without a change', async () => {
    await sql('INSERT OR REPLACE INTO artefact_blobs (sha256, bytes) VALUES (?, ?)', [sha256, bytes])
    const [rows] = await sql('SELECT bytes FROM artefact_blobs')
    expect((rows as { bytes: Buffer }[]).map(row => row.bytes.toString())).toEqual(['%PDF of a draft'])
  })

  it('keeps its row', async () => {
    await expect(sql('UPDATE artefacts SET file_name = \'other.pdf\'')).rejects.toThrow('an artefact of a revision never changes')
    await expect(sql('DELETE FROM artefacts')).rejects.toThrow('an artefact of a revision is never deleted')
    await expect(sql('INSERT OR REPLACE INTO artefacts (revision_id, edition, kind, file_name, media_type, size, sha256) VALUES (?, \'draft\', \'pdf\', \'x\', \'y\', 1, ?)', [revision, sha256]))
      .rejects.toThrow('an artefact of a revision is never replaced')
  })
})

describe('the audit', () => {
  it('is only added to', async () => {
    await sql('INSERT INTO audit_events (at, event, person_name, payload) VALUES (?, \'signed in\', \'Ada\', \'{}\')', [now])
    await expect(sql('UPDATE audit_events SET person_name = \'Bo\'')).rejects.toThrow('the audit is only added to')
    await expect(sql('DELETE FROM audit_events')).rejects.toThrow('the audit is only added to')
    await expect(sql('INSERT OR REPLACE INTO audit_events SELECT id, at, event, person_id, \'Bo\', system_id, subject_id, payload FROM audit_events')).rejects.toThrow('the audit is only added to')
  })
})
