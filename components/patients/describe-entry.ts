import { bloodPressureText } from '@/components/episodes/observation-table'
import { readingText, readingUnit } from '@/components/episodes/reading-label'
import { rassText } from '@/components/episodes/rass-choice'
import { rateNumber } from '@/components/holds/restart-list'
import { holdLook } from '@/components/holds/earlier-holds'
import { reasonLines, RESULT_LOOK } from '@/components/screens/verdict-panel'
import { techniqueText } from '@/components/trials/technique-text'
import { trialLook } from '@/components/trials/trial-look'
import type { MarkShape } from '@/components/ui/mark'
import type { Tone } from '@/components/ui/tag'
import type { RecordedDto } from '@/lib/schemas/patient-page'
import type { LimitedReading } from '@/lib/weaning/published/hard-limits'
import type { ObservedReadings } from '@/lib/weaning/readings'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { HOLD_SAFETY_ITEMS } from '@/lib/weaning/vocabulary'
import {
  AIRWAY_EVENT_WORDS,
  DECISION_WORDS,
  EXCUSE_WORDS,
  HOLD_OUTCOME_WORDS,
  HOLD_SAFETY_WORDS,
  SCREEN_RESULT_WORDS,
  SIGN_WORDS,
  SUPPORT_WORDS,
} from '@/lib/weaning/words'

export type EntryWords = { shape: MarkShape; tone: Tone; title: string; lines: string[] }
type Current<Kind extends RecordedDto['kind']> = Extract<RecordedDto, { kind: Kind }>['entry']

/** One version of an entry in words: what it is, and what it says. */
export function describeEntry(kind: RecordedDto['kind'], entry: RecordedDto['entry']): EntryWords {
  const one = { kind, entry } as Pick<RecordedDto, 'kind' | 'entry'> as RecordedDto
  switch (one.kind) {
    case 'settings':
      return { shape: 'dot', tone: 'muted', title: 'Settings', lines: [settingsWords(one.entry)] }
    case 'gas':
      return { shape: 'dot', tone: 'muted', title: 'Blood gas', lines: [gasWords(one.entry)] }
    case 'airway':
      return {
        shape: 'diamond',
        tone: 'ink',
        title: sentenceCase(AIRWAY_EVENT_WORDS[one.entry.event]),
        lines: compact([
          one.entry.supportAfter && `${sentenceCase(SUPPORT_WORDS[one.entry.supportAfter])} afterwards`,
          one.entry.reason,
        ]),
      }
    case 'screen':
      return screenWords(one.entry)
    case 'hold':
      return holdWords(one.entry)
    case 'hold_observation':
      return {
        shape: 'dot',
        tone: 'muted',
        title: 'Observation during the hold',
        lines: [observationWords(one.entry.readings, one.entry.opensEyesToVoice)],
      }
    case 'hold_end': {
      const look = holdLook('started', one.entry.outcome)
      const restarts = one.entry.restarts.map(
        (each) =>
          `${each.drug} ${rateNumber(each.rateBefore)} ${each.unit} before, computed restart rate ${rateNumber(each.rate)} ${each.unit}`,
      )
      return {
        shape: look.shape,
        tone: look.tone,
        title: `Hold ended: ${HOLD_OUTCOME_WORDS[one.entry.outcome]}`,
        lines: compact([...one.entry.rulesMetWords, ...restarts, one.entry.note]),
      }
    }
    case 'trial':
      return {
        shape: 'bar',
        tone: 'ink',
        title: 'Breathing trial started',
        lines: compact([
          `${techniqueText(one.entry)}, planned ${one.entry.plannedDurationMin} min`,
          `baseline: ${observationWords(one.entry.baseline, null)}`,
          one.entry.startedAnywayBecause && `started against the order of the day: ${one.entry.startedAnywayBecause}`,
        ]),
      }
    case 'trial_observation':
      return {
        shape: 'dot',
        tone: 'muted',
        title: 'Observation during the trial',
        lines: [observationWords(one.entry.readings, null)],
      }
    case 'trial_end': {
      const look = trialLook(one.entry.outcome)
      return {
        shape: look.shape,
        tone: look.tone,
        title: look.words,
        lines: compact([
          ...one.entry.rulesMetWords,
          one.entry.reason,
          one.entry.returnedTo && `afterwards: ${one.entry.returnedTo}`,
        ]),
      }
    }
    case 'decision':
      return {
        shape: 'flag',
        tone: 'ink',
        title: `Signed: ${DECISION_WORDS[one.entry.choice]}`,
        lines: [one.entry.statement, `signature ${one.entry.contentHash.slice(0, 12)}`],
      }
  }
}

const compact = (lines: readonly (string | null | undefined | false)[]): string[] =>
  lines.filter((line): line is string => typeof line === 'string' && line !== '').map(sentenceCase)

/** "FiO2 0.40", "tidal volume 410 mL": those of the readings that stand, joined. */
function readingsWords(pairs: readonly [string, LimitedReading, number | null][]): string {
  return pairs
    .flatMap(([label, reading, value]) => {
      if (value === null) return []
      const unit = readingUnit(reading)
      return [`${label} ${readingText(reading, value)}${unit === '' || unit === 'fraction' ? '' : ` ${unit}`}`]
    })
    .join(', ')
}

function settingsWords(entry: Current<'settings'>): string {
  return `${entry.mode}, ${readingsWords([
    ['FiO2', 'fio2Fraction', entry.fio2Fraction],
    ['PEEP', 'peepCmH2O', entry.peepCmH2O],
    ['set rate', 'setRatePerMin', entry.setRatePerMin],
    ['set volume', 'setTidalVolumeMl', entry.setTidalVolumeMl],
    ['inspiratory pressure', 'inspiratoryPressureCmH2O', entry.inspiratoryPressureCmH2O],
    ['pressure support', 'pressureSupportCmH2O', entry.pressureSupportCmH2O],
    ['measured rate', 'measuredRatePerMin', entry.measuredRatePerMin],
    ['measured volume', 'measuredTidalVolumeMl', entry.measuredTidalVolumeMl],
    ['peak', 'peakPressureCmH2O', entry.peakPressureCmH2O],
    ['plateau', 'plateauPressureCmH2O', entry.plateauPressureCmH2O],
    ['SpO2', 'spo2Percent', entry.spo2Percent],
  ])}`
}

function gasWords(entry: Current<'gas'>): string {
  return readingsWords([
    ['pH', 'ph', entry.ph],
    ['PaCO2', 'paCO2MmHg', entry.paCO2MmHg],
    ['PaO2', 'paO2MmHg', entry.paO2MmHg],
    ['on FiO2', 'fio2Fraction', entry.fio2Fraction],
    ['bicarbonate', 'bicarbonateMmolPerL', entry.bicarbonateMmolPerL],
    ['lactate', 'lactateMmolPerL', entry.lactateMmolPerL],
    ['haemoglobin', 'haemoglobinGPerDl', entry.haemoglobinGPerDl],
  ])
}

function screenWords(entry: Current<'screen'>): EntryWords {
  const detail = entry.excuse ? [EXCUSE_WORDS[entry.excuse]] : entry.verdict ? reasonLines(entry.verdict) : []
  return {
    ...RESULT_LOOK[entry.result],
    title: `Screen: ${SCREEN_RESULT_WORDS[entry.result]}`,
    lines: compact([...detail, entry.note]),
  }
}

function holdWords(entry: Current<'hold'>): EntryWords {
  const look = holdLook(entry.start, null)
  const present = HOLD_SAFETY_ITEMS.filter((item) => entry.safety?.[item] === true).map((item) => HOLD_SAFETY_WORDS[item])
  const infusions = entry.infusions.map((each) => `${each.drug} ${rateNumber(each.rate)} ${each.unit} for ${each.purpose}`)
  const title = entry.start === 'started' ? 'Sedation hold started' : `Sedation ${look.words.toLowerCase()}`
  return { shape: look.shape, tone: look.tone, title, lines: compact([...present, ...infusions, entry.note]) }
}

/** An observation in one line: numbers, RASS, signs. */
export function observationWords(readings: ObservedReadings, eyes: 'yes' | 'no' | null): string {
  const numbers = readingsWords([
    ['rate', 'breathsPerMin', readings.breathsPerMin],
    ['tidal volume', 'tidalVolumeMl', readings.tidalVolumeMl],
    ['SpO2', 'spo2Percent', readings.spo2Percent],
    ['heart rate', 'heartRatePerMin', readings.heartRatePerMin],
    ['pH', 'ph', readings.ph],
    ['PaCO2', 'paCO2MmHg', readings.paCO2MmHg],
    ['PaO2', 'paO2MmHg', readings.paO2MmHg],
  ])
  const rass = readings.rass === null ? null : `RASS ${rassText(readings.rass)}`
  const voice = eyes === null ? null : eyes === 'yes' ? 'opens eyes to voice' : 'does not open eyes to voice'
  const signs =
    readings.signs.length > 0 ? `signs: ${readings.signs.map((sign) => SIGN_WORDS[sign]).join(', ')}` : 'no sign marked'
  const pressure = bloodPressureText(readings)
  return [numbers, pressure === null ? null : `blood pressure ${pressure} mmHg`, rass, voice, signs].filter(Boolean).join(', ')
}
