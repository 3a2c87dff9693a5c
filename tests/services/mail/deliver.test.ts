import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { simpleParser } from 'mailparser'
import { describe, expect, it, onTestFinished } from 'vitest'
import type { Db } from '@/db/client'
import { mailLedger } from '@/db/schema'
import { fileTransport, smtpTransport, type MailTransport } from '@/lib/mail/transport'
import { windowEndMessage } from '@/lib/mail/templates'
import { deliverMail, STALE_CLAIM_MS } from '@/lib/services/mail/deliver'
import { queueAccountMail } from '@/lib/services/mail/queue-account-mail'
import { queueMessage } from '@/lib/services/mail/queue-message'
import { MINUTE_MS } from '@/lib/shared/time'
import { makeTestFolder, openTestDatabaseFile } from '@/tests/helpers/database'
import { makeCtx, makeJobCtx, makeWorld, NOW } from '@/tests/helpers/factories'
import { startSmtpServer } from '@/tests/helpers/smtp'

const FROM = 'Daybreath <daybreath@hospital.invalid>'
const message = windowEndMessage({
  unitName: 'Medical ICU',
  dayText: '3 Mar 2026',
  closedText: '09:00',
  beds: [{ bedLabel: 'M01', what: 'screen' }],
  url: 'http://localhost:3000/units/u1/today',
})

function queue(db: Db, unitId: string, recipient = 'rt@example.invalid', day = '2026-03-03'): boolean {
  return queueMessage(db, { kind: 'window_end', unitId, day, occasion: day, personId: null, recipient, now: NOW }, message)
}
const rows = (db: Db) => db.select().from(mailLedger).all()
const run = (db: Db, transport: MailTransport, now = NOW) =>
  deliverMail(makeJobCtx(db, 'mail.deliver', now), transport, FROM, () => now)

function smtp(url: string): MailTransport {
  const transport = smtpTransport(url)
  onTestFinished(() => transport.close())
  return transport
}

describe('delivery over real SMTP', () => {
  it('sends a queued message once, as text and HTML, and confirms it', async () => {
    const { db, medical } = makeWorld()
    const server = await startSmtpServer()
    expect(queue(db, medical.unit.id)).toBe(true)
    expect(await run(db, smtp(server.url))).toEqual({ sent: 1, kept: 0, failed: 0 })
    expect(await run(db, smtp(server.url))).toEqual({ sent: 0, kept: 0, failed: 0 })
    expect(server.received).toHaveLength(1)
    const [only] = server.received
    expect(only?.to).toEqual(['rt@example.invalid'])
    expect(only?.mail.text).toContain('M01: screen')
    expect(only?.mail.html).toContain('href="http://localhost:3000/units/u1/today"')
    expect(only?.mail.messageId).toBe(rows(db)[0]?.messageId)
    expect(rows(db)[0]).toMatchObject({ state: 'sent', attempts: 1, sentAt: NOW, lastError: null })
  })

  it('queues the same unit, day, kind and recipient only once, whatever the case of the address', () => {
    const { db, medical, surgical } = makeWorld()
    expect(queue(db, medical.unit.id)).toBe(true)
    expect(queue(db, medical.unit.id, 'RT@example.invalid')).toBe(false)
    expect(queue(db, medical.unit.id, 'lead@example.invalid')).toBe(true)
    expect(queue(db, medical.unit.id, 'rt@example.invalid', '2026-03-04')).toBe(true)
    expect(queue(db, surgical.unit.id)).toBe(true)
    expect(rows(db)).toHaveLength(4)
  })

  it('tries again after growing pauses when the server says later, under the same Message-ID', async () => {
    const { db, medical } = makeWorld()
    const server = await startSmtpServer()
    const transport = smtp(server.url)
    queue(db, medical.unit.id)
    server.behave({ refuse: 451 })
    await run(db, transport)
    expect(rows(db)[0]).toMatchObject({
      state: 'queued',
      attempts: 1,
      nextAttemptAt: NOW + MINUTE_MS,
      lastError: 'The mail server answered 451.',
    })
    expect(await run(db, transport, NOW + MINUTE_MS - 1)).toEqual({ sent: 0, kept: 0, failed: 0 })
    await run(db, transport, NOW + MINUTE_MS)
    expect(rows(db)[0]).toMatchObject({ state: 'queued', attempts: 2, nextAttemptAt: NOW + 6 * MINUTE_MS })
    server.behave('accept')
    await run(db, transport, NOW + 6 * MINUTE_MS)
    expect(rows(db)[0]).toMatchObject({ state: 'sent', attempts: 3 })
    expect(server.received.map(({ mail }) => mail.messageId)).toEqual([rows(db)[0]?.messageId])
  })

  it('gives up after five attempts', async () => {
    const { db, medical } = makeWorld()
    const server = await startSmtpServer()
    const transport = smtp(server.url)
    queue(db, medical.unit.id)
    server.behave({ refuse: 451 })
    for (const minutes of [0, 1, 6, 21, 81]) await run(db, transport, NOW + minutes * MINUTE_MS)
    expect(rows(db)[0]).toMatchObject({ state: 'failed', attempts: 5 })
  })

  it('fails at once when the server refuses for good, and goes on with the next message', async () => {
    const { db, medical } = makeWorld()
    const server = await startSmtpServer()
    const transport = smtp(server.url)
    queue(db, medical.unit.id)
    server.behave({ refuse: 550 })
    await run(db, transport)
    expect(rows(db)[0]).toMatchObject({ state: 'failed', attempts: 1, lastError: 'The mail server answered 550.' })
    server.behave('accept')
    queue(db, medical.unit.id, 'other@example.invalid')
    expect(await run(db, transport)).toEqual({ sent: 1, kept: 0, failed: 0 })
  })

  it('waits and tries again when there is no server at all', async () => {
    const { db, medical } = makeWorld()
    queue(db, medical.unit.id)
    await run(db, smtp('smtp://127.0.0.1:1'))
    expect(rows(db)[0]).toMatchObject({ state: 'queued', attempts: 1, lastError: 'No answer from the mail server (ESOCKET).' })
  })

  it('does not send again what a dead process had claimed; it is shown as unconfirmed', async () => {
    const { db, medical } = makeWorld()
    const server = await startSmtpServer()
    queue(db, medical.unit.id)
    db.update(mailLedger).set({ state: 'sending', claimedAt: NOW, attempts: 1 }).run()
    const transport = smtp(server.url)
    await run(db, transport, NOW + STALE_CLAIM_MS)
    expect(rows(db)[0]?.state).toBe('sending')
    await run(db, transport, NOW + STALE_CLAIM_MS + 1)
    expect(rows(db)[0]?.state).toBe('unconfirmed')
    expect(server.received).toHaveLength(0)
  })

  it('sends once when two connections deliver at the same time', async () => {
    const file = join(makeTestFolder(), 'two.db')
    const first = openTestDatabaseFile(file)
    const { medical } = makeWorld(first)
    const second = openTestDatabaseFile(file)
    onTestFinished(() => {
      first.$client.close()
      second.$client.close()
    })
    const server = await startSmtpServer()
    for (let index = 0; index < 20; index += 1) queue(first, medical.unit.id, `rt${index}@example.invalid`)
    await Promise.all([run(first, smtp(server.url)), run(second, smtp(server.url))])
    expect(server.received.map(({ to }) => to[0]).sort()).toEqual(
      Array.from({ length: 20 }, (_, index) => `rt${index}@example.invalid`).sort(),
    )
  })

  it('refuses a person', async () => {
    const { db, lead } = makeWorld()
    await expect(deliverMail(makeCtx(db, lead), fileTransport('/nowhere'), FROM)).rejects.toMatchObject({ code: 'FORBIDDEN' })
  })
})

describe('delivery without a mail server', () => {
  it('keeps the message as a file that a mail program reads, and says kept, not sent', async () => {
    const { db, medical } = makeWorld()
    const folder = makeTestFolder()
    queue(db, medical.unit.id)
    expect(await run(db, fileTransport(folder))).toEqual({ sent: 0, kept: 1, failed: 0 })
    const files = readdirSync(folder)
    expect(files).toHaveLength(1)
    const parsed = await simpleParser(readFileSync(join(folder, files[0] ?? ''), 'utf8'))
    expect(parsed.subject).toBe(message.subject)
    expect(rows(db)[0]?.state).toBe('kept')
  })

  it('takes a one-time link out of the ledger once its mail has left', async () => {
    const { db, rt } = makeWorld()
    const folder = makeTestFolder()
    const link = 'http://localhost:3000/accept?token=secret-token'
    queueAccountMail(db, { kind: 'invitation', personId: rt.id, recipient: 'rt@example.invalid', link, now: NOW })
    expect(rows(db)[0]?.bodyText).toContain(link)
    await run(db, fileTransport(folder))
    expect(JSON.stringify(rows(db))).not.toContain('secret-token')
    expect(readFileSync(join(folder, readdirSync(folder)[0] ?? ''), 'utf8')).toContain('secret-token')
  })
})
