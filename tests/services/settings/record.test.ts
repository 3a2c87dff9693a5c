import { describe, expect, it } from 'vitest'
import { POST } from '@/app/api/episodes/[episodeId]/settings/route'
import { settings } from '@/db/schema'
import { recordSettingsSchema, type RecordSettingsInput } from '@/lib/schemas/settings'
import { recordSettings } from '@/lib/services/settings/record'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { auditRows, makeCtx, makeWorld, NOW, TODAY } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

const NUMBERS = {
  mode: 'PC-CSV',
  fio2Fraction: 0.4,
  peepCmH2O: 6,
  setRatePerMin: null,
  setTidalVolumeMl: null,
  inspiratoryPressureCmH2O: null,
  pressureSupportCmH2O: 8,
  measuredRatePerMin: 18,
  measuredTidalVolumeMl: 430,
  peakPressureCmH2O: null,
  plateauPressureCmH2O: null,
  spo2Percent: 96,
} as const

function given(episodeId: string, over: Partial<RecordSettingsInput> = {}): RecordSettingsInput {
  return { episodeId, observed: at(NOW - 5 * MINUTE_MS), amends: null, ...NUMBERS, ...over }
}

describe('recordSettings', () => {
  it('keeps the values, both times, the author, the unit, the day and the protocol version, and writes the audit row', () => {
    const world = makeWorld()
    const { id } = recordSettings(makeCtx(world.db, world.rt), given(world.episode.id))
    const [row] = world.db.select().from(settings).all()
    expect(row).toMatchObject({
      id,
      entryId: id,
      entryVersion: 1,
      supersedesId: null,
      isWithdrawn: false,
      episodeId: world.episode.id,
      unitId: world.medical.unit.id,
      ventilatorDay: TODAY,
      observedAt: NOW - 5 * MINUTE_MS,
      recordedAt: NOW,
      recordedBy: world.rt.id,
      protocolVersionId: world.medical.protocolVersion.id,
      ...NUMBERS,
    })
    expect(auditRows(world.db, 'settings.record')).toMatchObject([
      { subjectId: id, unitId: world.medical.unit.id, actorId: world.rt.id },
    ])
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, recordSettings, given(world.episode.id), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    expectNothingLeft(makeCtx(world.db, world.rt), recordSettings, given(world.episode.id), 'settings.record')
  })

  it('records a request that arrives twice once', () => {
    const world = makeWorld()
    expectOnce(world.db, world.rt, recordSettings, given(world.episode.id), given(world.episode.id, { peepCmH2O: 8 }))
    expect(world.db.select().from(settings).all()).toHaveLength(1)
  })

  it('refuses a time in the future, before ventilation and after it, at the time field', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const refused = (ms: number, words: RegExp) =>
      expectRefusal(() => recordSettings(ctx, given(world.episode.id, { observed: at(ms) })), 'INVALID', 'observed.time', words)
    refused(NOW + 10 * MINUTE_MS, /future. It is 08:00 now/)
    refused(world.episode.startedAt - HOUR_MS, /before ventilation began \(1 Mar 08:00\)/)
    world.db.$client
      .prepare('update episodes set ended_at = ?, end = ? where id = ?')
      .run(NOW - HOUR_MS, 'extubated', world.episode.id)
    refused(NOW - 10 * MINUTE_MS, /Ventilation ended at 07:00/)
  })

  it('takes a late entry with both its times', () => {
    const world = makeWorld()
    recordSettings(makeCtx(world.db, world.rt), given(world.episode.id, { observed: at(NOW - 20 * HOUR_MS) }))
    expect(world.db.select().from(settings).get()).toMatchObject({
      observedAt: NOW - 20 * HOUR_MS,
      recordedAt: NOW,
      ventilatorDay: '2026-03-02',
    })
  })
})

describe('amending settings', () => {
  it('adds a version that names the one it replaces; the old row stays as it was', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const first = recordSettings(ctx, given(world.episode.id))
    const before = world.db.select().from(settings).get()
    const second = recordSettings(
      makeCtx(world.db, world.rt, NOW + HOUR_MS),
      given(world.episode.id, { peepCmH2O: 5, amends: { id: first.id, reason: 'typed wrongly' } }),
    )
    const rows = world.db.select().from(settings).all()
    expect(rows.find((row) => row.id === first.id)).toEqual(before)
    expect(rows.find((row) => row.id === second.id)).toMatchObject({
      entryId: first.id,
      entryVersion: 2,
      supersedesId: first.id,
      amendReason: 'typed wrongly',
      peepCmH2O: 5,
      recordedAt: NOW + HOUR_MS,
    })
    expect(auditRows(world.db, 'settings.amend')).toHaveLength(1)
  })

  it('lets only one of two corrections of the same version in', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const first = recordSettings(ctx, given(world.episode.id))
    const amend = (peepCmH2O: number) =>
      recordSettings(ctx, given(world.episode.id, { peepCmH2O, amends: { id: first.id, reason: 'typed wrongly' } }))
    amend(5)
    expectRefusal(() => amend(7), 'CONFLICT')
    expect(world.db.select().from(settings).all()).toHaveLength(2)
  })

  it('lets the author and a physician correct, and nobody else', () => {
    const world = makeWorld()
    const first = recordSettings(makeCtx(world.db, world.rt), given(world.episode.id))
    const input = given(world.episode.id, { amends: { id: first.id, reason: 'typed wrongly' } })
    expectRefusal(() => recordSettings(makeCtx(world.db, world.nurse), input), 'FORBIDDEN')
    expect(recordSettings(makeCtx(world.db, world.physician), input).id).not.toBe(first.id)
  })

  it('keeps the protocol version that the entry was first recorded under', () => {
    const world = makeWorld()
    const first = recordSettings(makeCtx(world.db, world.rt), given(world.episode.id))
    const { id: _id, ...old } = world.medical.protocolVersion
    world.db.$client
      .prepare(
        `insert into protocol_versions (id, unit_id, number, content, note, is_default, drafted_at, approved_at, approved_by, starts_at, version)
       values ('v2', ?, 2, ?, 'second', 0, ?, ?, ?, ?, 1)`,
      )
      .run(world.medical.unit.id, JSON.stringify(old.content), NOW - HOUR_MS, NOW - HOUR_MS, world.physician.id, NOW - HOUR_MS)
    recordSettings(makeCtx(world.db, world.rt), given(world.episode.id, { amends: { id: first.id, reason: 'typed wrongly' } }))
    recordSettings(makeCtx(world.db, world.rt), given(world.episode.id))
    expect(
      world.db
        .select()
        .from(settings)
        .all()
        .map((row) => row.protocolVersionId),
    ).toEqual([world.medical.protocolVersion.id, world.medical.protocolVersion.id, 'v2'])
  })

  it('does not find an entry of another episode', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    expectRefusal(
      () => recordSettings(ctx, given(world.episode.id, { amends: { id: 'none', reason: 'typed wrongly' } })),
      'NOT_FOUND',
    )
  })
})

describe('what the settings form refuses', () => {
  const messages = (over: Record<string, unknown>) => {
    const parsed = recordSettingsSchema.safeParse({ ...given('e1'), ...over })
    return parsed.success ? [] : parsed.error.issues.map((issue) => [issue.path.join('.'), issue.message])
  }
  it.each([
    ['fio2Fraction', 50, /0\.50\?/],
    ['measuredTidalVolumeMl', 0.43, /430 mL\?/],
    ['peepCmH2O', 31, /between 0 and 30/],
    ['spo2Percent', 101, /between 40 and 100/],
    ['fio2Fraction', null, /FiO2/],
  ])('%s of %s is refused in words', (field, value, words) => {
    const [issue, ...others] = messages({ [field]: value })
    expect(others).toEqual([])
    expect(issue?.[0]).toBe(field)
    expect(issue?.[1]).toMatch(words)
  })

  it('asks for a second look at an unlikely value and takes it once confirmed', () => {
    expect(messages({ peepCmH2O: 22 })).toEqual([['peepCmH2O', '22 cmH2O is unusual for the PEEP. Look again, then confirm.']])
    expect(messages({ peepCmH2O: 22, confirmedUnlikely: ['spo2Percent'] })).toHaveLength(1)
    expect(messages({ peepCmH2O: 22, confirmedUnlikely: ['peepCmH2O'] })).toEqual([])
    expect(messages({ peepCmH2O: 20 })).toEqual([])
  })

  it('never lets a confirmation pass what is impossible', () => {
    expect(messages({ peepCmH2O: 31, confirmedUnlikely: ['peepCmH2O'] })).toHaveLength(1)
  })
})

describe('POST /api/episodes/[episodeId]/settings', () => {
  it('records for a signed-in therapist and answers with the id, never stored by a cache', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    const { cookie } = makeSession(world.db, world.rt.id)
    // Routes go by the real clock.
    world.db.$client.prepare('update episodes set started_at = ?').run(Date.now() - 5 * HOUR_MS)
    const { episodeId, ...body } = given(world.episode.id, { observed: at(Date.now() - MINUTE_MS) })
    const response = await POST(
      makeRequest('/api/x', { body, cookie, headers: { 'idempotency-key': 'k1' } }),
      routeParams({ episodeId }),
    )
    expect(response.status).toBe(200)
    expect(response.headers.get('cache-control')).toBe('no-store')
    const again = await POST(
      makeRequest('/api/x', { body, cookie, headers: { 'idempotency-key': 'k1' } }),
      routeParams({ episodeId }),
    )
    expect(await again.json()).toEqual(await response.json())
    expect(world.db.select().from(settings).all()).toHaveLength(1)
  })

  it('names the wrong field and keeps nothing', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    const { cookie } = makeSession(world.db, world.rt.id)
    const { episodeId, ...body } = given(world.episode.id)
    const response = await POST(
      makeRequest('/api/x', { body: { ...body, fio2Fraction: 40 }, cookie }),
      routeParams({ episodeId }),
    )
    expect(response.status).toBe(422)
    expect(await response.json()).toMatchObject({
      code: 'INVALID',
      fields: { fio2Fraction: expect.stringContaining('0.40?') as string },
    })
    expect(world.db.select().from(settings).all()).toEqual([])
  })

  it('refuses a request without a session, and one from a foreign page', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    const { episodeId, ...body } = given(world.episode.id)
    expect((await POST(makeRequest('/api/x', { body }), routeParams({ episodeId }))).status).toBe(401)
    const { cookie } = makeSession(world.db, world.rt.id)
    const foreign = makeRequest('/api/x', { body, cookie, headers: { origin: 'https://elsewhere.example' } })
    expect((await POST(foreign, routeParams({ episodeId }))).status).toBe(403)
  })
})
