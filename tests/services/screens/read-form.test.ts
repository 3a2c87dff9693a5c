import { describe, expect, it } from 'vitest'
import { recordOpenings } from '@/db/schema'
import { readScreenForm } from '@/lib/services/screens/read-form'
import { recordScreen } from '@/lib/services/screens/record'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS } from '@/lib/shared/time'
import { auditRows, makeCtx, makeGas, makeSettings, makeWorld, NOW, TODAY } from '../../helpers/factories'
import { addVersion, minute, READY, screened, screenInput, withFio2Limit } from '../../helpers/steps'
import { expectDoor, expectRefusal } from '../../helpers/verb-checks'

describe('readScreenForm', () => {
  it('gives the patient line, the protocol in force, last values with their time and the clock, with nothing recorded yet', () => {
    const world = makeWorld()
    makeSettings(world.db, world.episode, world.place, { observedAt: minute(-90), pressureSupportCmH2O: 10 })
    makeGas(world.db, world.episode, world.place, { observedAt: minute(-80) })
    const form = readScreenForm(makeCtx(world.db, world.rt), { episodeId: world.episode.id })
    expect(form.patient).toMatchObject({
      bedLabel: 'M01',
      familyName: world.patient.familyName,
      sex: 'male',
      ageYears: 64,
      isAdult: true,
      heightCm: 180,
      ventilatorDayNumber: 3,
      timeZone: 'America/Denver',
    })
    // PBW = 50 + 0.91 × (180 − 152.4) = 75.116 kg, ARDS Network 2000, doi:10.1056/NEJM200005043421801.
    expect(form.patient.predictedBodyWeightKg).toBeCloseTo(75.116, 3)
    expect(form.protocol).toMatchObject({ number: 1, isDefault: true })
    expect(form.prefill.settings).toMatchObject({
      fio2Fraction: 0.4,
      peepCmH2O: 6,
      pressureSupportCmH2O: 10,
      observedAt: minute(-90),
    })
    expect(form.prefill.gas).toMatchObject({ ph: 7.38, paO2MmHg: 78, observedAt: minute(-80) })
    expect(form).toMatchObject({
      nowMs: NOW,
      ventilatorDay: TODAY,
      wallClock: { day: TODAY, time: '08:00' },
      seenLatestId: null,
      screens: [],
      amending: null,
      may: { record: true, amend: false },
      move: { kind: 'move', step: 'screen', role: 'rt' },
    })
  })

  it('gives today’s screens latest first, and the newest recorded one as seen', () => {
    const world = makeWorld()
    const late = screened(world)
    const early = recordScreen(
      makeCtx(world.db, world.rt),
      screenInput(world.episode.id, { observed: { day: TODAY, time: '06:00' }, seenLatestId: late.id }),
    )
    const form = readScreenForm(makeCtx(world.db, world.nurse), { episodeId: world.episode.id })
    expect(form.screens.map(({ id }) => id)).toEqual([late.id, early.id])
    expect(form.screens[0]).toMatchObject({
      recordedByName: 'Robin Therapist',
      protocolNumber: 1,
      result: 'ready',
      isLate: true,
      isAmended: false,
    })
    expect(form.seenLatestId).toBe(early.id)
    expect(form.may).toEqual({ record: false, amend: false })
  })

  it('gives the entry to correct with the protocol version that judged it', () => {
    const world = makeWorld()
    const { id } = screened(world)
    addVersion(world.db, world, withFio2Limit(0.4), minute(-10))
    const form = readScreenForm(makeCtx(world.db, world.rt), { episodeId: world.episode.id, amend: id })
    expect(form.amending).toMatchObject({ id, readings: READY })
    expect(form.protocol.number).toBe(1)
    expect(form.may.amend).toBe(true)
    expect(readScreenForm(makeCtx(world.db, world.rt), { episodeId: world.episode.id }).protocol.number).toBe(2)
    expectRefusal(
      () => readScreenForm(makeCtx(world.db, world.rt), { episodeId: world.episode.id, amend: 'absent' }),
      'NOT_FOUND',
    )
  })

  it('refuses a person from another unit and an administrator', () => {
    const world = makeWorld()
    expectDoor(world, readScreenForm, { episodeId: world.episode.id }, null)
    expectRefusal(() => readScreenForm(makeCtx(world.db, world.administrator), { episodeId: world.episode.id }), 'NOT_FOUND')
  })

  it('lets a reader through a record opening see, never record, and logs each read', () => {
    const world = makeWorld()
    world.db
      .insert(recordOpenings)
      .values({
        id: newId(),
        patientId: world.patient.id,
        unitId: world.medical.unit.id,
        personId: world.outsider.id,
        reason: 'consulted',
        openedAt: NOW - HOUR_MS,
        expiresAt: NOW + HOUR_MS,
      })
      .run()
    const ctx = makeCtx(world.db, world.outsider)
    expect(readScreenForm(ctx, { episodeId: world.episode.id }).may).toEqual({ record: false, amend: false })
    readScreenForm(ctx, { episodeId: world.episode.id })
    expect(auditRows(world.db, 'patient.read_by_opening')).toHaveLength(2)
    expectRefusal(() => recordScreen(ctx, screenInput(world.episode.id)), 'FORBIDDEN')
  })

  it('computes no predicted body weight and says not adult under 18', () => {
    const world = makeWorld()
    world.db.$client.prepare('update patients set birth_date = ?').run('2010-01-01')
    const { patient, move } = readScreenForm(makeCtx(world.db, world.rt), { episodeId: world.episode.id })
    expect(patient).toMatchObject({ isAdult: false, predictedBodyWeightKg: null })
    expect(move).toEqual({ kind: 'none', reason: { code: 'not_adult' } })
  })
})
