import { describe, expect, it } from 'vitest'
import { POST } from '@/app/api/episodes/[episodeId]/gases/route'
import { gases } from '@/db/schema'
import { recordGasSchema, type RecordGasInput } from '@/lib/schemas/gases'
import { recordGas } from '@/lib/services/gases/record'
import { HOUR_MS, MINUTE_MS } from '@/lib/shared/time'
import { auditRows, makeCtx, makeWorld, NOW } from '../../helpers/factories'
import { makeRequest, makeSession, routeParams, serveDatabase } from '../../helpers/test-server'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

const NUMBERS = {
  ph: 7.38,
  paCO2MmHg: 42,
  paO2MmHg: 78,
  fio2Fraction: 0.4,
  bicarbonateMmolPerL: 24,
  lactateMmolPerL: 1.1,
  haemoglobinGPerDl: 10.2,
}

const given = (episodeId: string, over: Partial<RecordGasInput> = {}): RecordGasInput => ({
  episodeId,
  observed: at(NOW - 5 * MINUTE_MS),
  amends: null,
  ...NUMBERS,
  ...over,
})

describe('recordGas', () => {
  it('keeps the gas with the FiO2 it was drawn at, and writes the audit row', () => {
    const world = makeWorld()
    const { id } = recordGas(makeCtx(world.db, world.nurse), given(world.episode.id))
    expect(world.db.select().from(gases).all()).toMatchObject([
      { id, ...NUMBERS, observedAt: NOW - 5 * MINUTE_MS, recordedBy: world.nurse.id },
    ])
    expect(auditRows(world.db, 'gas.record')).toMatchObject([
      { subjectId: id, unitId: world.medical.unit.id, actorId: world.nurse.id },
    ])
  })

  it('refuses a unit lead and a person from another unit', () => {
    const world = makeWorld()
    expectDoor(world, recordGas, given(world.episode.id), world.lead)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    expectNothingLeft(makeCtx(world.db, world.rt), recordGas, given(world.episode.id), 'gas.record')
  })

  it('records a request that arrives twice once', () => {
    const world = makeWorld()
    expectOnce(world.db, world.rt, recordGas, given(world.episode.id), given(world.episode.id, { ph: 7.3 }))
    expect(world.db.select().from(gases).all()).toHaveLength(1)
  })

  it('corrects by a new version; a second correction of the same version is a conflict', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const first = recordGas(ctx, given(world.episode.id))
    const amend = () => recordGas(ctx, given(world.episode.id, { ph: 7.3, amends: { id: first.id, reason: 'read wrongly' } }))
    amend()
    expectRefusal(amend, 'CONFLICT')
    expect(
      world.db
        .select()
        .from(gases)
        .all()
        .map((row) => [row.entryVersion, row.ph]),
    ).toEqual([
      [1, 7.38],
      [2, 7.3],
    ])
    expect(auditRows(world.db, 'gas.amend')).toHaveLength(1)
  })

  it('answers through its route', async () => {
    const world = makeWorld()
    serveDatabase(world.db)
    world.db.$client.prepare('update episodes set started_at = ?').run(Date.now() - 5 * HOUR_MS)
    const { cookie } = makeSession(world.db, world.rt.id)
    const { episodeId, ...body } = given(world.episode.id, { observed: at(Date.now() - MINUTE_MS) })
    const response = await POST(makeRequest('/api/x', { body, cookie }), routeParams({ episodeId }))
    expect(response.status).toBe(200)
    expect(world.db.select().from(gases).all()).toHaveLength(1)
  })
})

describe('what the gas form refuses', () => {
  it.each([
    ['paCO2MmHg', 5.6, /kPa.*42 mmHg\?/],
    ['paO2MmHg', 10.4, /kPa.*78 mmHg\?/],
    ['haemoglobinGPerDl', 102, /10\.2 g\/dL\?/],
    ['fio2Fraction', 40, /0\.40\?/],
    ['ph', 73.8, /between 6\.6 and 7\.9/],
    ['ph', null, /pH/],
    ['fio2Fraction', undefined, /FiO2/],
    ['ph', 6.9, /6\.9 is unusual for the pH\. Look again, then confirm\./],
  ])('%s of %s, in words that tell what would be right', (field, value, words) => {
    const parsed = recordGasSchema.safeParse({ ...given('e1'), [field]: value })
    expect(parsed.error?.issues.map((issue) => issue.path.join('.'))).toEqual([field])
    expect(parsed.error?.issues[0]?.message).toMatch(words)
  })
})
