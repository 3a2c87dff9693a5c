import 'server-only'
import type { Tx } from '@/db/client'
import { listDayEntries } from '@/db/queries/day-entries'
import type { EpisodeInUnit } from '@/lib/access/door'
import { ageYears, localDay, shiftDay } from '@/lib/shared/time'
import type { DayRecord, NextMove } from '@/lib/weaning/day-record'
import { isAdult } from '@/lib/weaning/indices/is-adult'
import { nextMove } from '@/lib/weaning/next-move'
import { makeDayClock } from './day-clock'
import { findUnitProtocol } from './find-unit-protocol'
import { LONGEST_DAY_MS } from './since-day'
import { groupDayEntries, toDayRecord, type FindProtocol } from './to-day-record'

/** The part of what the door hands out that is needed here. */
export type EpisodeAtHand = Pick<EpisodeInUnit, 'episode' | 'patient' | 'unit'>

/** The episode's record of today and yesterday (and what still runs), as the core takes it. Sees what its transaction wrote. */
export function readDayRecord(tx: Tx, found: EpisodeAtHand, now: number, findProtocol?: FindProtocol): DayRecord {
  const { episode, patient, unit } = found
  const day = localDay(now, unit.timeZone)
  const entries = listDayEntries(tx, [episode.id], shiftDay(day, -1), now - LONGEST_DAY_MS)
  const find = findProtocol ?? findUnitProtocol(tx, unit.id, now).find
  return toDayRecord(episode, isAdult(ageYears(patient.birthDate, day)), groupDayEntries(entries), find, now)
}

/** The next move of one episode by the protocol in force now in the patient's unit. */
export function readNextMove(tx: Tx, found: EpisodeAtHand, now: number): NextMove {
  const { inForce, find } = findUnitProtocol(tx, found.unit.id, now)
  const clock = makeDayClock(now, found.unit.timeZone, inForce.content.screeningWindow)
  return nextMove({ protocol: inForce.content, record: readDayRecord(tx, found, now, find), clock })
}
