import type { Db } from '@/db/client'
import { protocolVersions } from '@/db/schema'
import {
  endHoldSchema,
  observeHoldSchema,
  startHoldSchema,
  type EndHoldInput,
  type ObserveHoldInput,
  type StartHoldInput,
} from '@/lib/schemas/holds'
import { recordScreenSchema, type RecordScreenInput } from '@/lib/schemas/screens'
import {
  endTrialSchema,
  observeTrialSchema,
  startTrialSchema,
  type EndTrialInput,
  type ObserveTrialInput,
  type StartTrialInput,
} from '@/lib/schemas/trials'
import { recordHoldStart } from '@/lib/services/holds/record-start'
import { recordScreen } from '@/lib/services/screens/record'
import { startTrial } from '@/lib/services/trials/start'
import { newId } from '@/lib/shared/ids'
import { MINUTE_MS } from '@/lib/shared/time'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import type { ProtocolContent } from '@/lib/weaning/protocol'
import type { ObservedReadings, ScreenReadings } from '@/lib/weaning/readings'
import { makeCtx, NOW, type makeWorld } from './factories'
import { at } from './verb-checks'

type World = ReturnType<typeof makeWorld>
/** Minutes before (negative) or after 08:00 of the test day. */
export const minute = (minutes: number) => NOW + minutes * MINUTE_MS

export const NOT_ASSESSED: ScreenReadings = {
  fio2Fraction: null,
  peepCmH2O: null,
  norepinephrineMcgPerKgMin: null,
  otherVasopressor: null,
  ischaemia: null,
  spo2Percent: null,
  paO2MmHg: null,
  paO2FiO2Fraction: null,
  ph: null,
  spontaneousEffort: null,
  cough: null,
  secretions: null,
  rass: null,
  raisedIcp: null,
  neuromuscularBlockade: null,
  temperatureC: null,
  haemoglobinGPerDl: null,
  causeImproving: null,
  breathsPerMin: null,
  tidalVolumeMl: null,
  rsbiCondition: null,
}
/** Meets every criterion of the default protocol. */
export const READY: ScreenReadings = {
  ...NOT_ASSESSED,
  fio2Fraction: 0.4,
  peepCmH2O: 6,
  norepinephrineMcgPerKgMin: 0,
  otherVasopressor: false,
  ischaemia: false,
}
export const NOTHING_SEEN: ObservedReadings = {
  breathsPerMin: null,
  tidalVolumeMl: null,
  spo2Percent: null,
  heartRatePerMin: null,
  systolicMmHg: null,
  diastolicMmHg: null,
  rass: null,
  paCO2MmHg: null,
  paO2MmHg: null,
  ph: null,
  signs: [],
}
export const CALM: ObservedReadings & { breathsPerMin: number; spo2Percent: number; heartRatePerMin: number } = {
  ...NOTHING_SEEN,
  breathsPerMin: 20,
  tidalVolumeMl: 400,
  spo2Percent: 96,
  heartRatePerMin: 88,
  systolicMmHg: 130,
  diastolicMmHg: 72,
  rass: 0,
}
export const ALL_SAFE = {
  active_seizures: false,
  alcohol_withdrawal: false,
  rising_dose_for_agitation: false,
  neuromuscular_blockade: false,
  ischaemia_24h: false,
  raised_icp: false,
}
export const PROPOFOL = { drug: 'propofol', rate: 30, unit: 'mL/h', purpose: 'sedation' } as const
export const FENTANYL_FOR_PAIN = { drug: 'fentanyl', rate: 50, unit: 'µg/h', purpose: 'pain' } as const

// Each input goes through its schema, as it would from a form.
export const screenInput = (episodeId: string, over: Partial<RecordScreenInput> = {}): RecordScreenInput =>
  recordScreenSchema.parse({
    episodeId,
    observed: at(minute(-60)),
    amends: null,
    seenLatestId: null,
    excuse: null,
    note: null,
    readings: READY,
    ...over,
  })

export const holdInput = (episodeId: string, over: Partial<StartHoldInput> = {}): StartHoldInput =>
  startHoldSchema.parse({
    episodeId,
    observed: at(minute(-50)),
    amends: null,
    seenLatestId: null,
    start: 'started',
    safety: ALL_SAFE,
    infusions: [PROPOFOL, FENTANYL_FOR_PAIN],
    note: null,
    ...over,
  })

export const holdLook = (episodeId: string, holdId: string, over: Partial<ObserveHoldInput> = {}): ObserveHoldInput =>
  observeHoldSchema.parse({
    episodeId,
    holdId,
    observed: at(minute(-40)),
    amends: null,
    readings: CALM,
    opensEyesToVoice: null,
    ...over,
  })

export const holdEnd = (episodeId: string, holdId: string, over: Partial<EndHoldInput> = {}): EndHoldInput =>
  endHoldSchema.parse({
    episodeId,
    holdId,
    observed: at(minute(-20)),
    amends: null,
    outcome: 'tolerated',
    rulesMet: [],
    note: null,
    ...over,
  })

export const trialInput = (episodeId: string, over: Partial<StartTrialInput> = {}): StartTrialInput =>
  startTrialSchema.parse({
    episodeId,
    observed: at(minute(-40)),
    amends: null,
    seenLatestId: null,
    technique: 'pressure_support',
    pressureSupportCmH2O: 8,
    peepCmH2O: 5,
    fio2Fraction: 0.4,
    plannedDurationMin: 30,
    baseline: CALM,
    startedAnywayBecause: null,
    ...over,
  })

export const trialLook = (episodeId: string, trialId: string, over: Partial<ObserveTrialInput> = {}): ObserveTrialInput =>
  observeTrialSchema.parse({ episodeId, trialId, observed: at(minute(-30)), amends: null, readings: CALM, ...over })

export const trialEnd = (episodeId: string, trialId: string, over: Partial<EndTrialInput> = {}): EndTrialInput =>
  endTrialSchema.parse({
    episodeId,
    trialId,
    observed: at(minute(-10)),
    amends: null,
    outcome: 'passed',
    rulesMet: [],
    signs: [],
    returnedTo: '',
    reason: null,
    ...over,
  })

/** A ready screen at 07:00 by the respiratory therapist. */
export function screened(world: World) {
  return recordScreen(makeCtx(world.db, world.rt), screenInput(world.episode.id))
}

/** A hold by the nurse that started at 07:10 and runs. */
export function heldSince(world: World, at0710 = minute(-50)) {
  return recordHoldStart(makeCtx(world.db, world.nurse), holdInput(world.episode.id, { observed: at(at0710) }))
}

/** Ready screen at 07:00, and no sedation to hold. */
export function readyForTrial(world: World) {
  screened(world)
  recordHoldStart(
    makeCtx(world.db, world.nurse),
    holdInput(world.episode.id, { observed: at(minute(-55)), start: 'not_needed', safety: null, infusions: [] }),
  )
}

/** A trial that began at 07:20 after a ready screen and no need for a hold. */
export function onTrial(world: World) {
  readyForTrial(world)
  return startTrial(makeCtx(world.db, world.rt), trialInput(world.episode.id))
}

/** A later protocol version of the medical unit in force from a moment. */
export function addVersion(db: Db, world: World, content: ProtocolContent, startsAt: number) {
  return db
    .insert(protocolVersions)
    .values({
      id: newId(),
      unitId: world.medical.unit.id,
      number: 2,
      content,
      note: 'Changed',
      draftedAt: startsAt,
      draftedBy: world.lead.id,
      approvedAt: startsAt,
      approvedBy: world.physician.id,
      startsAt,
    })
    .returning()
    .get()
}

/** The default protocol with another FiO2 limit. */
export function withFio2Limit(value: number): ProtocolContent {
  return {
    ...defaultProtocol,
    screen: defaultProtocol.screen.map((rule) =>
      rule.kind === 'number' && rule.criterion === 'fio2'
        ? { ...rule, limits: [{ comparator: 'atMost' as const, value }] }
        : rule,
    ),
  }
}
