import 'server-only'
import type { Tx } from '@/db/client'
import { findBedLabel, findLatestGasOfEpisode } from '@/db/queries/steps'
import { findLatestSettings } from '@/db/queries/settings'
import { findProtocolInForce } from '@/db/queries/protocols'
import type { EpisodeInUnit } from '@/lib/access/door'
import { mayInUnit, type Action } from '@/lib/access/policy'
import { writeAudit } from '@/lib/server/audit'
import type { Actor, Ctx } from '@/lib/server/ctx'
import type { PatientLineDto, PrefillDto, StepFormDto } from '@/lib/schemas/step-form'
import { AppError } from '@/lib/shared/errors'
import { ageYears, localDay } from '@/lib/shared/time'
import { ventilatorDayNumber } from '@/lib/weaning/course/ventilator-day-number'
import { isAdult } from '@/lib/weaning/indices/is-adult'
import { predictedBodyWeight } from '@/lib/weaning/indices/predicted-body-weight'
import { readNextMove } from '../today/read-next-move'
import { toWallClock } from './to-wall-clock'

/**
 * What the pages of all steps have in common, and the protocol in force now. The caller has been through the door with patient.read; a
 * reader through a record opening leaves an audit row at each read.
 */
// no-door: each page's own read goes through it and passes on what it handed out.
export function readStepForm(ctx: Ctx, found: EpisodeInUnit) {
  if (found.isOpening) auditOpening(ctx, found)
  const { unit, episode } = found
  const inForce = findProtocolInForce(ctx.db, unit.id, ctx.now)
  if (!inForce) throw new AppError('PRECONDITION', 'This unit has no protocol yet. An administrator sets the unit up first.')
  const base: Omit<StepFormDto, 'protocol' | 'seenLatestId'> = {
    patient: toPatientLine(ctx, found),
    prefill: readPrefill(ctx.db, episode.id),
    move: readNextMove(ctx.db, found, ctx.now),
    nowMs: ctx.now,
    wallClock: toWallClock(ctx.now, unit.timeZone),
    ventilatorDay: localDay(ctx.now, unit.timeZone),
  }
  return { inForce, base }
}

function auditOpening(ctx: Ctx, { unit, patient }: EpisodeInUnit): void {
  ctx.db.transaction(
    (tx) =>
      writeAudit(tx, ctx, { action: 'patient.read_by_opening', unitId: unit.id, subject: { kind: 'patient', id: patient.id } }),
    { behavior: 'immediate' },
  )
}

function toPatientLine(ctx: Ctx, { patient, episode, unit, stay }: EpisodeInUnit): PatientLineDto {
  const day = localDay(ctx.now, unit.timeZone)
  const age = ageYears(patient.birthDate, day)
  const isGrown = isAdult(age)
  const weight = predictedBodyWeight({ sex: patient.sex, heightCm: patient.heightCm, isAdult: isGrown })
  const lastDay = episode.endedAt === null ? day : localDay(episode.endedAt, unit.timeZone)
  return {
    patientId: patient.id,
    episodeId: episode.id,
    unitId: unit.id,
    unitName: unit.name,
    timeZone: unit.timeZone,
    bedLabel: findBedLabel(ctx.db, stay.bedId) ?? '',
    familyName: patient.familyName,
    givenName: patient.givenName,
    sex: patient.sex,
    ageYears: age,
    isAdult: isGrown,
    heightCm: patient.heightCm,
    weightKg: patient.weightKg,
    predictedBodyWeightKg: weight.known ? weight.value : null,
    ventilatorDayNumber: ventilatorDayNumber(localDay(episode.startedAt, unit.timeZone), lastDay),
    airway: episode.airway,
    episodeStartedAt: episode.startedAt,
    episodeEndedAt: episode.endedAt,
  }
}

/** The settings and the gas last observed, with their times. */
export function readPrefill(tx: Tx, episodeId: string): PrefillDto {
  const settings = findLatestSettings(tx, episodeId)
  const gas = findLatestGasOfEpisode(tx, episodeId)
  return {
    settings: settings
      ? {
          observedAt: settings.observedAt,
          mode: settings.mode,
          fio2Fraction: settings.fio2Fraction,
          peepCmH2O: settings.peepCmH2O,
          pressureSupportCmH2O: settings.pressureSupportCmH2O,
          measuredRatePerMin: settings.measuredRatePerMin,
          measuredTidalVolumeMl: settings.measuredTidalVolumeMl,
          spo2Percent: settings.spo2Percent,
        }
      : null,
    gas: gas
      ? {
          observedAt: gas.observedAt,
          ph: gas.ph,
          paCO2MmHg: gas.paCO2MmHg,
          paO2MmHg: gas.paO2MmHg,
          fio2Fraction: gas.fio2Fraction,
          haemoglobinGPerDl: gas.haemoglobinGPerDl,
        }
      : null,
  }
}

/** Whether the reader's role in the patient's unit allows an action. Comfort for the page; the verb decides. */
export function mayHere(actor: Actor, found: EpisodeInUnit, action: Action): boolean {
  return actor.kind === 'person' && !found.isOpening && mayInUnit(actor.memberships, action, found.unit.id)
}

/** Whether the reader may correct an entry: its author or a physician of the unit, and only with the role for the step. */
export function mayAmend(actor: Actor, found: EpisodeInUnit, action: Action, recordedBy: string): boolean {
  if (actor.kind !== 'person' || !mayHere(actor, found, action)) return false
  const isPhysician = actor.memberships.some((held) => held.unitId === found.unit.id && held.role === 'physician')
  return isPhysician || actor.personId === recordedBy
}
