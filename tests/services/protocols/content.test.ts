import { describe, expect, it } from 'vitest'
import { protocolContentSchema } from '@/lib/schemas/protocol-content'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import type { ProtocolContent, ScreenRule, StopRule } from '@/lib/weaning/protocol'

const fieldsOf = (content: unknown) => {
  const parsed = protocolContentSchema.safeParse(content)
  return parsed.success ? [] : parsed.error.issues.map((issue) => issue.path.join('.'))
}
const messagesOf = (content: unknown) =>
  protocolContentSchema.safeParse(content).error?.issues.map((issue) => issue.message) ?? []
const withScreen = (rules: ScreenRule[]): ProtocolContent => ({
  ...defaultProtocol,
  screen: [...defaultProtocol.screen.slice(0, 2), ...rules],
})
const withTrial = (over: Partial<ProtocolContent['trial']>): ProtocolContent => ({
  ...defaultProtocol,
  trial: { ...defaultProtocol.trial, ...over },
})
const withHold = (over: Partial<ProtocolContent['hold']>): ProtocolContent => ({
  ...defaultProtocol,
  hold: { ...defaultProtocol.hold, ...over },
})
const number = (
  criterion: Extract<ScreenRule, { kind: 'number' }>['criterion'],
  ...limits: ['atMost' | 'below' | 'atLeast' | 'above', number][]
): ScreenRule => ({
  kind: 'number',
  criterion,
  limits: limits.map(([comparator, value]) => ({ comparator, value })),
  source: 'unit practice',
})
const rules = defaultProtocol.trial.stopRules
const without = (test: (rule: StopRule) => boolean) => rules.filter((rule) => !test(rule))
const change: StopRule = {
  kind: 'change',
  id: 'rate_rise',
  reading: 'breathsPerMin',
  direction: 'rise',
  comparator: 'atLeast',
  by: 50,
  as: 'percent',
  sustainedMin: 0,
  source: 'unit practice',
}
const limit = (
  id: string,
  reading: Extract<StopRule, { kind: 'limit' }>['reading'],
  comparator: 'above' | 'below',
  value: number,
  sustainedMin = 0,
): StopRule => ({
  kind: 'limit',
  id,
  reading,
  limit: { comparator, value },
  sustainedMin,
  source: 'unit practice',
})

describe('a protocol that a unit may hold', () => {
  it('is the product’s default', () => {
    expect(fieldsOf(defaultProtocol)).toEqual([])
    expect(protocolContentSchema.parse(defaultProtocol)).toEqual(defaultProtocol)
  })

  it('is one with every further criterion switched on', () => {
    const further: ScreenRule[] = [
      number('spo2', ['atLeast', 90]),
      number('pfRatio', ['atLeast', 150]),
      number('ph', ['atLeast', 7.25], ['atMost', 7.5]),
      number('rass', ['atLeast', -2], ['atMost', 1]),
      number('temperature', ['below', 38.5]),
      number('haemoglobin', ['atLeast', 7]),
      number('rsbi', ['atMost', 105]),
      number('norepinephrine', ['atMost', 0.2]),
      { kind: 'yesNo', criterion: 'spontaneousEffort', expect: true, source: 'unit practice' },
      { kind: 'yesNo', criterion: 'neuromuscularBlockade', expect: false, source: 'unit practice' },
      { kind: 'word', criterion: 'cough', accept: ['strong', 'weak'], source: 'unit practice' },
      { kind: 'word', criterion: 'secretions', accept: ['scant', 'moderate'], source: 'unit practice' },
    ]
    expect(fieldsOf(withScreen(further))).toEqual([])
  })
})

it('may hold the published fall of pH by 0.07 and rise of PaCO2 by more than 8 mmHg', () => {
  // Boles 2007, table 6, doi:10.1183/09031936.00010206.
  const ph: StopRule = { ...change, id: 'ph_fall', reading: 'ph', direction: 'fall', by: 0.07, as: 'absolute' }
  const co2: StopRule = { ...change, id: 'paco2_rise', reading: 'paCO2MmHg', comparator: 'above', by: 8, as: 'absolute' }
  expect(fieldsOf(withTrial({ stopRules: [...rules, ph, co2] }))).toEqual([])
})

describe('a protocol that is refused, at its field', () => {
  it.each<[string, unknown, string[]]>([
    [
      'a window that closes before it opens',
      { ...defaultProtocol, screeningWindow: { opensMin: 540, closesMin: 300 } },
      ['screeningWindow.closesMin'],
    ],
    [
      'a window that closes as it opens',
      { ...defaultProtocol, screeningWindow: { opensMin: 300, closesMin: 300 } },
      ['screeningWindow.closesMin'],
    ],
    [
      'FiO2 over 0.60',
      { ...defaultProtocol, screen: [number('fio2', ['atMost', 0.61]), number('peep', ['atMost', 8])] },
      ['screen.0.limits.0.value'],
    ],
    [
      'FiO2 typed as 50',
      { ...defaultProtocol, screen: [number('fio2', ['atMost', 50]), number('peep', ['atMost', 8])] },
      ['screen.0.limits.0.value'],
    ],
    [
      'FiO2 limited from below',
      { ...defaultProtocol, screen: [number('fio2', ['atLeast', 0.5]), number('peep', ['atMost', 8])] },
      ['screen.0.limits.0.comparator'],
    ],
    [
      'PEEP over 10',
      { ...defaultProtocol, screen: [number('fio2', ['atMost', 0.5]), number('peep', ['atMost', 10.5])] },
      ['screen.1.limits.0.value'],
    ],
    ['no PEEP', { ...defaultProtocol, screen: [number('fio2', ['atMost', 0.5]), number('spo2', ['atLeast', 90])] }, ['screen']],
    ['a criterion twice', withScreen([number('spo2', ['atLeast', 90]), number('spo2', ['atLeast', 88])]), ['screen.3.criterion']],
    ['SpO2 at least 80', withScreen([number('spo2', ['atLeast', 80])]), ['screen.2.limits.0.value']],
    ['two ceilings', withScreen([number('ph', ['atMost', 7.5], ['below', 7.55])]), ['screen.2.limits.1.comparator']],
    [
      'readiness only under neuromuscular blockade',
      withScreen([{ kind: 'yesNo', criterion: 'neuromuscularBlockade', expect: true, source: 'unit practice' }]),
      ['screen.2.expect'],
    ],
    [
      'an absent cough',
      withScreen([{ kind: 'word', criterion: 'cough', accept: ['strong', 'weak', 'absent'], source: 'unit practice' }]),
      ['screen.2.accept'],
    ],
    [
      'secretions named as a cough',
      withScreen([{ kind: 'word', criterion: 'cough', accept: ['scant'], source: 'unit practice' }]),
      ['screen.2.accept'],
    ],
    ['a limit without a source', withScreen([{ ...number('spo2', ['atLeast', 90]), source: ' ' }]), ['screen.2.source']],
    ['a hold without asking for neuromuscular blockade', withHold({ safetyItems: ['active_seizures'] }), ['hold.safetyItems']],
    [
      'a hold judged against a baseline that it does not have',
      withHold({ failRules: [...defaultProtocol.hold.failRules, change] }),
      [`hold.failRules.${defaultProtocol.hold.failRules.length}.kind`],
    ],
    ['a restart above the earlier rate', withHold({ restartFraction: 1.5 }), ['hold.restartFraction']],
    ['a restart at nothing', withHold({ restartFraction: 0 }), ['hold.restartFraction']],
    ['looks rarer than the hold lasts', withHold({ toleratedAfterMin: 60, observeEveryMin: 90 }), ['hold.observeEveryMin']],
    [
      'no limit for a high respiratory rate',
      withTrial({ stopRules: without((rule) => rule.kind === 'limit' && rule.reading === 'breathsPerMin') }),
      ['trial.stopRules'],
    ],
    [
      'no limit for a low SpO2',
      withTrial({ stopRules: without((rule) => rule.kind === 'limit' && rule.reading === 'spo2Percent') }),
      ['trial.stopRules'],
    ],
    [
      'a respiratory rate limit of 60',
      withTrial({ stopRules: [...rules, limit('x', 'breathsPerMin', 'above', 60)] }),
      [`trial.stopRules.${rules.length}.limit.value`],
    ],
    [
      'a limit for a high SpO2',
      withTrial({ stopRules: [...rules, limit('x', 'spo2Percent', 'above', 90)] }),
      [`trial.stopRules.${rules.length}.limit.comparator`],
    ],
    [
      'a limit that may be exceeded for 20 min',
      withTrial({ stopRules: [...rules, limit('x', 'heartRatePerMin', 'above', 130, 20)] }),
      [`trial.stopRules.${rules.length}.sustainedMin`],
    ],
    ['a rise of 80 %', withTrial({ stopRules: [...rules, { ...change, by: 80 }] }), [`trial.stopRules.${rules.length}.by`]],
    [
      'a fall of pH by 5',
      withTrial({ stopRules: [...rules, { ...change, reading: 'ph', direction: 'fall', by: 5, as: 'absolute' }] }),
      [`trial.stopRules.${rules.length}.by`],
    ],
    [
      'two rules of one id',
      withTrial({ stopRules: [...rules, limit('systolic_low', 'systolicMmHg', 'below', 85)] }),
      [`trial.stopRules.${rules.length}.id`],
    ],
    [
      'more signs than are listed',
      withTrial({
        stopRules: [...rules, { kind: 'signs', id: 's', atLeast: 2, signs: ['sweating'], limits: [], source: 'unit practice' }],
      }),
      [`trial.stopRules.${rules.length}.atLeast`],
    ],
    ['a usual length outside the shortest and longest', withTrial({ shortestMin: 60 }), ['trial.defaultDurationMin']],
    [
      'a longest length under the shortest',
      withTrial({ shortestMin: 60, defaultDurationMin: 60, longestMin: 45 }),
      ['trial.longestMin', 'trial.defaultDurationMin'],
    ],
    ['a trial of 10 min', withTrial({ shortestMin: 10 }), ['trial.shortestMin']],
    ['a first look after 10 min', withTrial({ observationMinutes: [10, 20, 30, 60, 90, 120] }), ['trial.observationMinutes']],
    ['an hour without a look', withTrial({ observationMinutes: [5, 15, 30, 90, 120] }), ['trial.observationMinutes']],
    ['looks out of order', withTrial({ observationMinutes: [5, 15, 10, 30, 60, 90, 120] }), ['trial.observationMinutes']],
    ['a watch out of order', { ...defaultProtocol, watch: { hours: [6, 1] } }, ['watch.hours']],
    [
      'a decision due after 2 days',
      { ...defaultProtocol, decision: { answerWithinMin: 2880, extubateWithinMin: 120 } },
      ['decision.answerWithinMin'],
    ],
    [
      'an unknown criterion',
      withScreen([{ kind: 'number', criterion: 'mood', limits: [], source: 'x' } as unknown as ScreenRule]),
      ['screen.2.criterion', 'screen.2.limits', 'screen.2.source'],
    ],
  ])('holds %s', (_title, content, fields) => {
    expect(fieldsOf(content)).toEqual(fields)
  })

  it('says what would be right', () => {
    const content = { ...defaultProtocol, screen: [number('fio2', ['atMost', 0.8]), number('peep', ['atMost', 8])] }
    expect(messagesOf(content)).toEqual(['FiO2: a limit of 0.8 is outside what a protocol may hold here, 0.3 to 0.6.'])
  })
})
