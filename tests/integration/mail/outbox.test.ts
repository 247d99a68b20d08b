import { SMTPServer } from 'smtp-server'
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest'
import { writeTransaction } from '#server/database/database'
import { OutboxMail } from '#server/database/models/OutboxMail'
import { PersonToken } from '#server/database/models/PersonToken'
import { deliverOutbox } from '#server/mail/deliverOutbox'
import { queueMail } from '#server/mail/queueMail'
import { setPassword } from '#server/services/passwords/setPassword'
import { invitePerson } from '#server/services/people/invitePerson'
import { requestReset } from '#server/services/passwords/requestReset'
import { buildPerson } from '../../factories/buildPerson'
import { contextOf } from '../../factories/contextOf'
import { openTestDatabase } from '../../factories/openTestDatabase'

interface Received { from: string, to: string[], text: string }

let close: () => Promise<void>
let mailServer: SMTPServer | undefined
const received: Received[] = []
beforeAll(async () => {
  close = (await openTestDatabase()).close
})
afterEach(async () => {
  delete process.env.WIDEBERTH_SMTP_URL
  await new Promise<void>(resolve => mailServer ? mailServer.close(resolve) : resolve())
  mailServer = undefined
  received.length = 0
  await OutboxMail.destroy({ where: {} })
})
afterAll(() => close())

/** A mail server on this machine; `refuse` makes it turn every mail away. */
async function startMailServer(refuse = false): Promise<void> {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['STARTTLS'],
    onData(stream, session, done) {
      let text = ''
      stream.on('data', (chunk: Buffer) => text += chunk.toString())
      stream.on('end', () => {
        if (refuse) return done(new Error('mailbox full'))
        const { mailFrom, rcptTo } = session.envelope
        received.push({ from: mailFrom === false ? '' : mailFrom.address, to: rcptTo.map(recipient => recipient.address), text })
        done()
      })
    },
  })
  mailServer = server
  const port = await new Promise<number>(resolve => server.listen(0, '127.0.0.1', () => resolve((server.server.address() as { port: number }).port)))
  process.env.WIDEBERTH_SMTP_URL = `smtp://127.0.0.1:${port}`
}

const clock = () => new Date('2026-12-01T10:00:00Z')
/** Mails go out after the commit; a round of delivery waits for the one that runs. */
const settled = () => deliverOutbox(clock)

describe('the outbox', () => {
  it('keeps mails to be read where no mail server is set', async () => {
    const administrator = await buildPerson({ isAdministrator: true })
    await invitePerson({ name: 'Dee', email: 'dee@example.org', isAdministrator: false }, contextOf(administrator))
    await settled()
    expect(await OutboxMail.findAll()).toMatchObject([{ toName: 'Dee', toAddress: 'dee@example.org', sentAt: null, attempts: 0, error: null }])
  })

  it('sends them after the commit, to just one recipient, and strikes the link from what it keeps', async () => {
    await startMailServer()
    const administrator = await buildPerson({ isAdministrator: true })
    await invitePerson({ name: 'Häberle, Fay', email: 'fay@example.org', isAdministrator: false }, contextOf(administrator, '2026-12-01T10:00:00Z'))
    await settled()
    expect(received).toHaveLength(1)
    expect(received[0]?.to).toEqual(['fay@example.org'])
    const decoded = (received[0]?.text ?? '').replace(/=\r\n/g, '').replace(/=3D/g, '=')
    const token = /password\?token=([\w-]{43})/.exec(decoded)?.[1] as string
    const [kept] = await OutboxMail.findAll()
    expect(kept).toMatchObject({ sentAt: '2026-12-01T10:00:00.000Z', attempts: 1 })
    expect(kept?.text).not.toContain(token)
    expect(kept?.text).toContain('password?token=(sent)')
    await setPassword({ token, password: 'a brand new password' }, contextOf(administrator, '2026-12-02T10:00:00Z'))
  })

  it('sends nothing of a change that was undone', async () => {
    await startMailServer()
    const administrator = await buildPerson()
    await expect(writeTransaction(async () => {
      await queueMail({ name: 'Gus', email: 'gus@example.org' }, { subject: 'x', text: 'y' }, contextOf(administrator))
      throw new Error('cut')
    })).rejects.toThrow('cut')
    await settled()
    expect(received).toEqual([])
    expect(await OutboxMail.count()).toBe(0)
  })

  it('keeps what the server will not take, with its words, and sends it in a later round', async () => {
    await startMailServer(true)
    const person = await buildPerson()
    await requestReset(person.email, '192.0.2.1', contextOf(person, '2026-12-01T10:00:00Z'))
    await settled()
    const [kept] = await OutboxMail.findAll()
    expect(kept?.sentAt).toBeNull()
    expect(kept?.error).toContain('mailbox full')
    await new Promise<void>(resolve => mailServer?.close(resolve))
    await startMailServer()
    await settled()
    expect(received.map(mail => mail.to)).toEqual([[person.email]])
    expect((await OutboxMail.findAll())[0]).toMatchObject({ error: null, sentAt: '2026-12-01T10:00:00.000Z' })
  })

  it.each(['a@example.org\r\nBcc: eve@example.org', 'a@example.org, eve@example.org', '<a@example.org>', 'a b@example.org'])('refuses the address %j', async (email) => {
    await expect(writeTransaction(() => queueMail({ name: 'A', email }, { subject: 'x', text: 'y' }, { actor: null, clock }))).rejects.toThrow('e-mail address')
  })
})

describe('a link', () => {
  const linkOf = async (email: string) => /token=([\w-]+)/.exec((await OutboxMail.findOne({ where: { toAddress: email }, order: [['id', 'DESC']] }))?.text ?? '')?.[1] as string

  it('to reset a password is good for an hour, an invitation for seven days', async () => {
    const person = await buildPerson()
    await requestReset(person.email, '192.0.2.2', contextOf(person, '2026-12-01T10:00:00Z'))
    const reset = await linkOf(person.email)
    await expect(setPassword({ token: reset, password: 'a brand new password' }, contextOf(person, '2026-12-01T11:00:00Z'))).rejects.toMatchObject({ code: 'gone' })
    await setPassword({ token: reset, password: 'a brand new password' }, contextOf(person, '2026-12-01T10:59:59Z'))
    await invitePerson({ name: 'Hal', email: 'hal@example.org', isAdministrator: false }, contextOf(person, '2026-12-01T10:00:00Z'))
    const invitation = await linkOf('hal@example.org')
    await expect(setPassword({ token: invitation, password: 'a brand new password' }, contextOf(person, '2026-12-08T10:00:00Z'))).rejects.toMatchObject({ code: 'gone' })
    await setPassword({ token: invitation, password: 'a brand new password' }, contextOf(person, '2026-12-08T09:59:59Z'))
  })

  it('used twice at once sets one password', async () => {
    const person = await buildPerson()
    await requestReset(person.email, '192.0.2.3', contextOf(person, '2026-12-01T10:00:00Z'))
    const token = await linkOf(person.email)
    const context = contextOf(person, '2026-12-01T10:01:00Z')
    const outcomes = await Promise.allSettled([setPassword({ token, password: 'first new password' }, context), setPassword({ token, password: 'other new password' }, context)])
    expect(outcomes.map(outcome => outcome.status).sort()).toEqual(['fulfilled', 'rejected'])
  })

  it('is stored as a hash only', async () => {
    const person = await buildPerson()
    await requestReset(person.email, '192.0.2.4', contextOf(person))
    const token = await linkOf(person.email)
    const rows = await PersonToken.findAll({ where: { personId: person.id } })
    expect(JSON.stringify(rows)).not.toContain(token)
  })
})
