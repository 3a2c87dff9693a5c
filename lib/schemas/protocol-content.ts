import { z } from 'zod'
import {
  OBSERVED_READINGS,
  type Comparator,
  type NumericCriterion,
  type ObservedReading,
  type YesNoCriterion,
} from '@/lib/weaning/protocol'
import { BEDSIDE_SIGNS, COUGHS, HOLD_SAFETY_ITEMS, SECRETIONS } from '@/lib/weaning/vocabulary'
import { minutes, protocolRange, textLine } from './protocol-fields'
import { checkProtocolSense } from './protocol-sense'

const COMPARATORS = ['atMost', 'below', 'atLeast', 'above'] as const satisfies readonly Comparator[]
const NUMERIC_CRITERIA = [
  'fio2',
  'peep',
  'norepinephrine',
  'spo2',
  'pfRatio',
  'ph',
  'rass',
  'temperature',
  'haemoglobin',
  'rsbi',
] as const satisfies readonly NumericCriterion[]
const YES_NO_CRITERIA = [
  'otherVasopressor',
  'ischaemia',
  'spontaneousEffort',
  'raisedIcp',
  'neuromuscularBlockade',
  'causeImproving',
] as const satisfies readonly YesNoCriterion[]

const limitSchema = z.object({
  comparator: z.enum(COMPARATORS, { error: 'Choose at most, below, at least or above.' }),
  value: z.number({ error: 'Give the limit as a number.' }),
})
const source = textLine('Give the source of the limit; “unit practice” when there is none.', 300)
const ruleId = z.string().regex(/^[a-z0-9][a-z0-9_.-]{0,63}$/i, 'A rule’s id is made of letters, digits, dots and dashes.')
const reading = z.enum(OBSERVED_READINGS satisfies readonly ObservedReading[])
const sign = z.enum(BEDSIDE_SIGNS)
const sustainedMin = protocolRange('The time it must last', 'min', 0, 30, true)

const screenRuleSchema = z.discriminatedUnion('kind', [
  z.object({
    kind: z.literal('number'),
    criterion: z.enum(NUMERIC_CRITERIA),
    limits: z.array(limitSchema).min(1, 'Give the limit.').max(2),
    source,
  }),
  z.object({ kind: z.literal('yesNo'), criterion: z.enum(YES_NO_CRITERIA), expect: z.boolean(), source }),
  z.object({
    kind: z.literal('word'),
    criterion: z.enum(['cough', 'secretions']),
    accept: z.array(z.enum([...COUGHS, ...SECRETIONS])).min(1, 'Choose at least one word that is accepted.'),
    source,
  }),
])

const stopRuleSchema = z.discriminatedUnion('kind', [
  z.object({ kind: z.literal('limit'), id: ruleId, reading, limit: limitSchema, sustainedMin, source }),
  z.object({
    kind: z.literal('change'),
    id: ruleId,
    reading,
    direction: z.enum(['rise', 'fall']),
    comparator: z.enum(['atLeast', 'above']),
    by: z.number({ error: 'Give the change as a number.' }).positive('The change is above 0.'),
    as: z.enum(['percent', 'absolute']),
    sustainedMin,
    source,
  }),
  z.object({ kind: z.literal('sign'), id: ruleId, sign, sustainedMin: sustainedMin.optional(), source }),
  z.object({
    kind: z.literal('signs'),
    id: ruleId,
    atLeast: protocolRange('The number of signs', '', 1, 4, true),
    signs: z.array(sign).min(1, 'Choose the signs.'),
    limits: z.array(z.object({ reading, limit: limitSchema })).max(6),
    source,
  }),
])

const dayMinute = (label: string) => protocolRange(label, 'minutes after midnight', 0, 24 * 60 - 1, true)

/**
 * A protocol as a unit may put it in force. Beyond shape it refuses what would be dangerous, each at its field: see protocol-sense.ts.
 * The ranges say what a protocol can sensibly hold (common practice, no source); they are not care limits.
 */
export const protocolContentSchema = z
  .object({
    screeningWindow: z.object({
      opensMin: dayMinute('The opening of the window'),
      closesMin: dayMinute('The closing of the window'),
    }),
    screen: z.array(screenRuleSchema).min(2, 'FiO2 and PEEP stay on the list.').max(20),
    hold: z.object({
      safetyItems: z.array(z.enum(HOLD_SAFETY_ITEMS)).min(1, 'Keep at least one safety item.'),
      failRules: z.array(stopRuleSchema).min(1, 'Give at least one rule that ends a hold.').max(30),
      startWithinMin: minutes('The time to start the hold', 5, 480),
      observeEveryMin: minutes('The time between observations', 5, 120),
      toleratedAfterMin: minutes('The time after which a hold counts as tolerated', 30, 720),
      restartFraction: protocolRange('The fraction of the earlier rate', '', 0.1, 1, false),
    }),
    trial: z.object({
      stopRules: z.array(stopRuleSchema).min(1, 'Give at least one rule that stops a trial.').max(30),
      defaultDurationMin: minutes('The usual length', 30, 120),
      shortestMin: minutes('The shortest length', 30, 120),
      longestMin: minutes('The longest length', 30, 120),
      observationMinutes: z
        .array(minutes('An observation', 1, 120))
        .min(3, 'Plan at least three observations.')
        .max(40),
      startWithinMin: minutes('The time to start the trial', 5, 480),
      retryWithinMin: minutes('The time until a stopped trial is due again', 15, 1440),
    }),
    pairingWindowMin: minutes('The pairing window', 30, 720),
    decision: z.object({
      answerWithinMin: minutes('The time to answer a passed trial', 5, 720),
      extubateWithinMin: minutes('The time to carry out a decision', 5, 720),
    }),
    watch: z.object({
      hours: z
        .array(protocolRange('An hour of the watch', 'h', 1, 168, true))
        .min(1, 'Give at least one hour of the watch.')
        .max(20),
    }),
  })
  .superRefine(checkProtocolSense)
export type ProtocolContentInput = z.output<typeof protocolContentSchema>
