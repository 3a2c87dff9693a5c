import 'server-only'
import type { Tx } from '@/db/client'
import { listScreensOfDay } from '@/db/queries/screens'
import type { DecisionEvidence, EvidenceItem } from '@/lib/schemas/decisions'
import { EVIDENCE_ITEMS } from '@/lib/schemas/decisions'
import type { TrialDto } from '@/lib/schemas/trials'
import type { EpisodeInUnit } from '@/lib/access/door'
import { localDay, shiftDay } from '@/lib/shared/time'
import { breathingIndex } from '@/lib/weaning/indices/breathing-index'
import { toHoldDto } from '../holds/to-dto'
import { readHolds } from '../holds/read-holds'
import { toScreenDto } from '../screens/to-dto'
import type { ProtocolRow } from '../steps/judging-protocol'
import { readPrefill } from '../steps/read-step-form'
import { isAdultOn } from '../steps/require-adult'
import { readTrials } from '../trials/read-trials'
import { toTrialDto } from '../trials/to-dto'

/**
 * What the record holds for a decision now: latest screen, hold and trial of today, or of the day before while nothing of the three is
 * recorded today, with RSBI, settings, gas, cough and secretions. Depends on the record only, so that equal evidence has an equal hash.
 */
export function gatherEvidence(tx: Tx, found: EpisodeInUnit, inForce: ProtocolRow, now: number): DecisionEvidence {
  const today = localDay(now, found.unit.timeZone)
  const ofToday = ofDay(tx, found, inForce, today, now)
  const hasAny = ofToday.screen !== null || ofToday.hold !== null || ofToday.trial !== null
  const day = hasAny ? today : shiftDay(today, -1)
  const steps = hasAny ? ofToday : ofDay(tx, found, inForce, day, now)
  const { settings, gas } = readPrefill(tx, found.episode.id)
  const readings = steps.screen?.readings ?? null
  return {
    ventilatorDay: day,
    ...steps,
    rsbi: findRsbi(steps, isAdultOn(found, today)),
    settings,
    gas,
    cough: readings?.cough ?? null,
    secretions: readings?.secretions ?? null,
  }
}

function ofDay(tx: Tx, found: EpisodeInUnit, inForce: ProtocolRow, day: string, now: number) {
  const episodeId = found.episode.id
  const [screen] = listScreensOfDay(tx, episodeId, day)
  const [hold] = readHolds(tx, episodeId, inForce, ({ row }) => row.ventilatorDay === day)
  const [trial] = readTrials(tx, episodeId, inForce, ({ row }) => row.ventilatorDay === day)
  return {
    screen: screen ? toScreenDto(screen) : null,
    hold: hold ? toHoldDto(hold, now) : null,
    trial: trial ? toTrialDto(trial, now, isAdultOn(found, day)) : null,
  }
}

/** The RSBI measured last: in the trial, at its baseline, or at the screen. */
function findRsbi(
  { screen, trial }: { screen: DecisionEvidence['screen']; trial: TrialDto | null },
  isAdult: boolean | null,
): DecisionEvidence['rsbi'] {
  const look = trial?.observations.findLast(({ rsbi }) => rsbi !== null)
  if (look && look.rsbi !== null) return { value: { known: true, value: look.rsbi }, from: 'trial', observedAt: look.observedAt }
  if (trial && trial.baselineRsbi !== null) {
    return { value: { known: true, value: trial.baselineRsbi }, from: 'baseline', observedAt: trial.observedAt }
  }
  const readings = screen?.readings
  if (!screen || !readings || readings.breathsPerMin === null || readings.tidalVolumeMl === null) return null
  const { breathsPerMin, tidalVolumeMl } = readings
  return { value: breathingIndex({ breathsPerMin, tidalVolumeMl, isAdult }), from: 'screen', observedAt: screen.observedAt }
}

/** What nobody has recorded. A value that cannot be computed counts as missing. */
export function listMissing(evidence: DecisionEvidence): EvidenceItem[] {
  return EVIDENCE_ITEMS.filter((item) => {
    if (item === 'rsbi') return evidence.rsbi === null || !evidence.rsbi.value.known
    return evidence[item] === null
  })
}
