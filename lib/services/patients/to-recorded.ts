import type { AllVersions } from '@/db/queries/patient-record'
import type { RecordedDto, RecordedKind } from '@/lib/schemas/patient-page'
import type { EntryDto } from '@/lib/schemas/observed'
import { groupBy } from '@/lib/shared/group-by'
import type { Action } from '@/lib/access/policy'
import { toEntryDto } from '../entries/to-entry-dto'
import { toSettingsValues } from '../settings/to-values'

export type Naming = {
  personName: (personId: string) => string
  protocolNumber: (protocolVersionId: string) => number
  mayAmend: (action: Action, recordedBy: string) => boolean
  /** Recorded rule ids in words of the version that judged them. */
  ruleWords: (step: 'hold' | 'trial', protocolVersionId: string, ids: readonly string[]) => string[]
}

type VersionRow = {
  id: string
  entryId: string
  entryVersion: number
  amendReason: string | null
  isWithdrawn: boolean
  observedAt: number
  recordedAt: number
  recordedBy: string
  ventilatorDay: string
  protocolVersionId: string
}

const ACTION_OF: Record<RecordedKind, Action> = {
  settings: 'settings.record',
  gas: 'gas.record',
  airway: 'airway.record',
  screen: 'screen.record',
  hold: 'hold.start',
  hold_observation: 'hold.observe',
  hold_end: 'hold.end',
  trial: 'trial.start',
  trial_observation: 'trial.observe',
  trial_end: 'trial.end',
  decision: 'decision.sign',
}

/** All entries of an episode, each in its current version with the earlier ones under it. In no order. */
export function toRecorded(all: AllVersions, naming: Naming): RecordedDto[] {
  return [...toMeasured(all, naming), ...toSteps(all, naming)]
}

/** One DTO for each entry of a kind. `toValues` gives what the kind adds to what every entry carries. */
function collect<Kind extends RecordedKind, Row extends VersionRow, Values>(
  naming: Naming,
  kind: Kind,
  rows: Row[],
  toValues: (row: Row) => Values,
) {
  const toDto = (row: Row): EntryDto & Values => ({
    ...toEntryDto(row, naming.personName(row.recordedBy), naming.protocolNumber(row.protocolVersionId)),
    ...toValues(row),
  })
  return [...groupBy(rows, (row) => row.entryId).values()].flatMap((versions) => {
    const current = versions.at(-1)
    if (!current) return []
    const isCorrectable = kind !== 'airway' || ('event' in current && current.event === 'tracheostomy_placed')
    return [
      {
        kind,
        entry: toDto(current),
        earlier: versions.slice(0, -1).reverse().map(toDto),
        isWithdrawn: current.isWithdrawn,
        mayAmend: isCorrectable && !current.isWithdrawn && naming.mayAmend(ACTION_OF[kind], current.recordedBy),
      },
    ]
  })
}

function toMeasured(all: AllVersions, naming: Naming): RecordedDto[] {
  return [
    ...collect(naming, 'settings', all.settings, toSettingsValues),
    ...collect(naming, 'gas', all.gas, (row) => ({
      ph: row.ph,
      paCO2MmHg: row.paCO2MmHg,
      paO2MmHg: row.paO2MmHg,
      fio2Fraction: row.fio2Fraction,
      bicarbonateMmolPerL: row.bicarbonateMmolPerL,
      lactateMmolPerL: row.lactateMmolPerL,
      haemoglobinGPerDl: row.haemoglobinGPerDl,
    })),
    ...collect(naming, 'airway', all.airway, (row) => ({ event: row.event, reason: row.reason, supportAfter: row.supportAfter })),
  ]
}

function toSteps(all: AllVersions, naming: Naming): RecordedDto[] {
  return [
    ...collect(naming, 'screen', all.screen, (row) => ({
      result: row.result,
      excuse: row.excuse,
      note: row.note,
      readings: row.readings,
      verdict: row.verdict,
    })),
    ...collect(naming, 'hold', all.hold, (row) => ({
      start: row.start,
      safety: row.safety,
      infusions: row.infusions,
      note: row.note,
    })),
    ...collect(naming, 'hold_observation', all.holdObservation, (row) => ({
      holdId: row.holdId,
      readings: row.readings,
      opensEyesToVoice: row.opensEyesToVoice,
    })),
    ...collect(naming, 'hold_end', all.holdEnd, (row) => ({
      holdId: row.holdId,
      outcome: row.outcome,
      rulesMet: row.rulesMet,
      rulesMetWords: naming.ruleWords('hold', row.protocolVersionId, row.rulesMet),
      restarts: row.restarts,
      note: row.note,
    })),
    ...collect(naming, 'trial', all.trial, (row) => ({
      technique: row.technique,
      pressureSupportCmH2O: row.pressureSupportCmH2O,
      peepCmH2O: row.peepCmH2O,
      fio2Fraction: row.fio2Fraction,
      plannedDurationMin: row.plannedDurationMin,
      baseline: row.baseline,
      startedAnywayBecause: row.startedAnywayBecause,
    })),
    ...collect(naming, 'trial_observation', all.trialObservation, (row) => ({ trialId: row.trialId, readings: row.readings })),
    ...collect(naming, 'trial_end', all.trialEnd, (row) => ({
      trialId: row.trialId,
      outcome: row.outcome,
      rulesMet: row.rulesMet,
      rulesMetWords: naming.ruleWords('trial', row.protocolVersionId, row.rulesMet),
      returnedTo: row.returnedTo,
      reason: row.reason,
    })),
    ...collect(naming, 'decision', all.decision, (row) => ({
      choice: row.choice,
      reasons: row.reasons,
      note: row.note,
      lookAgainAt: row.lookAgainAt,
      supportAfter: row.supportAfter,
      steroidsPlanned: row.steroidsPlanned,
      contentHash: row.contentHash,
      statement: row.statement,
    })),
  ]
}
