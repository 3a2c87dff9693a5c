import { describe, expect, it, onTestFinished } from 'vitest'
import type { Db } from '@/db/client'
import { beds, mailLedger, mailSchedules, memberships, patients, people, stays } from '@/db/schema'
import { smtpTransport } from '@/lib/mail/transport'
import { deliverMail } from '@/lib/services/mail/deliver'
import { queueDueMail } from '@/lib/services/mail/queue-due'
import { HOUR_MS, localDay, MINUTE_MS, shiftDay, wallClockMs } from '@/lib/shared/time'
import { makeAdmitted, makeJobCtx, makePerson, makeWorld, NOW, TIME_ZONE, TODAY } from '@/tests/helpers/factories'
import { addPassedTrial, addScreen } from '@/tests/helpers/day'
import { startSmtpServer } from '@/tests/helpers/smtp'

function makeMailWorld() {
  const world = makeWorld()
  world.db.insert(mailSchedules).values({ unitId: world.medical.unit.id, morningDueMin: 300 }).run()
  return world
}
const rows = (db: Db) => db.select().from(mailLedger).all()
const kinds = (db: Db) => rows(db).map(({ kind, day }) => `${kind} ${day}`)
const queueAt = (db: Db, at: number) => queueDueMail(makeJobCtx(db, 'mail.queue-due', at)).queued
const at = (day: string, hours: number, minutes = 0) => wallClockMs(day, hours * 60 + minutes, TIME_ZONE)

describe('the morning list', () => {
  it('goes to the respiratory therapists at its local time, not a minute before, and once', () => {
    const { db, rt } = makeMailWorld()
    expect(queueAt(db, at(TODAY, 5) - MINUTE_MS)).toBe(0)
    expect(queueAt(db, at(TODAY, 5))).toBe(1)
    expect(rows(db)).toMatchObject([
      { kind: 'morning_due', day: TODAY, personId: rt.id, state: 'queued', subject: 'Medical ICU: 1 screen due, 3 Mar 2026' },
    ])
    expect(queueAt(db, at(TODAY, 5, 1))).toBe(0)
  })

  it('still goes when the server comes back inside the window, and not after it', () => {
    const { db } = makeMailWorld()
    expect(queueAt(db, at(TODAY, 8, 59))).toBe(1)
    const late = makeMailWorld()
    queueAt(late.db, at(TODAY, 9))
    expect(kinds(late.db)).not.toContain(`morning_due ${TODAY}`)
  })

  it('leaves out the beds that are already screened, and names a screen to complete', () => {
    const { db, medical, place, episode, rt } = makeMailWorld()
    const [, second] = medical.beds
    if (!second) throw new Error('no second bed')
    const other = makeAdmitted(db, { unit: medical.unit, bed: second, protocolVersionId: medical.protocolVersion.id, by: rt.id })
    addScreen(db, episode, place, { result: 'not_ready', observedAt: at(TODAY, 4, 30) })
    addScreen(db, other.episode, place, { result: 'incomplete', observedAt: at(TODAY, 4, 40) })
    queueAt(db, at(TODAY, 5))
    const [mail] = rows(db)
    expect(mail?.bodyText).toContain(`${second.label}: complete the screen`)
    expect(mail?.bodyText).not.toContain('M01')
  })

  it('says nothing when everybody is screened', () => {
    const { db, place, episode } = makeMailWorld()
    addScreen(db, episode, place, { result: 'not_ready', observedAt: at(TODAY, 4, 30) })
    expect(queueAt(db, at(TODAY, 5))).toBe(0)
  })

  it('does not go to someone who left the unit, was deactivated, or joined after it went', () => {
    const { db, hospital, medical, rt } = makeMailWorld()
    const gone = makePerson(db, hospital.id, [{ unitId: medical.unit.id, role: 'rt' }])
    db.update(people).set({ deactivatedAt: NOW }).run()
    expect(queueAt(db, at(TODAY, 5))).toBe(0)
    db.update(people).set({ deactivatedAt: null }).run()
    db.delete(memberships).run()
    db.insert(memberships)
      .values({ id: 'm1', personId: gone.id, unitId: medical.unit.id, role: 'rt', startedAt: 0, endedAt: NOW })
      .run()
    db.insert(memberships).values({ id: 'm2', personId: rt.id, unitId: medical.unit.id, role: 'rt', startedAt: 0 }).run()
    expect(queueAt(db, at(TODAY, 5))).toBe(1)
    makePerson(db, hospital.id, [{ unitId: medical.unit.id, role: 'rt' }])
    expect(queueAt(db, at(TODAY, 6))).toBe(0)
    expect(rows(db).map(({ personId }) => personId)).toEqual([rt.id])
  })

  it('stays away when it is switched off', () => {
    const { db } = makeMailWorld()
    db.update(mailSchedules).set({ morningDueMin: null, isWindowEndOn: false }).run()
    expect(queueAt(db, at(TODAY, 6)) + queueAt(db, at(TODAY, 10))).toBe(0)
  })
})

describe('the reminder at the end of the window', () => {
  it('goes to therapists and the unit lead when somebody is still unscreened at the close', () => {
    const { db, rt, lead } = makeMailWorld()
    queueAt(db, at(TODAY, 5))
    expect(queueAt(db, at(TODAY, 9))).toBe(2)
    expect(
      rows(db)
        .filter(({ kind }) => kind === 'window_end')
        .map(({ personId }) => personId)
        .sort(),
    ).toEqual([rt.id, lead.id].sort())
    expect(queueAt(db, at(TODAY, 9, 1))).toBe(0)
  })

  it('is let go when the server was down for three hours', () => {
    const { db } = makeMailWorld()
    expect(queueAt(db, at(TODAY, 12))).toBe(0)
    const other = makeMailWorld()
    expect(queueAt(other.db, at(TODAY, 11, 59))).toBe(2)
  })
})

describe('a decision owed', () => {
  it('goes once for a trial, to the physicians, when the passed trial has waited longer than the protocol allows', () => {
    const { db, physician, episode, place } = makeMailWorld()
    addScreen(db, episode, place, { result: 'ready', observedAt: at(TODAY, 5, 10) })
    addPassedTrial(db, episode, place, { startedAt: at(TODAY, 6), endedAt: at(TODAY, 6, 30) })
    expect(queueAt(db, at(TODAY, 7, 30))).toBe(0)
    expect(queueAt(db, at(TODAY, 7, 31))).toBe(1)
    expect(queueAt(db, at(TODAY, 7, 32))).toBe(0)
    expect(rows(db)).toMatchObject([{ kind: 'decision_owed', personId: physician.id }])
    expect(rows(db)[0]?.bodyText).toContain('passed at 06:30')
  })
})

describe('a simulated stretch of days with restarts', () => {
  it.each([
    ['the clocks go forward', '2026-03-07', 2],
    ['the clocks go back', '2026-10-31', 2],
  ])('sends each list exactly once a day when %s', (_, firstDay, days) => {
    const { db, episode } = makeMailWorld()
    // Half past two does not exist on the first of these days and comes twice on the other.
    db.update(mailSchedules).set({ morningDueMin: 150 }).run()
    const start = wallClockMs(firstDay, 0, TIME_ZONE)
    db.update(stays)
      .set({ startedAt: start - 48 * HOUR_MS })
      .run()
    db.$client.prepare('update episodes set started_at = ? where id = ?').run(start - 47 * HOUR_MS, episode.id)
    for (let minute = 0; minute < days * 24 * 60; minute += 5) {
      // The server is away for a while again and again.
      if (minute % 400 > 330) continue
      queueAt(db, start + minute * MINUTE_MS)
    }
    const expected = Array.from({ length: days }, (_unused, index) => shiftDay(localDay(start, TIME_ZONE), index))
    expect(kinds(db).filter((each) => each.startsWith('morning_due'))).toEqual(expected.map((day) => `morning_due ${day}`))
    expect(kinds(db).filter((each) => each.startsWith('window_end'))).toHaveLength(days * 2)
  })
})

describe('what a message holds', () => {
  it('names no patient, record number or birth date in any part or header, and its link leads to the unit', async () => {
    const { db, episode, place, medical } = makeMailWorld()
    db.update(patients)
      .set({ familyName: 'Zyxwvut', givenName: 'Qponml', recordNumber: 'RN-998877', birthDate: '1951-02-03' })
      .run()
    queueAt(db, at(TODAY, 5))
    queueAt(db, at(TODAY, 9))
    addScreen(db, episode, place, { result: 'ready', observedAt: at(TODAY, 9, 10) })
    addPassedTrial(db, episode, place, { startedAt: at(TODAY, 9, 20), endedAt: at(TODAY, 9, 50) })
    queueAt(db, at(TODAY, 11))
    const server = await startSmtpServer()
    const transport = smtpTransport(server.url)
    onTestFinished(() => transport.close())
    await deliverMail(makeJobCtx(db, 'mail.deliver', at(TODAY, 11)), transport, 'Daybreath <daybreath@hospital.invalid>', () =>
      at(TODAY, 11),
    )
    expect(
      new Set(server.received.map(({ mail }) => mail.subject?.split(':')[1]?.trim().split(' ').slice(0, 2).join(' '))),
    ).toEqual(new Set(['1 screen', '1 patient', 'decision owed,']))
    for (const { raw, mail } of server.received) {
      const everything = [raw, mail.text, mail.html, JSON.stringify([...mail.headers])].join('\n')
      for (const secret of ['Zyxwvut', 'Qponml', 'RN-998877', '1951', episode.id]) expect(everything).not.toContain(secret)
      expect(mail.text).toContain(`/units/${medical.unit.id}/today`)
      expect(mail.html).toContain(`/units/${medical.unit.id}/today`)
      expect(mail.text).toContain(db.select().from(beds).get()?.label)
    }
  })
})

it('refuses a person', () => {
  const { db, lead } = makeMailWorld()
  expect(() =>
    queueDueMail({
      ...makeJobCtx(db, 'x'),
      actor: {
        kind: 'person',
        personId: lead.id,
        sessionId: 's',
        hospitalId: lead.hospitalId,
        name: 'x',
        isAdministrator: false,
        memberships: [],
      },
    }),
  ).toThrow(expect.objectContaining({ code: 'FORBIDDEN' }))
})
