import 'server-only'
import { and, asc, between, eq, exists, gt, inArray, isNotNull, isNull, lte, ne, or, sql } from 'drizzle-orm'
import { alias } from 'drizzle-orm/sqlite-core'
import type { Tx } from '../client'
import { airwayEvents, episodes, patients, protocolVersions, screens, stays, trialEnds, trials } from '../schema'
import { isCurrent } from './current'

const extubations = alias(airwayEvents, 'extubations')
const ofUnit = alias(stays, 'of_unit')
const ofEpisode = alias(episodes, 'of_episode')
const elsewhere = alias(stays, 'elsewhere')

/** Half-open period in UTC milliseconds, and its first and last calendar day in the unit's zone. */
export type ReviewPeriod = { unitId: string; fromMs: number; toMs: number; firstDay: string; lastDay: string }

const wasInUnit = (
  tx: Tx,
  patientId: typeof stays.patientId | typeof episodes.patientId,
  { unitId, fromMs, toMs }: ReviewPeriod,
) =>
  exists(
    tx
      .select({ one: sql`1` })
      .from(ofUnit)
      .where(
        and(
          eq(ofUnit.patientId, patientId),
          eq(ofUnit.unitId, unitId),
          lte(ofUnit.startedAt, toMs),
          or(isNull(ofUnit.endedAt), gt(ofUnit.endedAt, fromMs)),
        ),
      ),
  )

/** Stays in every unit of the patients who were in this one during the period. */
export function listStaysForReview(tx: Tx, period: ReviewPeriod) {
  return tx
    .select({ patientId: stays.patientId, unitId: stays.unitId, startMs: stays.startedAt, endMs: stays.endedAt })
    .from(stays)
    .where(
      and(
        lte(stays.startedAt, period.toMs),
        or(isNull(stays.endedAt), gt(stays.endedAt, period.fromMs)),
        wasInUnit(tx, stays.patientId, period),
      ),
    )
    .all()
}

/** Episodes that touch the period, of the patients who were in the unit during it. */
export function listEpisodesForReview(tx: Tx, period: ReviewPeriod) {
  return tx
    .select({
      episodeId: episodes.id,
      patientId: episodes.patientId,
      startMs: episodes.startedAt,
      endMs: episodes.endedAt,
      birthDate: patients.birthDate,
    })
    .from(episodes)
    .innerJoin(patients, eq(patients.id, episodes.patientId))
    .where(
      and(
        lte(episodes.startedAt, period.toMs),
        or(isNull(episodes.endedAt), gt(episodes.endedAt, period.fromMs)),
        wasInUnit(tx, episodes.patientId, period),
      ),
    )
    .all()
}

/** Ids that a newer version supersedes: few beside all rows, so they are read once for a statement instead of looked up for each row. */
const isNotSuperseded = (table: typeof screens | typeof trials | typeof airwayEvents) =>
  sql`${table.id} not in (select supersedes_id from ${table} old where old.supersedes_id is not null)`

const screenColumns = {
  episodeId: screens.episodeId,
  ventilatorDay: screens.ventilatorDay,
  observedMs: screens.observedAt,
  result: screens.result,
}

/** Screens of the period, current versions: those made in the unit, and those that its patients had in another unit before or after a move. */
export function listScreensForReview(tx: Tx, period: ReviewPeriod) {
  const isOfPeriod = and(
    between(screens.ventilatorDay, period.firstDay, period.lastDay),
    eq(screens.isWithdrawn, false),
    isNotSuperseded(screens),
  )
  const here = tx
    .select(screenColumns)
    .from(screens)
    .where(and(eq(screens.unitId, period.unitId), isOfPeriod))
    .all()
  const movedPatients = tx
    .selectDistinct({ patientId: ofUnit.patientId })
    .from(ofUnit)
    .innerJoin(elsewhere, and(eq(elsewhere.patientId, ofUnit.patientId), ne(elsewhere.unitId, ofUnit.unitId)))
    .where(
      and(
        eq(ofUnit.unitId, period.unitId),
        lte(ofUnit.startedAt, period.toMs),
        or(isNull(ofUnit.endedAt), gt(ofUnit.endedAt, period.fromMs)),
      ),
    )
  const there = tx
    .select(screenColumns)
    .from(episodes)
    .innerJoin(screens, eq(screens.episodeId, episodes.id))
    .where(and(inArray(episodes.patientId, movedPatients), ne(screens.unitId, period.unitId), isOfPeriod))
    .all()
  return [...here, ...there]
}

/** Trials that began in the unit during the period, current versions, with their outcome; null while a trial runs. */
export function listTrialsForReview(tx: Tx, period: ReviewPeriod) {
  return tx
    .select({ ventilatorDay: trials.ventilatorDay, outcome: trialEnds.outcome })
    .from(trials)
    .leftJoin(trialEnds, and(eq(trialEnds.trialId, trials.entryId), isCurrent(trialEnds)))
    .where(
      and(
        eq(trials.unitId, period.unitId),
        between(trials.ventilatorDay, period.firstDay, period.lastDay),
        eq(trials.isWithdrawn, false),
        isNotSuperseded(trials),
      ),
    )
    .all()
}

/** Airway events in every unit, current versions, of the patients who were extubated in this unit during the period. */
export function listAirwayEventsForReview(tx: Tx, period: ReviewPeriod) {
  const extubatedHere = tx
    .selectDistinct({ patientId: ofEpisode.patientId })
    .from(extubations)
    .innerJoin(ofEpisode, eq(ofEpisode.id, extubations.episodeId))
    .where(
      and(
        eq(extubations.unitId, period.unitId),
        between(extubations.observedAt, period.fromMs, period.toMs),
        inArray(extubations.event, ['extubated', 'self_extubated', 'accidentally_extubated']),
      ),
    )
  return tx
    .select({
      patientId: episodes.patientId,
      unitId: airwayEvents.unitId,
      ventilatorDay: airwayEvents.ventilatorDay,
      observedMs: airwayEvents.observedAt,
      event: airwayEvents.event,
    })
    .from(episodes)
    .innerJoin(airwayEvents, eq(airwayEvents.episodeId, episodes.id))
    .where(and(inArray(episodes.patientId, extubatedHere), eq(airwayEvents.isWithdrawn, false), isNotSuperseded(airwayEvents)))
    .all()
}

/** The versions of the unit's protocol that were ever in force, oldest start first, with the end of their screening window. */
export function listScreeningWindows(tx: Tx, unitId: string) {
  const closesMin = sql<number>`json_extract(${protocolVersions.content}, '$.screeningWindow.closesMin')`
  return tx
    .select({ startsAt: protocolVersions.startsAt, closesMin })
    .from(protocolVersions)
    .where(
      and(eq(protocolVersions.unitId, unitId), or(isNotNull(protocolVersions.approvedAt), eq(protocolVersions.isDefault, true))),
    )
    .orderBy(asc(protocolVersions.startsAt), asc(protocolVersions.number))
    .all()
}
