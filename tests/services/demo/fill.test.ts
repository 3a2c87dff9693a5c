import { verifyPassword } from 'better-auth/crypto'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Db } from '@/db/client'
import { account, auditLog, decisions, hospitals, screens, trialEnds, units, user } from '@/db/schema'
import { demoTimeZone, makeCalendar } from '@/lib/demo/calendar'
import { DEMO_UNITS, generateDemo } from '@/lib/demo/generate'
import type { TodayDto } from '@/lib/schemas/today'
import type { Ctx } from '@/lib/server/ctx'
import { verifyAuditLog } from '@/lib/server/verify-audit'
import { fillDemo, type FilledDemo } from '@/lib/services/demo/fill'
import { makeDemoPassword } from '@/lib/services/demo/make-password'
import { readReview } from '@/lib/services/review/read'
import { listToday } from '@/lib/services/today/list'
import { contentHash } from '@/lib/services/decisions/content-hash'
import { newId } from '@/lib/shared/ids'
import { localDay } from '@/lib/shared/time'
import { openTestDatabase } from '../../helpers/database'
import { makeCtx, makeJobCtx, makeWorld } from '../../helpers/factories'

const NOW = Date.UTC(2026, 10, 17, 21, 40)
const PASSWORD = 'cedar-lantern-otter-42'
const SHORT = { nowMs: NOW, timeZone: demoTimeZone(NOW), historyDays: 60, units: DEMO_UNITS }
const asJob = (db: Db): Ctx => makeJobCtx(db, 'demo.fill', NOW)

describe('filling the demo', () => {
  let db: Db
  let filled: FilledDemo
  let today: Map<string, TodayDto>
  beforeAll(async () => {
    db = openTestDatabase()
    filled = await fillDemo(asJob(db), { password: PASSWORD, historyDays: 60 })
    today = new Map(
      db
        .select()
        .from(units)
        .all()
        .map(({ id, name }) => [name, listToday(asJob(db), { unitId: id })]),
    )
  })
  const unitToday = (name: string): TodayDto => {
    const found = today.get(name)
    if (!found) throw new Error(`${name} is not there.`)
    return found
  }
  const stateOf = (name: string, bed: string): string => {
    const row = unitToday(name).rows.find(({ bedLabel }) => bedLabel === bed)
    if (!row) return 'no row'
    const { move } = row
    return move.kind === 'move' ? `${move.role} ${move.step}${move.isOverdue ? ' overdue' : ''}` : move.reason.code
  }

  it('leaves every reference whole and every row valid', () => {
    expect(db.$client.pragma('foreign_key_check')).toEqual([])
    expect(db.$client.pragma('integrity_check')).toEqual([{ integrity_check: 'ok' }])
  })

  it.each([
    ['M01', 'rt screen'],
    ['M02', 'rt complete_screen'],
    ['M03', 'nurse hold'],
    ['M04', 'nurse observe_hold'],
    ['M05', 'rt start_trial'],
    ['M06', 'rt observe_trial overdue'],
    ['M07', 'rt observe_trial'],
    ['M08', 'physician decide'],
    ['M09', 'rt extubate'],
    ['M10', 'look_again_later'],
    ['M11', 'excused'],
    ['M12', 'no row'],
    ['M13', 'episode_ended'],
    ['M14', 'no row'],
    ['M15', 'not_ready'],
    ['M16', 'rt screen'],
  ])('shows in bed %s of the medical unit: %s', (bed, state) => expect(stateOf('Medical ICU', bed)).toBe(state))
  it.each([
    ['S01', 'hold_unsafe'],
    ['S02', 'hold_not_tolerated'],
    ['S03', 'trial_failed'],
    ['S04', 'rt start_trial'],
    ['S05', 'tracheostomy_pathway'],
    ['S06', 'rt start_trial'],
    ['S07', 'started_after_window'],
    ['S08', 'not_adult'],
    ['S09', 'rt screen overdue'],
    ['S10', 'no row'],
    ['S11', 'no row'],
    ['S12', 'physician decide_again'],
  ])('shows in bed %s of the surgical unit: %s', (bed, state) => expect(stateOf('Surgical ICU', bed)).toBe(state))
  it('leaves one bed of each unit empty', () => {
    expect([unitToday('Medical ICU').emptyBeds, unitToday('Surgical ICU').emptyBeds]).toEqual([['M12'], ['S11']])
  })
  it('gives the reasons for waiting: hold not needed, pairing window, a stopped trial', () => {
    const why = (name: string, bed: string) => {
      const move = unitToday(name).rows.find(({ bedLabel }) => bedLabel === bed)?.move
      return move?.kind === 'move' ? move.why.code : null
    }
    expect([why('Medical ICU', 'M05'), why('Surgical ICU', 'S06'), why('Surgical ICU', 'S04')]).toEqual([
      'pairing_window',
      'hold_not_needed',
      'trial_was_stopped',
    ])
  })

  it('fits the figures of an intensive care unit', () => {
    const { months } = readReview(asJob(db), { unitId: unitToday('Medical ICU').unit.id, from: '2026-10', to: '2026-10' })
    const [october] = months
    if (!october) throw new Error('October is not there.')
    const { patientDays, ventilatorDays, screens: screened, trials, extubations } = october
    expect(patientDays).toBeGreaterThan(16 * 31 * 0.75)
    expect(ventilatorDays / patientDays).toBeGreaterThan(0.3)
    expect(ventilatorDays / patientDays).toBeLessThan(0.75)
    expect(screened.done / screened.eligible).toBeGreaterThan(0.8)
    expect(trials.passed).toBeGreaterThan(trials.failed)
    expect(extubations.planned).toBeGreaterThan(10)
  })
  it('names a rule for every failed trial and none for a passed one', () => {
    const ends = db.select().from(trialEnds).all()
    expect(ends.filter(({ outcome, rulesMet }) => outcome === 'failed' && rulesMet.length === 0)).toEqual([])
    expect(ends.filter(({ outcome, rulesMet }) => outcome === 'passed' && rulesMet.length > 0)).toEqual([])
    expect(new Set(ends.map(({ outcome }) => outcome))).toEqual(new Set(['passed', 'failed', 'stopped']))
  })
  it('keeps a verdict beside every screen that was not excused', () => {
    const rows = db.select().from(screens).all()
    expect(rows.filter(({ result, verdict }) => (result === 'excused') !== (verdict === null))).toEqual([])
    expect(rows.filter(({ result, verdict }) => verdict !== null && verdict.result !== result)).toEqual([])
  })
  it('says in every decision that it is invented, under a hash that fits', () => {
    for (const row of db.select().from(decisions).all()) {
      const { evidence, choice, reasons, lookAgainAt, supportAfter, steroidsPlanned, note, statement } = row
      expect(statement).toMatch(/^Invented\. I have decided/)
      expect(row.contentHash).toBe(
        contentHash({ evidence, choice, plan: { reasons, lookAgainAt, supportAfter, steroidsPlanned, note }, statement }),
      )
    }
  })
  it('puts nothing after now', () => {
    for (const table of [
      'settings',
      'gases',
      'screens',
      'holds',
      'hold_observations',
      'hold_ends',
      'trials',
      'trial_observations',
      'trial_ends',
      'decisions',
      'airway_events',
    ]) {
      const { latest } = db.$client.prepare(`select max(max(observed_at, recorded_at)) latest from ${table}`).get() as {
        latest: number
      }
      expect(latest, table).toBeLessThanOrEqual(NOW)
    }
  })
  it('keeps every entry within its episode and its stay', () => {
    for (const table of ['settings', 'gases', 'screens', 'holds', 'trials', 'decisions']) {
      const outside = db.$client
        .prepare(
          `
        select count(*) count from ${table} one join episodes e on e.id = one.episode_id
        where one.observed_at < e.started_at or one.observed_at > coalesce(e.ended_at, ${NOW}) or not exists (
          select 1 from stays s where s.patient_id = e.patient_id and s.unit_id = one.unit_id and s.started_at <= one.observed_at
            and one.observed_at <= coalesce(s.ended_at, ${NOW}))`,
        )
        .get()
      expect(outside, table).toEqual({ count: 0 })
    }
  })
  it('never lays two patients into one bed at a time', () => {
    const shared = db.$client
      .prepare(
        `
      select count(*) count from stays a join stays b on a.bed_id = b.bed_id and a.id < b.id
      where a.started_at < coalesce(b.ended_at, ${NOW}) and b.started_at < coalesce(a.ended_at, ${NOW})`,
      )
      .get()
    expect(shared).toEqual({ count: 0 })
  })
  it('holds a corrected entry and late ones', () => {
    expect(db.$client.prepare('select count(*) count from settings where supersedes_id is not null').get()).toEqual({ count: 1 })
    expect(
      db.$client.prepare('select count(*) > 10 as many from settings where recorded_at - observed_at > 1800000').get(),
    ).toEqual({ many: 1 })
  })
  it('refuses to change an imported entry', () => {
    expect(() => db.$client.prepare(`update screens set note = 'x'`).run()).toThrow(/append-only/)
  })

  it('tells one sign-in for each role, and gives everybody the password asked for', async () => {
    const rows = db.select().from(account).all()
    expect(filled.accounts.map(({ role }) => role).sort()).toEqual([
      'administrator',
      'nurse',
      'nurse',
      'physician',
      'physician',
      'rt',
      'rt',
      'unit_lead',
    ])
    expect(rows).toHaveLength(db.select().from(user).all().length)
    expect(db.select().from(user).all().length).toBeGreaterThanOrEqual(20)
    expect(await verifyPassword({ hash: rows[0]?.password ?? '', password: PASSWORD })).toBe(true)
    expect(new Set(filled.accounts.map(({ email }) => email.split('@')[1]))).toEqual(new Set(['kestrel-ridge.example']))
  })
  it('marks the hospital as invented and leaves one audit row that says so, without the password', () => {
    expect(db.select().from(hospitals).all()).toMatchObject([{ name: 'Kestrel Ridge Hospital', isDemo: true }])
    const log = db.select().from(auditLog).all()
    expect(log.map(({ action }) => action)).toEqual(['demo.import'])
    expect(JSON.stringify(log)).toMatch(/Invented demo data/)
    expect(JSON.stringify(log)).not.toContain(PASSWORD)
    expect(verifyAuditLog(db)).toMatchObject({ isWhole: true })
  })
  it('is refused a second time and changes nothing', async () => {
    await expect(fillDemo(asJob(db), { password: PASSWORD })).rejects.toMatchObject({ code: 'PRECONDITION' })
    expect(db.select().from(hospitals).all()).toHaveLength(1)
  })
})

describe('who may fill it', () => {
  it('is refused to a person and on a database with a hospital', async () => {
    const world = makeWorld()
    await expect(fillDemo(makeCtx(world.db, world.administrator), { password: PASSWORD })).rejects.toMatchObject({
      code: 'FORBIDDEN',
    })
    await expect(fillDemo(asJob(world.db), { password: PASSWORD })).rejects.toMatchObject({ code: 'PRECONDITION' })
  })
  it('leaves nothing behind when it fails', async () => {
    const db = openTestDatabase()
    db.$client.exec(`create trigger broken before insert on decisions begin select raise(abort, 'disk full'); end`)
    await expect(fillDemo(asJob(db), { password: PASSWORD, historyDays: 20 })).rejects.toThrow(/disk full/)
    expect(db.select().from(hospitals).all()).toEqual([])
    expect(db.select().from(auditLog).all()).toEqual([])
  })
})

describe('the generator', () => {
  it('gives the same rows for the same seed, and others for another', () => {
    const rows = JSON.stringify(generateDemo({ ...SHORT, seed: 5 }).rows)
    expect(JSON.stringify(generateDemo({ ...SHORT, seed: 5 }).rows)).toBe(rows)
    expect(JSON.stringify(generateDemo({ ...SHORT, seed: 6 }).rows)).not.toBe(rows)
  })
  it('fills a unit of any size with ventilated patients only, and keeps its history to the beds asked for', async () => {
    const db = openTestDatabase()
    await fillDemo(asJob(db), {
      password: PASSWORD,
      historyDays: 30,
      units: [{ name: 'Large ICU', prefix: 'L', beds: 120, historyBeds: 4, isEveryBedVentilated: true }],
    })
    const [unit] = db.select().from(units).all()
    const { counts, rows, emptyBeds } = listToday(asJob(db), { unitId: unit?.id ?? newId() })
    expect([counts.ventilated, rows.length, emptyBeds.length]).toEqual([120, 120, 0])
    expect(db.$client.prepare('select count(distinct bed_id) beds from stays where ended_at is not null').get()).toEqual({
      beds: 4,
    })
  })
  it('runs through the clock change of a zone that has one', () => {
    const timeZone = 'America/Denver'
    const nowMs = Date.UTC(2026, 2, 20, 15, 0)
    const { rows } = generateDemo({ ...SHORT, seed: 5, nowMs, timeZone })
    expect(rows.screens.filter(({ observedAt, ventilatorDay }) => localDay(observedAt, timeZone) !== ventilatorDay)).toEqual([])
    expect(rows.settings.filter(({ observedAt, ventilatorDay }) => localDay(observedAt, timeZone) !== ventilatorDay)).toEqual([])
  })
})

describe('the time zone of the demo', () => {
  it('shows a morning between 08:30 and 09:29, whenever the demo is filled', () => {
    for (let minute = 0; minute < 1440; minute += 7) {
      const nowMs = Date.UTC(2026, 11, 31, 0, minute)
      const parts = new Intl.DateTimeFormat('en-GB', {
        timeZone: demoTimeZone(nowMs),
        hour: '2-digit',
        minute: '2-digit',
      }).format(nowMs)
      expect(parts >= '08:30' && parts <= '09:29', `${minute}: ${parts}`).toBe(true)
    }
  })
  it('ends the calendar of the demo with today', () => {
    const calendar = makeCalendar(NOW, demoTimeZone(NOW), 30)
    // 21:40 in Greenwich is 08:40 of the next day in the demo's zone.
    expect([calendar.days.length, calendar.days[30], calendar.dayOf(NOW), calendar.dayAfterToday]).toEqual([
      31,
      '2026-11-18',
      '2026-11-18',
      '2026-11-19',
    ])
  })
})

describe('the password of the demo', () => {
  it('is four words and two digits, long enough, and another one each time', () => {
    const made = Array.from({ length: 50 }, makeDemoPassword)
    for (const password of made) expect(password).toMatch(/^([a-z]{4,9}-){4}\d{2}$/)
    expect(made.every(({ length }) => length >= 15)).toBe(true)
    expect(new Set(made).size).toBe(50)
  })
})
