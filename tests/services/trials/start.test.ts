import { describe, expect, it } from 'vitest'
import { trials } from '@/db/schema'
import { startTrialSchema } from '@/lib/schemas/trials'
import { endHold } from '@/lib/services/holds/end'
import { recordScreen } from '@/lib/services/screens/record'
import { endTrial } from '@/lib/services/trials/end'
import { observeTrial } from '@/lib/services/trials/observe'
import { startTrial } from '@/lib/services/trials/start'
import { openDatabase } from '@/db/client'
import { makeTestFolder, openTestDatabaseFile } from '../../helpers/database'
import { auditRows, makeCtx, makeWorld, NOW, TODAY } from '../../helpers/factories'
import {
  CALM,
  heldSince,
  holdEnd,
  minute,
  onTrial,
  READY,
  readyForTrial,
  screened,
  screenInput,
  trialEnd,
  trialInput,
  trialLook,
} from '../../helpers/steps'
import { at, expectDoor, expectNothingLeft, expectOnce, expectRefusal } from '../../helpers/verb-checks'

type World = ReturnType<typeof makeWorld>
const rowsOf = (world: World) => world.db.select().from(trials).all()
const start = (world: World, over: Parameters<typeof trialInput>[1] = {}) =>
  startTrial(makeCtx(world.db, world.rt), trialInput(world.episode.id, over))

describe('startTrial', () => {
  it('keeps technique, numbers, length and baseline, and writes the audit row', () => {
    const world = makeWorld()
    const answer = onTrial(world)
    expect(rowsOf(world)).toMatchObject([
      {
        id: answer.id,
        entryId: answer.trialId,
        technique: 'pressure_support',
        pressureSupportCmH2O: 8,
        peepCmH2O: 5,
        fio2Fraction: 0.4,
        plannedDurationMin: 30,
        baseline: CALM,
        startedAnywayBecause: null,
        ventilatorDay: TODAY,
        observedAt: minute(-40),
        recordedAt: NOW,
        recordedBy: world.rt.id,
      },
    ])
    expect(auditRows(world.db, 'trial.start')).toMatchObject([{ subjectId: answer.id }])
  })

  it('refuses a nurse and a person from another unit', () => {
    const world = makeWorld()
    readyForTrial(world)
    expectDoor(world, startTrial, trialInput(world.episode.id), world.nurse)
  })

  it('leaves nothing behind when the audit row cannot be written', () => {
    const world = makeWorld()
    readyForTrial(world)
    expectNothingLeft(makeCtx(world.db, world.rt), startTrial, trialInput(world.episode.id), 'trial.start')
  })

  it('records a request that arrives twice once', () => {
    const world = makeWorld()
    readyForTrial(world)
    expectOnce(
      world.db,
      world.rt,
      startTrial,
      trialInput(world.episode.id),
      trialInput(world.episode.id, { plannedDurationMin: 60 }),
    )
    expect(rowsOf(world)).toHaveLength(1)
  })

  it('refuses a length outside the unit’s protocol, at its field', () => {
    const world = makeWorld()
    readyForTrial(world)
    expectRefusal(() => start(world, { plannedDurationMin: 29 }), 'INVALID', 'plannedDurationMin', /30 to 120 min/)
    expectRefusal(() => start(world, { plannedDurationMin: 121 }), 'INVALID', 'plannedDurationMin')
    expect(start(world, { plannedDurationMin: 120 }).id).toBeTruthy()
  })

  it('refuses under 18', () => {
    const world = makeWorld()
    readyForTrial(world)
    world.db.$client.prepare('update patients set birth_date = ?').run('2010-01-01')
    expectRefusal(() => start(world), 'PRECONDITION', undefined, /under 18/)
  })
})

describe('what comes before a trial', () => {
  const refusedFor = (world: World, words: RegExp, over: Parameters<typeof trialInput>[1] = {}) => {
    expectRefusal(() => start(world, over), 'PRECONDITION', 'startedAnywayBecause')
    expectRefusal(() => start(world, over), 'PRECONDITION', undefined, words)
    expect(rowsOf(world)).toHaveLength(0)
  }

  it('names the screen and the hold when neither is recorded', () => {
    refusedFor(makeWorld(), /no screen is recorded today; the sedation hold is not recorded today/)
  })

  it('names a screen that is not ready, the latest one', () => {
    const world = makeWorld()
    readyForTrial(world)
    const ctx = makeCtx(world.db, world.rt)
    const again = screenInput(world.episode.id, {
      observed: at(minute(-45)),
      readings: { ...READY, peepCmH2O: 12 },
      recordAnyway: true,
    })
    recordScreen(ctx, again)
    refusedFor(world, /the screen at 07:15 is not ready/)
  })

  it('names a hold that runs, and one that was not tolerated', () => {
    const world = makeWorld()
    screened(world)
    const { holdId } = heldSince(world)
    refusedFor(world, /started at 07:10 has no outcome yet/)
    endHold(makeCtx(world.db, world.nurse), holdEnd(world.episode.id, holdId, { outcome: 'not_tolerated', note: 'agitated' }))
    refusedFor(world, /hold ended at 07:40: not tolerated/, { observed: at(minute(-10)) })
  })

  it('starts after a tolerated hold', () => {
    const world = makeWorld()
    screened(world)
    const { holdId } = heldSince(world)
    endHold(makeCtx(world.db, world.nurse), holdEnd(world.episode.id, holdId, { note: 'awake, follows commands' }))
    expect(start(world, { observed: at(minute(-10)) }).id).toBeTruthy()
  })

  it('counts only what was observed before the start', () => {
    const world = makeWorld()
    readyForTrial(world)
    refusedFor(world, /no screen is recorded today/, { observed: at(minute(-90)) })
  })

  it('asks for a new screen after a trial that failed the same day', () => {
    const world = makeWorld()
    const first = onTrial(world)
    const ctx = makeCtx(world.db, world.rt)
    endTrial(
      ctx,
      trialEnd(world.episode.id, first.trialId, {
        outcome: 'failed',
        reason: 'tired',
        returnedTo: 'PC-IMV',
        observed: at(minute(-30)),
      }),
    )
    const again = { observed: at(minute(-5)), seenLatestId: first.id }
    expectRefusal(() => start(world, again), 'PRECONDITION', undefined, /a trial failed at 07:30 and no screen is recorded since/)
    recordScreen(ctx, screenInput(world.episode.id, { observed: at(minute(-10)), recordAnyway: true }))
    expect(start(world, again).id).toBeTruthy()
  })

  it('starts all the same for a stated reason, and keeps it', () => {
    const world = makeWorld()
    start(world, { startedAnywayBecause: 'ordered at the bedside' })
    expect(rowsOf(world)).toMatchObject([{ startedAnywayBecause: 'ordered at the bedside' }])
  })
})

describe('one trial at a time', () => {
  it('refuses a second start while one runs, whatever the form showed', () => {
    const world = makeWorld()
    const first = onTrial(world)
    for (const over of [{}, { seenLatestId: first.id }, { recordAnyway: true }]) {
      const input = trialInput(world.episode.id, { observed: at(minute(-5)), ...over })
      const run = () => startTrial(makeCtx(world.db, world.physician), input)
      expectRefusal(run, 'PRECONDITION', undefined, /A breathing trial has been running since 07:20 \(Robin Therapist\)/)
    }
    expect(rowsOf(world)).toHaveLength(1)
  })

  it('lets one of two server processes on the same file in', () => {
    const path = `${makeTestFolder()}/trial.db`
    const world = makeWorld(openTestDatabaseFile(path))
    readyForTrial(world)
    const other = openDatabase(path)
    const outcomes = [world.db, other, world.db, other].map((db, index) => {
      const person = index % 2 === 0 ? world.rt : world.physician
      try {
        startTrial(makeCtx(db, person), trialInput(world.episode.id, { recordAnyway: true }))
        return 'started'
      } catch (error) {
        return error instanceof Error ? error.message.slice(0, 40) : 'unknown'
      }
    })
    expect(outcomes.filter((outcome) => outcome === 'started')).toHaveLength(1)
    expect(rowsOf(world)).toHaveLength(1)
    other.$client.close()
    world.db.$client.close()
  })

  it('tells who recorded one meanwhile when it has ended', () => {
    const world = makeWorld()
    const first = onTrial(world)
    const ctx = makeCtx(world.db, world.rt)
    endTrial(ctx, trialEnd(world.episode.id, first.trialId, { outcome: 'stopped', reason: 'scan', returnedTo: 'as before' }))
    const input = trialInput(world.episode.id, { observed: at(minute(-5)) })
    const run = () => startTrial(makeCtx(world.db, world.physician), input)
    expectRefusal(run, 'CONFLICT', undefined, /Robin Therapist recorded a breathing trial.*07:20: pressure support/)
    const inside = trialInput(world.episode.id, { observed: at(minute(-20)), seenLatestId: first.id })
    expectRefusal(() => startTrial(ctx, inside), 'INVALID', 'observed.time', /from 07:20 to 07:50/)
  })
})

describe('amending the start of a trial', () => {
  it('keeps the trial’s id, the reason, and refuses a start after the first look', () => {
    const world = makeWorld()
    const ctx = makeCtx(world.db, world.rt)
    const { id, trialId } = onTrial(world)
    observeTrial(ctx, trialLook(world.episode.id, trialId))
    const amends = { id, reason: 'baseline typed wrongly' }
    const late = trialInput(world.episode.id, { observed: at(minute(-29)), amends })
    expectRefusal(() => startTrial(ctx, late), 'INVALID', 'observed.time', /observed at 07:30/)
    const amended = startTrial(ctx, trialInput(world.episode.id, { baseline: { ...CALM, heartRatePerMin: 100 }, amends }))
    expect(amended.trialId).toBe(trialId)
    expectRefusal(() => startTrial(ctx, trialInput(world.episode.id, { amends })), 'CONFLICT')
    expect(rowsOf(world)).toHaveLength(2)
  })
})

describe('startTrialSchema', () => {
  const base = trialInput('e')
  const fieldsOf = (over: object) => {
    const parsed = startTrialSchema.safeParse({ ...base, ...over })
    return parsed.success ? [] : parsed.error.issues.map((issue) => issue.path.join('.'))
  }
  it.each([
    ['a T-piece with pressures', { technique: 't_piece' }, ['pressureSupportCmH2O', 'peepCmH2O']],
    ['CPAP without PEEP', { technique: 'cpap', pressureSupportCmH2O: null, peepCmH2O: null }, ['peepCmH2O']],
    ['CPAP with pressure support', { technique: 'cpap' }, ['pressureSupportCmH2O']],
    ['pressure support without its pressure', { pressureSupportCmH2O: null }, ['pressureSupportCmH2O']],
    ['pressure support without PEEP', { peepCmH2O: null }, ['peepCmH2O']],
    ['a baseline without a respiratory rate', { baseline: { ...CALM, breathsPerMin: null } }, ['baseline.breathsPerMin']],
    ['FiO2 in percent', { fio2Fraction: 40 }, ['fio2Fraction']],
    ['half a minute', { plannedDurationMin: 30.5 }, ['plannedDurationMin']],
    ['a tidal volume in litres', { baseline: { ...CALM, tidalVolumeMl: 0.4 } }, ['baseline.tidalVolumeMl']],
    ['an unusual heart rate not looked at twice', { baseline: { ...CALM, heartRatePerMin: 185 } }, ['baseline.heartRatePerMin']],
  ])('refuses %s', (_title, over, fields) => {
    expect(fieldsOf(over)).toEqual(fields)
  })
  it('takes a T-piece without pressures, and CPAP with PEEP', () => {
    expect(fieldsOf({ technique: 't_piece', pressureSupportCmH2O: null, peepCmH2O: null })).toEqual([])
    expect(fieldsOf({ technique: 'cpap', pressureSupportCmH2O: null, peepCmH2O: 5 })).toEqual([])
  })
})
