import 'server-only'
import type { Tx } from '@/db/client'
import { listDayEntries } from '@/db/queries/day-entries'
import { insertTrialEnd } from '@/db/queries/trials'
import type { EpisodeInUnit } from '@/lib/access/door'
import type { EndEpisodeInput } from '@/lib/schemas/episodes'
import type { ObservedInput } from '@/lib/schemas/observed'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { invalidField } from '@/lib/shared/errors'
import { localDay, MINUTE_MS } from '@/lib/shared/time'
import { placeEntry } from '../entries/place-entry'
import { findUnitProtocol } from '../today/find-unit-protocol'
import { groupDayEntries, toDayRecord } from '../today/to-day-record'

/**
 * A planned extubation that finds a trial still running says in the same form how it ended; nothing is ended silently. Refuses at
 * `trialEnd` when that is missing, and asks for a reason where the trial's own page would ask for one.
 */
// no-door: called by episodes/end inside its own transaction, after its door
export function endRunningTrial(
  tx: Tx,
  ctx: Ctx,
  found: EpisodeInUnit,
  observed: ObservedInput,
  at: number,
  trialEnd: EndEpisodeInput['trialEnd'],
): void {
  const { episode, unit } = found
  const entries = listDayEntries(tx, [episode.id], localDay(at, unit.timeZone), at)
  const trial = entries.trials.find((row) => !entries.trialEnds.some((end) => end.trialId === row.entryId))
  if (!trial) return
  if (!trialEnd) throw invalidField('trialEnd.outcome', 'A breathing trial is running. Say how it ended.')
  const { find } = findUnitProtocol(tx, unit.id, ctx.now)
  const record = toDayRecord(episode, true, groupDayEntries(entries), find, at)
  const rulesMet = record.trials.find((one) => one.endedMs === null)?.stopRulesMet ?? []
  const isShort = at < trial.observedAt + trial.plannedDurationMin * MINUTE_MS
  const needsReason = trialEnd.outcome !== 'passed' || rulesMet.length > 0 || isShort
  if (needsReason && (trialEnd.reason ?? '').length < 3)
    throw invalidField('trialEnd.reason', reasonQuestion(trialEnd.outcome, rulesMet.length > 0))
  const { columns } = placeEntry(tx, ctx, found, { observed })
  const row = insertTrialEnd(tx, {
    ...columns,
    protocolVersionId: trial.protocolVersionId,
    trialId: trial.entryId,
    outcome: trialEnd.outcome,
    rulesMet,
    returnedTo: 'Extubated',
    reason: trialEnd.reason ?? null,
  })
  writeAudit(tx, ctx, { action: 'trial.end', unitId: columns.unitId, subject: { kind: 'trial_end', id: row.id }, after: row })
}

function reasonQuestion(outcome: 'passed' | 'failed' | 'stopped', isRuleMet: boolean): string {
  if (outcome !== 'passed') return 'Say in a few words why the patient is extubated after a trial that was not passed.'
  if (isRuleMet) return 'A stop criterion was met in this trial. Say why it counts as passed.'
  return 'The planned length is not over. Say why the trial counts as passed.'
}
