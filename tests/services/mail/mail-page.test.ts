import { describe, expect, it } from 'vitest'
import { mailLedger, mailSchedules } from '@/db/schema'
import { saveMailScheduleSchema } from '@/lib/schemas/mail'
import { windowEndMessage } from '@/lib/mail/templates'
import { queueMessage } from '@/lib/services/mail/queue-message'
import { readMail } from '@/lib/services/mail/read'
import { resendMail } from '@/lib/services/mail/resend'
import { saveMailSchedule } from '@/lib/services/mail/save-schedule'
import { wallClockMs } from '@/lib/shared/time'
import { auditRows, makeCtx, makeWorld, NOW, TIME_ZONE } from '@/tests/helpers/factories'

function makeMailWorld() {
  const world = makeWorld()
  const unitId = world.medical.unit.id
  world.db.insert(mailSchedules).values({ unitId, morningDueMin: 300 }).run()
  const message = windowEndMessage({
    unitName: 'Medical ICU',
    dayText: '3 Mar 2026',
    closedText: '09:00',
    beds: [],
    url: 'http://localhost/x',
  })
  queueMessage(
    world.db,
    {
      kind: 'window_end',
      unitId,
      day: '2026-03-02',
      occasion: '2026-03-02',
      personId: world.rt.id,
      recipient: 'rt@example.invalid',
      now: NOW,
    },
    message,
  )
  return { ...world, unitId }
}
const input = (unitId: string) => ({ unitId, version: 1, morningTime: '04:30', isWindowEndOn: false, isDecisionOwedOn: true })
const forbidden = expect.objectContaining({ code: 'FORBIDDEN' })
const notFound = expect.objectContaining({ code: 'NOT_FOUND' })

describe('reading the Mail page', () => {
  it('shows a clinician what went and what goes next, without addresses', () => {
    const { db, nurse, unitId } = makeMailWorld()
    const page = readMail(makeCtx(db, nurse), { unitId })
    expect(page).toMatchObject({
      isKeptAsFiles: true,
      maySchedule: false,
      entries: [{ state: 'queued', personName: 'Robin Therapist', recipient: null }],
    })
    // It is 08:00: today's morning list has passed, the window closes at nine.
    expect(page.upcoming).toEqual([
      { kind: 'window_end', atMs: wallClockMs('2026-03-03', 540, TIME_ZONE), toRoles: ['rt', 'unit_lead'], recipients: 2 },
      { kind: 'morning_due', atMs: wallClockMs('2026-03-04', 300, TIME_ZONE), toRoles: ['rt'], recipients: 1 },
    ])
  })

  it('shows the unit lead the addresses', () => {
    const { db, lead, unitId } = makeMailWorld()
    expect(readMail(makeCtx(db, lead), { unitId }).entries[0]?.recipient).toBe('rt@example.invalid')
  })

  it('is not found from another unit or by an administrator', () => {
    const { db, outsider, administrator, unitId } = makeMailWorld()
    expect(() => readMail(makeCtx(db, outsider), { unitId })).toThrow(notFound)
    expect(() => readMail(makeCtx(db, administrator), { unitId })).toThrow(notFound)
  })

  it('leaves out messages of other units and of accounts', () => {
    const { db, lead, unitId, surgical } = makeMailWorld()
    db.update(mailLedger).set({ unitId: surgical.unit.id }).run()
    expect(readMail(makeCtx(db, lead), { unitId }).entries).toEqual([])
    db.update(mailLedger).set({ unitId: null }).run()
    expect(readMail(makeCtx(db, lead), { unitId }).entries).toEqual([])
  })
})

describe('setting the schedule', () => {
  it('is saved by the unit lead, with an audit row', () => {
    const { db, lead, unitId } = makeMailWorld()
    expect(saveMailSchedule(makeCtx(db, lead), input(unitId))).toEqual({ version: 2 })
    expect(db.select().from(mailSchedules).get()).toMatchObject({
      morningDueMin: 270,
      isWindowEndOn: false,
      isDecisionOwedOn: true,
      version: 2,
    })
    expect(auditRows(db, 'mail.schedule')).toMatchObject([
      { unitId, actorId: lead.id, before: { morningDueMin: 300 }, after: { morningDueMin: 270 } },
    ])
  })

  it('is refused to the others, and the refusal is logged', () => {
    const { db, rt, nurse, physician, outsider, unitId } = makeMailWorld()
    for (const person of [rt, nurse, physician])
      expect(() => saveMailSchedule(makeCtx(db, person), input(unitId))).toThrow(forbidden)
    expect(() => saveMailSchedule(makeCtx(db, outsider), input(unitId))).toThrow(notFound)
    expect(auditRows(db, 'access.denied')).toHaveLength(4)
    expect(db.select().from(mailSchedules).get()?.version).toBe(1)
  })

  it('refuses a stale version, and a morning list after the window closed', () => {
    const { db, lead, unitId } = makeMailWorld()
    expect(() => saveMailSchedule(makeCtx(db, lead), { ...input(unitId), morningTime: '09:00' })).toThrow(
      expect.objectContaining({
        code: 'INVALID',
        fields: { morningTime: 'The screening window closes at 09:00. Give an earlier time.' },
      }),
    )
    saveMailSchedule(makeCtx(db, lead), input(unitId))
    expect(() => saveMailSchedule(makeCtx(db, lead), input(unitId))).toThrow(expect.objectContaining({ code: 'CONFLICT' }))
    expect(auditRows(db, 'mail.schedule')).toHaveLength(1)
  })

  it('changes nothing twice for the same key', () => {
    const { db, lead, unitId } = makeMailWorld()
    const ctx = makeCtx(db, lead, NOW, { idempotencyKey: 'same' })
    expect(saveMailSchedule(ctx, input(unitId))).toEqual(saveMailSchedule(ctx, input(unitId)))
    expect(auditRows(db, 'mail.schedule')).toHaveLength(1)
  })

  it('takes only a time of the 24-hour clock', () => {
    const parse = (morningTime: unknown) => saveMailScheduleSchema.safeParse({ ...input('u'), morningTime }).success
    expect([parse('05:00'), parse(null), parse('5'), parse('24:00'), parse('05:60'), parse(300)]).toEqual([
      true,
      true,
      false,
      false,
      false,
      false,
    ])
  })
})

describe('sending again', () => {
  it('queues a failed or unconfirmed message under its first Message-ID, for the unit lead', () => {
    const { db, lead, unitId } = makeMailWorld()
    for (const state of ['failed', 'unconfirmed'] as const) {
      db.update(mailLedger).set({ state, attempts: 5 }).run()
      const before = db.select().from(mailLedger).get()
      resendMail(makeCtx(db, lead), { unitId, mailId: before?.id ?? '' })
      expect(db.select().from(mailLedger).get()).toMatchObject({ state: 'queued', attempts: 0, messageId: before?.messageId })
    }
    expect(auditRows(db, 'mail.resend')).toHaveLength(2)
  })

  it('refuses what was sent, other roles, and a message of another unit', () => {
    const { db, lead, rt, unitId, surgical } = makeMailWorld()
    const mailId = db.select().from(mailLedger).get()?.id ?? ''
    expect(() => resendMail(makeCtx(db, lead), { unitId, mailId })).toThrow(expect.objectContaining({ code: 'PRECONDITION' }))
    expect(() => resendMail(makeCtx(db, rt), { unitId, mailId })).toThrow(forbidden)
    db.update(mailLedger).set({ state: 'failed', unitId: surgical.unit.id }).run()
    expect(() => resendMail(makeCtx(db, lead), { unitId, mailId })).toThrow(notFound)
    expect(auditRows(db, 'mail.resend')).toHaveLength(0)
  })
})
