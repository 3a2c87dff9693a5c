import type { ProtocolContent, ScreenRule, StopRule } from '@/lib/weaning/protocol'
import { holdFailGirard2008, holdSafetyGirard2008 } from './hold-girard-2008'
import { sourceText } from './provenance'
import { stopGirard2008 } from './stop-girard-2008'

const girard = sourceText('girard2008', 'from memory')
const lasting5 = 'no published duration; 5 min is this product’s default'

const screen: ScreenRule[] = [
  { kind: 'number', criterion: 'fio2', limits: [{ comparator: 'atMost', value: 0.5 }], source: girard },
  { kind: 'number', criterion: 'peep', limits: [{ comparator: 'atMost', value: 8 }], source: girard },
  {
    kind: 'number',
    criterion: 'norepinephrine',
    limits: [{ comparator: 'atMost', value: 0.1 }],
    source: 'This product’s default, no source: published lists set 0.05 to 0.2 µg/kg/min, or 2 µg/min',
  },
  { kind: 'yesNo', criterion: 'otherVasopressor', expect: false, source: girard },
  { kind: 'yesNo', criterion: 'ischaemia', expect: false, source: girard },
]

const circulation: StopRule[] = [
  {
    kind: 'limit',
    id: 'heart_rate_high',
    reading: 'heartRatePerMin',
    limit: { comparator: 'above', value: 140 },
    sustainedMin: 5,
    source: `${sourceText('boles2007', 'found')}; ${lasting5}`,
  },
  {
    kind: 'change',
    id: 'heart_rate_rise',
    reading: 'heartRatePerMin',
    direction: 'rise',
    comparator: 'atLeast',
    by: 20,
    as: 'percent',
    sustainedMin: 5,
    source: `${sourceText('boles2007', 'found')}; ${lasting5}`,
  },
  {
    kind: 'limit',
    id: 'systolic_high',
    reading: 'systolicMmHg',
    limit: { comparator: 'above', value: 180 },
    sustainedMin: 5,
    source: `${sourceText('boles2007', 'found')}; ${lasting5}`,
  },
  {
    kind: 'limit',
    id: 'systolic_low',
    reading: 'systolicMmHg',
    limit: { comparator: 'below', value: 90 },
    sustainedMin: 0,
    source: sourceText('boles2007', 'found'),
  },
]

/**
 * The protocol that a unit begins with until a physician approves one of its own: the required criteria only, the stop list of Girard 2008 and
 * the limits of heart rate and blood pressure of Boles 2007. Times without a source beside them are this product's defaults.
 */
export const defaultProtocol: ProtocolContent = {
  screeningWindow: { opensMin: 5 * 60, closesMin: 9 * 60 },
  screen,
  hold: {
    safetyItems: [...holdSafetyGirard2008],
    failRules: holdFailGirard2008.rules.map(({ rule }) => rule),
    startWithinMin: 60,
    observeEveryMin: 30,
    toleratedAfterMin: 240,
    restartFraction: 0.5,
  },
  trial: {
    stopRules: [...stopGirard2008.rules.map(({ rule }) => rule), ...circulation],
    defaultDurationMin: 30,
    shortestMin: 30,
    longestMin: 120,
    observationMinutes: [2, 5, 10, 15, 30, 45, 60, 75, 90, 105, 120],
    startWithinMin: 30,
    retryWithinMin: 240,
  },
  pairingWindowMin: 120,
  decision: { answerWithinMin: 60, extubateWithinMin: 120 },
  watch: { hours: [1, 6, 12, 24, 48, 72] },
}
