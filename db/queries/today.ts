import 'server-only'
import { and, asc, eq, gte, isNull, notExists, or, sql } from 'drizzle-orm'
import type { Tx } from '../client'
import { beds, episodes, patients, settings, stays } from '../schema'
import { preparedOnce } from './prepared'

function prepareStatements(tx: Tx) {
  return {
    patients: tx
      .select({
        patientId: patients.id,
        familyName: patients.familyName,
        givenName: patients.givenName,
        birthDate: patients.birthDate,
        bedLabel: beds.label,
        bedOrder: beds.sortOrder,
        episode: {
          id: episodes.id,
          startedAt: episodes.startedAt,
          endedAt: episodes.endedAt,
          end: episodes.end,
          airway: episodes.airway,
        },
      })
      .from(stays)
      .innerJoin(beds, eq(beds.id, stays.bedId))
      .innerJoin(patients, eq(patients.id, stays.patientId))
      .innerJoin(
        episodes,
        and(
          eq(episodes.patientId, stays.patientId),
          or(isNull(episodes.endedAt), gte(episodes.endedAt, sql.placeholder('endedSince'))),
        ),
      )
      .where(and(eq(stays.unitId, sql.placeholder('unitId')), isNull(stays.endedAt)))
      .orderBy(asc(beds.sortOrder), asc(episodes.startedAt))
      .prepare(),
    // For each episode the version last observed: one step down the index, whatever the length of its history.
    latestSettings: tx
      .select({
        episodeId: settings.episodeId,
        mode: settings.mode,
        fio2Fraction: settings.fio2Fraction,
        peepCmH2O: settings.peepCmH2O,
        observedAt: settings.observedAt,
      })
      .from(settings)
      .where(
        sql`${settings.id} in (
      select (select s.id from ${settings} s where s.episode_id = given.value and s.is_withdrawn = 0
        and not exists (select 1 from ${settings} newer where newer.supersedes_id = s.id)
        order by s.observed_at desc, s.recorded_at desc limit 1)
      from json_each(${sql.placeholder('ids')}) given)`,
      )
      .prepare(),
    freeBeds: tx
      .select({ id: beds.id, label: beds.label })
      .from(beds)
      .where(
        and(
          eq(beds.unitId, sql.placeholder('unitId')),
          isNull(beds.retiredAt),
          notExists(
            tx
              .select({ id: stays.id })
              .from(stays)
              .where(and(eq(stays.bedId, beds.id), isNull(stays.endedAt))),
          ),
        ),
      )
      .orderBy(asc(beds.sortOrder))
      .prepare(),
  }
}

const statementsOf = preparedOnce(prepareStatements)

/** Patients now in the unit with their open episode, or with one that ended since a moment; in bed order, earlier episodes first. */
export function listVentilatedOfUnit(tx: Tx, unitId: string, endedSince: number) {
  return statementsOf(tx).patients.all({ unitId, endedSince })
}

/** The settings last observed in each episode, current versions only. */
export function listLatestSettings(tx: Tx, episodeIds: readonly string[]) {
  return statementsOf(tx).latestSettings.all({ ids: JSON.stringify(episodeIds) })
}

/** Beds in use that nobody lies in now, in bed order. */
export function listFreeBeds(tx: Tx, unitId: string) {
  return statementsOf(tx).freeBeds.all({ unitId })
}
