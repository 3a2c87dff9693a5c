import type { Db } from '@/db/client'
import { screens, trialEnds, trials } from '@/db/schema'
import type { ScreenResult } from '@/lib/weaning/vocabulary'
import { entryPlace } from './factories'

type Place = Parameters<typeof entryPlace>[1]

/** A recorded screen of which only the result matters. */
export function addScreen(
  db: Db,
  episode: { id: string },
  place: Place,
  over: { result: Exclude<ScreenResult, 'excused'>; observedAt: number },
) {
  return db
    .insert(screens)
    .values({
      ...entryPlace(episode, place, over.observedAt),
      result: over.result,
      verdict: { result: over.result, criteria: [], ruleSet: 'test' },
    })
    .returning()
    .get()
}

/** A trial that was recorded as passed. */
export function addPassedTrial(db: Db, episode: { id: string }, place: Place, over: { startedAt: number; endedAt: number }) {
  const trial = db
    .insert(trials)
    .values({
      ...entryPlace(episode, place, over.startedAt),
      technique: 't_piece',
      fio2Fraction: 0.4,
      plannedDurationMin: 30,
      baseline: {
        breathsPerMin: 18,
        tidalVolumeMl: 420,
        spo2Percent: 96,
        heartRatePerMin: 84,
        systolicMmHg: 124,
        diastolicMmHg: 70,
        rass: 0,
        paCO2MmHg: null,
        paO2MmHg: null,
        ph: null,
        signs: [],
      },
    })
    .returning()
    .get()
  db.insert(trialEnds)
    .values({
      ...entryPlace(episode, place, over.endedAt),
      trialId: trial.id,
      outcome: 'passed',
      rulesMet: [],
      returnedTo: 'PC-CSV, as before',
    })
    .run()
  return trial
}
