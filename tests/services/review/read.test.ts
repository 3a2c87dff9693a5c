import { describe, expect, it } from 'vitest'
import { airwayEvents, episodes, patients, protocolVersions, screens, stays, trialEnds, trials } from '@/db/schema'
import { readReview } from '@/lib/services/review/read'
import { reviewDays } from '@/lib/services/review/review-days'
import { lastDayOf, reviewMonths, shiftMonth } from '@/lib/services/review/review-months'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS, wallClockMs } from '@/lib/shared/time'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import type { ObservedReadings } from '@/lib/weaning/readings'
import {
  auditRows,
  entryPlace,
  makeCtx,
  makeJobCtx,
  makePatient,
  makePerson,
  makeStay,
  makeUnit,
  makeWorld,
  NOW,
  TIME_ZONE,
} from '../../helpers/factories'

type World = ReturnType<typeof makeWorld>
const local = (day: string, time: string) => {
  const [hours = 0, minutes = 0] = time.split(':').map(Number)
  return wallClockMs(day, hours * 60 + minutes, TIME_ZONE)
}
const EMPTY_LOOK: ObservedReadings = {
  breathsPerMin: 20,
  tidalVolumeMl: null,
  spo2Percent: 95,
  heartRatePerMin: 80,
  systolicMmHg: null,
  diastolicMmHg: null,
  rass: null,
  paCO2MmHg: null,
  paO2MmHg: null,
  ph: null,
  signs: [],
}

function addScreen(world: World, day: string, time: string, over: Partial<typeof screens.$inferInsert> = {}) {
  const row = { ...entryPlace(world.episode, world.place, local(day, time)), result: 'not_ready' as const, ...over }
  world.db.insert(screens).values(row).run()
  return row
}
function addTrial(world: World, day: string, outcome: 'passed' | 'failed' | 'stopped' | null) {
  const place = entryPlace(world.episode, world.place, local(day, '07:00'))
  world.db
    .insert(trials)
    .values({ ...place, technique: 't_piece', fio2Fraction: 0.4, plannedDurationMin: 30, baseline: EMPTY_LOOK })
    .run()
  if (outcome === null) return place
  const end = {
    ...entryPlace(world.episode, world.place, local(day, '07:35')),
    trialId: place.entryId,
    outcome,
    rulesMet: [],
    returnedTo: 'as before',
  }
  world.db.insert(trialEnds).values(end).run()
  return { ...place, end }
}
function addEvent(
  world: World,
  event: typeof airwayEvents.$inferInsert.event,
  at: number,
  over: Partial<typeof airwayEvents.$inferInsert> = {},
) {
  const row = { ...entryPlace(world.episode, world.place, at), event, ...over }
  world.db.insert(airwayEvents).values(row).run()
  return row
}
function read(world: World, over: { unitId?: string; from?: string; to?: string; now?: number } = {}) {
  const { unitId = world.medical.unit.id, now = NOW, ...range } = over
  return readReview(makeCtx(world.db, world.lead, now), { unitId, from: range.from, to: range.to })
}
const month = (world: World, name: string, over: Parameters<typeof read>[1] = {}) => {
  const found = read(world, over).months.find((one) => one.month === name)
  if (!found) throw new Error(`${name} is not in the review.`)
  return found
}

describe('reading the review', () => {
  it('covers the 24 months up to now, the last one marked as unfinished', () => {
    const review = read(makeWorld())
    expect([review.from, review.to, review.day, review.months.length]).toEqual(['2024-04', '2026-03', '2026-03-03', 24])
    expect(review.months.filter(({ isUnfinished }) => isUnfinished).map((one) => one.month)).toEqual(['2026-03'])
  })

  it('counts the patient who came on 28 February and was intubated on 1 March', () => {
    const world = makeWorld()
    expect(month(world, '2026-02')).toMatchObject({ patientDays: 1, ventilatorDays: 0 })
    expect(month(world, '2026-03')).toMatchObject({ patientDays: 3, ventilatorDays: 3 })
  })

  it('answers the same for a month whether it is asked for alone or among others', () => {
    const world = makeWorld()
    addScreen(world, '2026-03-02', '06:10')
    expect(read(world, { from: '2026-03', to: '2026-03' }).months).toEqual(read(world).months.slice(-1))
  })

  it('counts screens by their current version, and not the withdrawn ones', () => {
    const world = makeWorld()
    const incomplete = addScreen(world, '2026-03-01', '08:30', { result: 'incomplete' })
    addScreen(world, '2026-03-01', '08:30', {
      entryId: incomplete.entryId,
      entryVersion: 2,
      supersedesId: incomplete.id,
      amendReason: 'completed',
    })
    const taken = addScreen(world, '2026-03-02', '06:00', { result: 'ready' })
    addScreen(world, '2026-03-02', '06:00', {
      entryId: taken.entryId,
      entryVersion: 2,
      supersedesId: taken.id,
      amendReason: 'wrong patient',
      isWithdrawn: true,
    })
    // 1 March done; 2 March not screened; today not yet due at 08:00.
    expect(month(world, '2026-03').screens).toMatchObject({ eligible: 2, done: 1, incomplete: 0, notYetDue: 1 })
    expect(month(world, '2026-03', { now: NOW + 2 * HOUR_MS }).screens).toMatchObject({ eligible: 3, done: 1, notYetDue: 0 })
  })

  it('takes the screening window from the protocol in force that day', () => {
    const world = makeWorld()
    world.db
      .insert(protocolVersions)
      .values({
        id: newId(),
        unitId: world.medical.unit.id,
        number: 2,
        content: { ...defaultProtocol, screeningWindow: { opensMin: 300, closesMin: 450 } },
        note: 'Earlier',
        draftedAt: NOW,
        approvedAt: NOW,
        approvedBy: world.physician.id,
        startsAt: local('2026-03-02', '00:00'),
      })
      .run()
    const window = (day: string) =>
      reviewDays(day, day, TIME_ZONE, [
        { startsAt: 0, closesMin: 540 },
        { startsAt: local('2026-03-02', '00:00'), closesMin: 450 },
      ])[0]?.closesMs
    expect([window('2026-03-01'), window('2026-03-02')]).toEqual([local('2026-03-01', '09:00'), local('2026-03-02', '07:30')])
    // At 08:00 today's window has closed under the new version.
    expect(month(world, '2026-03').screens).toMatchObject({ notYetDue: 0, eligible: 3 })
  })

  it('counts a screen made in the unit that the patient left that day', () => {
    const world = makeWorld()
    const [bed] = world.surgical.beds
    if (!bed) throw new Error('The unit has no bed.')
    const moveMs = local('2026-03-02', '14:00')
    world.db.update(stays).set({ endedAt: moveMs, end: 'moved' }).run()
    makeStay(world.db, { patientId: world.patient.id, unitId: world.surgical.unit.id, bedId: bed.id, startedAt: moveMs })
    addScreen(world, '2026-03-02', '06:00')
    const outsider = makePerson(world.db, world.hospital.id, [{ unitId: world.surgical.unit.id, role: 'unit_lead' }])
    const there = readReview(makeCtx(world.db, outsider), { unitId: world.surgical.unit.id, from: '2026-03', to: undefined })
      .months[0]
    expect(there).toMatchObject({ ventilatorDays: 2, patientDays: 2, screens: { eligible: 1, done: 1, notYetDue: 1 } })
    expect(month(world, '2026-03')).toMatchObject({ ventilatorDays: 1, patientDays: 1, screens: { eligible: 1, done: 0 } })
  })

  it('counts trials by the outcome as it stands now', () => {
    const world = makeWorld()
    addTrial(world, '2026-03-01', 'passed')
    addTrial(world, '2026-03-02', null)
    const corrected = addTrial(world, '2026-03-03', 'passed')
    if (!('end' in corrected)) throw new Error('The trial has no end.')
    world.db
      .insert(trialEnds)
      .values({
        ...corrected.end,
        id: newId(),
        entryVersion: 2,
        supersedesId: corrected.end.id,
        amendReason: 'rate was 38',
        outcome: 'failed',
      })
      .run()
    expect(month(world, '2026-03').trials).toEqual({ started: 3, passed: 1, failed: 1, stopped: 0, running: 1 })
  })

  it('keeps the outcome of a trial whose start was corrected, and leaves out a withdrawn trial', () => {
    const world = makeWorld()
    const { end: _end, ...start } = { end: null, ...addTrial(world, '2026-03-01', 'failed') }
    const again = { technique: 't_piece' as const, fio2Fraction: 0.35, plannedDurationMin: 30, baseline: EMPTY_LOOK }
    world.db
      .insert(trials)
      .values({ ...start, ...again, id: newId(), entryVersion: 2, supersedesId: start.id, amendReason: 'FiO2 misread' })
      .run()
    const wrong = addTrial(world, '2026-03-02', 'passed')
    world.db
      .insert(trials)
      .values({
        ...wrong,
        ...again,
        id: newId(),
        entryVersion: 2,
        supersedesId: wrong.id,
        amendReason: 'wrong patient',
        isWithdrawn: true,
      })
      .run()
    expect(month(world, '2026-03').trials).toEqual({ started: 1, passed: 0, failed: 1, stopped: 0, running: 0 })
  })

  it('follows an extubation to the reintubation in a later episode, exactly 48 h later included', () => {
    const world = makeWorld()
    const extubatedMs = local('2026-02-10', '10:00')
    addEvent(world, 'extubated', extubatedMs)
    const second = world.db
      .insert(episodes)
      .values({
        id: newId(),
        patientId: world.patient.id,
        startedAt: extubatedMs + 48 * HOUR_MS,
        start: 'reintubated',
        airway: 'endotracheal_tube',
        endedAt: extubatedMs + 60 * HOUR_MS,
        end: 'extubated',
        recordedAt: NOW,
        recordedBy: world.rt.id,
      })
      .returning()
      .get()
    world.db
      .insert(airwayEvents)
      .values({ ...entryPlace(second, world.place, second.startedAt), event: 'reintubated' })
      .run()
    expect(month(world, '2026-02').extubations).toMatchObject({
      planned: 1,
      unplanned: 0,
      afterPlanned: { within48h: { known: 1, reintubated: 1 }, within7d: { known: 1, reintubated: 1 } },
    })
  })

  it('counts an extubation of the last days as provisional', () => {
    const world = makeWorld()
    addEvent(world, 'extubated', NOW - 50 * HOUR_MS)
    expect(month(world, '2026-03').extubations.afterPlanned).toMatchObject({
      within48h: { known: 1, tooRecent: 0 },
      within7d: { known: 0, tooRecent: 1 },
    })
  })

  it('does not count a withdrawn extubation', () => {
    const world = makeWorld()
    const event = addEvent(world, 'extubated', NOW - 20 * HOUR_MS)
    addEvent(world, 'extubated', NOW - 20 * HOUR_MS, {
      entryId: event.entryId,
      entryVersion: 2,
      supersedesId: event.id,
      amendReason: 'did not happen',
      isWithdrawn: true,
    })
    expect(month(world, '2026-03').extubations.planned).toBe(0)
  })

  it.each([
    ['the day without 02:30, in spring', '2026-03-07', '23:30', '2026-03-08', '00:30', 2],
    ['the day of 25 hours, in autumn', '2025-11-02', '00:10', '2025-11-02', '23:50', 1],
    ['the evening before it', '2025-11-01', '23:50', '2025-11-02', '00:10', 2],
  ])('counts %s by the calendar of the unit', (_title, fromDay, fromTime, toDay, toTime, days) => {
    const world = makeWorld()
    const { unit, beds } = makeUnit(world.db, world.hospital.id, { bedPrefix: 'X' })
    const [bed] = beds
    if (!bed) throw new Error('The unit has no bed.')
    const [startedAt, endedAt] = [local(fromDay, fromTime), local(toDay, toTime)]
    const patient = makePatient(world.db, world.hospital.id, world.rt.id)
    makeStay(world.db, { patientId: patient.id, unitId: unit.id, bedId: bed.id, startedAt, endedAt, end: 'left_unit' })
    world.db
      .insert(episodes)
      .values({
        id: newId(),
        patientId: patient.id,
        startedAt,
        start: 'intubated',
        airway: 'endotracheal_tube',
        endedAt,
        end: 'extubated',
        recordedAt: startedAt,
        recordedBy: world.rt.id,
      })
      .run()
    const reader = makePerson(world.db, world.hospital.id, [{ unitId: unit.id, role: 'nurse' }])
    const { months } = readReview(makeCtx(world.db, reader, local('2026-04-15', '12:00')), {
      unitId: unit.id,
      from: undefined,
      to: undefined,
    })
    const total = (of: 'ventilatorDays' | 'patientDays') => months.reduce((sum, one) => sum + one[of], 0)
    expect([total('ventilatorDays'), total('patientDays')]).toEqual([days, days])
  })

  it('answers a unit that never had a patient with zeros', () => {
    const world = makeWorld()
    const { unit } = makeUnit(world.db, world.hospital.id, { bedPrefix: 'X' })
    const reader = makePerson(world.db, world.hospital.id, [{ unitId: unit.id, role: 'nurse' }])
    const { months } = readReview(makeCtx(world.db, reader), { unitId: unit.id, from: undefined, to: undefined })
    expect(months).toHaveLength(24)
    expect(
      months.every(({ patientDays, ventilatorDays, screens: { eligible } }) => patientDays + ventilatorDays + eligible === 0),
    ).toBe(true)
  })

  it('leaves a patient of 17 years out of the screens', () => {
    const world = makeWorld()
    world.db.update(patients).set({ birthDate: '2008-06-01' }).run()
    expect(month(world, '2026-03').screens).toMatchObject({ eligible: 0, notAdult: 3 })
  })
})

describe('the months asked for', () => {
  it('are up to this month and 24 in all when left out', () => {
    expect(reviewMonths({}, '2026-03')).toEqual({ from: '2024-04', to: '2026-03' })
    expect(reviewMonths({ to: '2025-06' }, '2026-03')).toEqual({ from: '2023-07', to: '2025-06' })
  })
  it.each([
    ['a month to come', { to: '2026-04' }, 'to', /still to come.*Mar 2026/],
    ['a first month after the last', { from: '2026-02', to: '2026-01' }, 'from', /after the last one, Jan 2026/],
    ['more than 24 months', { from: '2024-03', to: '2026-03' }, 'from', /24 months at most.*Apr 2024/],
  ])('refuse %s at its field', (_title, given, field, message) => {
    const error = captured(() => reviewMonths(given, '2026-03'))
    expect(error).toMatchObject({ code: 'INVALID' })
    expect((error as { fields: Record<string, string> }).fields[field]).toMatch(message)
  })
  it('count over the turn of the year and know leap years', () => {
    expect([shiftMonth('2026-01', -1), shiftMonth('2025-12', 1), shiftMonth('2026-03', -23)]).toEqual([
      '2025-12',
      '2026-01',
      '2024-04',
    ])
    expect([lastDayOf('2024-02'), lastDayOf('2026-02'), lastDayOf('2026-12')]).toEqual(['2024-02-29', '2026-02-28', '2026-12-31'])
  })
})

describe('who may read it', () => {
  it.each(['rt', 'nurse', 'physician', 'lead'] as const)(
    'lets the %s of the unit read, and says whether they may export',
    (role) => {
      const world = makeWorld()
      const review = readReview(makeCtx(world.db, world[role]), { unitId: world.medical.unit.id, from: undefined, to: undefined })
      expect(review.mayExport).toBe(role === 'physician' || role === 'lead')
    },
  )
  it.each(['outsider', 'administrator'] as const)('answers the %s with not found, and keeps the refusal', (who) => {
    const world = makeWorld()
    const asked = () =>
      readReview(makeCtx(world.db, world[who]), { unitId: world.medical.unit.id, from: undefined, to: undefined })
    expect(captured(asked)).toMatchObject({ code: 'NOT_FOUND' })
    expect(auditRows(world.db, 'access.denied')).toHaveLength(1)
  })
  it('answers a job, for the weekly letter', () => {
    const world = makeWorld()
    expect(
      readReview(makeJobCtx(world.db, 'mail.queue-due'), { unitId: world.medical.unit.id, from: '2026-03', to: undefined })
        .months,
    ).toHaveLength(1)
  })
  it('names no patient', () => {
    const world = makeWorld()
    expect(JSON.stringify(read(world))).not.toMatch(
      new RegExp(`${world.patient.familyName}|${world.patient.recordNumber}|${world.patient.id}`),
    )
  })
})

function captured(run: () => unknown): unknown {
  try {
    run()
  } catch (error) {
    return error
  }
  throw new Error('It was not refused.')
}
