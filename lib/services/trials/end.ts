import 'server-only'
import type { Tx } from '@/db/client'
import { findTrialEndVersion, insertTrialEnd, insertTrialObservation, listTrialObservations } from '@/db/queries/trials'
import type { trialObservations } from '@/db/schema'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { EndedTrialDto, EndTrialInput } from '@/lib/schemas/trials'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { newId } from '@/lib/shared/ids'
import { MINUTE_MS } from '@/lib/shared/time'
import type { BedsideSign } from '@/lib/weaning/vocabulary'
import { TRIAL_OUTCOME_WORDS } from '@/lib/weaning/words'
import { placeEntry } from '../entries/place-entry'
import { idsOfRulesMet, joinNamedRules, nameRules } from '../steps/judged-rules'
import { refuseEndTooEarly } from '../steps/refuse-outside-step'
import { refuseOverlap } from '../steps/refuse-overlap'
import { listTrialIntervals, trialAtHand } from './trial-at-hand'

type AtHand = ReturnType<typeof trialAtHand>
type Columns = ReturnType<typeof placeEntry>['columns']

/**
 * Records how a breathing trial ended. Signs given with the end are kept as a last observation at that moment, and count. A pass before the
 * planned end, with a stop rule met or without any look on record takes a reason.
 */
export function endTrial(ctx: Ctx, input: EndTrialInput): EndedTrialDto {
  const found = authorize(ctx, 'trial.end', { episodeId: input.episodeId })
  return once(ctx, 'trial.end', input, (tx) => {
    const { observed, amends, outcome, returnedTo, reason } = input
    const atHand = trialAtHand(tx, found.episode.id, input.trialId)
    const { trial, end, protocol } = atHand
    const words = { timeZone: found.unit.timeZone, now: ctx.now }
    if (!amends) refuseEndedTwice(end, words)
    const earlier = amends ? findTrialEndVersion(tx, amends.id) : undefined
    if (earlier && earlier.row.trialId !== trial.row.entryId)
      throw new AppError('NOT_FOUND', 'The entry to correct was not found.')
    const { columns } = placeEntry(tx, ctx, found, { observed, amends, findAmended: () => earlier })
    const startMs = trial.row.observedAt
    const lastLookMs = atHand.observations.at(-1)?.row.observedAt ?? null
    refuseEndTooEarly(columns.observedAt, { startMs, lastLookMs }, { what: 'trial', ...words })
    const own = { entryId: trial.row.entryId, startMs, endMs: columns.observedAt }
    refuseOverlap(own, listTrialIntervals(tx, found.episode.id), { what: 'a breathing trial', ...words })
    const place = { ...columns, protocolVersionId: protocol.id, trialId: trial.row.entryId }
    if (input.signs.length > 0) recordSigns(tx, ctx, place, input.signs)
    const observations = listTrialObservations(tx, [trial.row.entryId])
    const rules = protocol.content.trial.stopRules
    const met = idsOfRulesMet(rules, trial.row.baseline, observations, Math.max(columns.observedAt, lastLookMs ?? 0))
    const rulesMet = joinNamedRules(rules, met, input.rulesMet)
    requireGrounds({ ...atHand, observations }, input, {
      endedAt: columns.observedAt,
      rulesMet,
      timeZone: words.timeZone,
      now: ctx.now,
    })
    const row = insertTrialEnd(tx, { ...place, outcome, rulesMet, returnedTo, reason })
    const action = amends ? 'trial.amend_end' : 'trial.end'
    writeAudit(tx, ctx, { action, unitId: columns.unitId, subject: { kind: 'trial_end', id: row.id }, after: row })
    return { id: row.id, outcome: row.outcome }
  })
}

function refuseEndedTwice(end: AtHand['end'], { timeZone, now }: { timeZone: string; now: number }): void {
  if (!end) return
  const at = formatTime(end.row.observedAt, timeZone, now)
  const result = TRIAL_OUTCOME_WORDS[end.row.outcome]
  throw new AppError(
    'CONFLICT',
    `${end.recordedByName} recorded the end of this trial at ${at}: ${result}. Nothing was recorded.`,
  )
}

/** The signs seen at the end, as an observation of that moment by the same person. */
function recordSigns(tx: Tx, ctx: Ctx, place: Columns & { trialId: string }, signs: BedsideSign[]): void {
  const id = newId()
  const first = { id, entryId: id, entryVersion: 1, supersedesId: null, amendReason: null }
  const row: typeof trialObservations.$inferInsert = { ...place, ...first, readings: { ...NO_NUMBERS, signs } }
  insertTrialObservation(tx, row)
  writeAudit(tx, ctx, { action: 'trial.observe', unitId: place.unitId, subject: { kind: 'trial_observation', id }, after: row })
}

const NO_NUMBERS = {
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
}

/** An outcome that the record does not bear out needs a reason in words. */
function requireGrounds(
  { trial, observations, protocol }: AtHand,
  { outcome, reason }: EndTrialInput,
  { endedAt, rulesMet, timeZone, now }: { endedAt: number; rulesMet: string[]; timeZone: string; now: number },
): void {
  if ((reason ?? '').length >= 3) return
  if (outcome === 'failed' && rulesMet.length === 0) {
    throw invalidField('rulesMet', 'No stop rule is met so far. Say which one was, or give the reason in words.')
  }
  if (outcome !== 'passed') return
  if (rulesMet.length > 0) {
    const named = nameRules(protocol.content.trial.stopRules, rulesMet).map(({ words }) => words)
    throw invalidField('reason', `A stop rule was met: ${named.join('; ')}. Say why the trial still counts as passed.`)
  }
  const plannedEndMs = trial.row.observedAt + trial.row.plannedDurationMin * MINUTE_MS
  if (endedAt < plannedEndMs) {
    const planned = formatTime(plannedEndMs, timeZone, now)
    throw invalidField('reason', `The planned end is ${planned}. Say why the trial counts as passed before it.`)
  }
  const isLookedAt = observations.some(({ row }) => row.readings.breathsPerMin !== null || row.readings.spo2Percent !== null)
  if (!isLookedAt) {
    throw invalidField(
      'reason',
      'No look with a respiratory rate or SpO2 stands in the record. Record the last one first, or say why.',
    )
  }
}
