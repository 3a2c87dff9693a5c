import { MINUTE_MS } from '@/lib/shared/time'
import type { HoldScript, TrialScript } from './script'
import { empty, inWatch, notVentilated, startedAfterWindow, ventilated, type Scene } from './present'
import { writeSettings } from './write-readings'

const CALM = [2, 5, 10, 15, 30].map((minute) => ({ minute, strain: 0.1 + minute / 150 }))
const upTo = (lastMinute: number) => CALM.filter(({ minute }) => minute <= lastMinute)

const passedTrial = (startMs: number): TrialScript => ({
  startMs,
  plannedMin: 30,
  looks: CALM,
  endMs: startMs + 32 * MINUTE_MS,
  outcome: 'passed',
})
const tolerated = (startMs: number, lengthMin: number): HoldScript => ({
  kind: 'started',
  startMs,
  lookMinutes: [Math.round(lengthMin / 2), lengthMin - 2],
  endMs: startMs + lengthMin * MINUTE_MS,
  outcome: 'tolerated',
})
const noHold = (atMs: number): HoldScript => ({ kind: 'not_needed', atMs })
const NOTHING_PLANNED = { reasons: [], lookAgainMs: null, supportAfter: null, note: null }

/** Every state that a bed can be in on a morning, by name. */
export const SCENES = {
  unscreened: ventilated({ daysAgo: 3 }),
  incomplete: ventilated({ daysAgo: 2, today: (at) => ({ screen: { atMs: at(372), kind: 'incomplete' } }) }),
  waitingForHold: ventilated({
    daysAgo: 5,
    after: correctedSettings,
    today: (_at, ago) => ({ screen: { atMs: ago(34), kind: 'readings' } }),
  }),
  holdRunning: ventilated({
    daysAgo: 4,
    today: (at, ago) => ({
      screen: { atMs: at(402), kind: 'readings' },
      hold: { kind: 'started', startMs: ago(41), lookMinutes: [22], endMs: null, outcome: null },
    }),
  }),
  holdTolerated: ventilated({
    daysAgo: 6,
    today: (at, ago) => ({ screen: { atMs: at(385), kind: 'readings' }, hold: tolerated(ago(82), 52) }),
  }),
  holdNotNeeded: ventilated({
    daysAgo: 17,
    hasTracheostomy: true,
    today: (at, ago) => ({ screen: { atMs: at(431), kind: 'readings' }, hold: noHold(ago(19)) }),
  }),
  trialLookOverdue: ventilated({
    daysAgo: 3,
    today: (at, ago) => ({
      screen: { atMs: at(398), kind: 'readings' },
      hold: noHold(at(420)),
      trial: { startMs: ago(24), plannedMin: 30, looks: upTo(10), endMs: null, outcome: null },
    }),
  }),
  trialNearLimit: ventilated({
    daysAgo: 7,
    today: (at, ago) => ({
      screen: { atMs: at(352), kind: 'readings' },
      hold: tolerated(ago(95), 70),
      trial: {
        startMs: ago(12),
        plannedMin: 30,
        looks: [
          { minute: 2, strain: 0.4 },
          { minute: 5, strain: 0.75 },
          { minute: 10, strain: 1.02 },
        ],
        endMs: null,
        outcome: null,
      },
    }),
  }),
  decisionOwed: ventilated({
    daysAgo: 4,
    today: (at, ago) => ({
      screen: { atMs: at(344), kind: 'readings' },
      hold: tolerated(ago(118), 48),
      trial: passedTrial(ago(61)),
    }),
  }),
  extubationSigned: ventilated({
    daysAgo: 5,
    today: (at, ago) => ({
      screen: { atMs: at(325), kind: 'readings' },
      hold: tolerated(at(349), 40),
      trial: passedTrial(at(405)),
      decision: { ...NOTHING_PLANNED, atMs: ago(38), choice: 'extubate', supportAfter: 'high_flow' },
    }),
  }),
  notToday: ventilated({
    daysAgo: 8,
    today: (at, ago) => ({
      screen: { atMs: at(318), kind: 'readings' },
      hold: noHold(at(331)),
      trial: passedTrial(at(372)),
      decision: {
        ...NOTHING_PLANNED,
        atMs: ago(55),
        choice: 'not_today',
        reasons: ['secretions', 'mental_state'],
        lookAgainMs: at(0) + 32 * 60 * MINUTE_MS,
      },
    }),
  }),
  lookAgainDue: ventilated({
    daysAgo: 6,
    today: (at, ago) => ({
      screen: { atMs: at(286), kind: 'readings' },
      hold: noHold(at(294)),
      trial: passedTrial(at(318)),
      decision: { ...NOTHING_PLANNED, atMs: at(371), choice: 'not_today', reasons: ['fluid_overload'], lookAgainMs: ago(-24) },
    }),
  }),
  excused: ventilated({
    daysAgo: 9,
    isIll: true,
    today: (at) => ({
      screen: { atMs: at(356), kind: 'excused', excuse: 'comfort_care', note: 'Agreed with the family last night. Invented.' },
    }),
  }),
  notReady: ventilated({ daysAgo: 2, isIll: true, today: (at) => ({ screen: { atMs: at(361), kind: 'readings' } }) }),
  holdUnsafe: ventilated({
    daysAgo: 3,
    today: (at, ago) => ({
      screen: { atMs: at(333), kind: 'readings' },
      hold: { kind: 'unsafe', atMs: ago(70), item: 'alcohol_withdrawal' },
    }),
  }),
  holdNotTolerated: ventilated({
    daysAgo: 5,
    today: (at) => ({
      screen: { atMs: at(310), kind: 'readings' },
      hold: { kind: 'started', startMs: at(345), lookMinutes: [20, 38, 54], endMs: at(402), outcome: 'not_tolerated' },
    }),
  }),
  trialFailed: ventilated({
    daysAgo: 10,
    today: (at) => ({
      screen: { atMs: at(321), kind: 'readings' },
      hold: tolerated(at(340), 45),
      trial: {
        startMs: at(400),
        plannedMin: 30,
        endMs: at(417),
        outcome: 'failed',
        looks: [
          { minute: 2, strain: 0.5 },
          { minute: 5, strain: 0.8 },
          { minute: 10, strain: 1.05 },
          { minute: 15, strain: 1.12 },
        ],
      },
    }),
  }),
  trialStopped: ventilated({
    daysAgo: 4,
    today: (at) => ({
      screen: { atMs: at(327), kind: 'readings' },
      hold: noHold(at(340)),
      trial: { startMs: at(392), plannedMin: 30, looks: upTo(10), endMs: at(405), outcome: 'stopped' },
    }),
  }),
  tracheostomyPathway: ventilated({
    daysAgo: 13,
    today: (at, ago) => ({
      screen: { atMs: at(315), kind: 'readings' },
      hold: noHold(at(325)),
      trial: passedTrial(at(350)),
      decision: {
        ...NOTHING_PLANNED,
        atMs: ago(44),
        choice: 'tracheostomy_pathway',
        note: 'Three failed trials this week, weak cough. Invented.',
      },
    }),
  }),
  startedAfterWindow,
  under18: ventilated({ daysAgo: 1, ageYears: 17 }),
  inWatch,
  notVentilated,
  empty,
} as const satisfies Record<string, Scene>
export type SceneName = keyof typeof SCENES

const MEDICAL: SceneName[] = [
  'unscreened',
  'incomplete',
  'waitingForHold',
  'holdRunning',
  'holdTolerated',
  'trialLookOverdue',
  'trialNearLimit',
  'decisionOwed',
  'extubationSigned',
  'notToday',
  'excused',
  'empty',
  'inWatch',
  'notVentilated',
  'notReady',
  'unscreened',
]
const SURGICAL: SceneName[] = [
  'holdUnsafe',
  'holdNotTolerated',
  'trialFailed',
  'trialStopped',
  'tracheostomyPathway',
  'holdNotNeeded',
  'startedAfterWindow',
  'under18',
  'unscreened',
  'notVentilated',
  'empty',
  'lookAgainDue',
]
const WITHOUT_VENTILATOR: readonly SceneName[] = ['empty', 'notVentilated', 'inWatch']

/** Which scene each bed of a unit shows. Units of other sizes go round all scenes; all ventilated leaves the others out. */
export function scenesOf(unitIndex: number, bedCount: number, isEveryBedVentilated: boolean): SceneName[] {
  const own = [MEDICAL, SURGICAL][unitIndex]
  if (own?.length === bedCount && !isEveryBedVentilated) return own
  const round = [...MEDICAL, ...SURGICAL].filter((name) => !isEveryBedVentilated || !WITHOUT_VENTILATOR.includes(name))
  return Array.from({ length: bedCount }, (_, index) => round[index % round.length] ?? 'unscreened')
}

/** A slip at the bedside, put right: the first entry stays readable under the one that replaces it. */
function correctedSettings(...[world, course, vitals]: Parameters<NonNullable<Parameters<typeof ventilated>[0]['after']>>): void {
  const slip = writeSettings(world, course, Math.floor(world.nowMs / MINUTE_MS - 96) * MINUTE_MS, { ...vitals, peepCmH2O: 15 }, 2)
  const { id } = slip
  world.rows.settings.push({
    ...slip,
    id: world.random.id(),
    entryVersion: 2,
    supersedesId: id,
    amendReason: 'PEEP misread, it was set lower',
    peepCmH2O: vitals.peepCmH2O,
    recordedAt: slip.recordedAt + 11 * MINUTE_MS,
  })
  writeSettings(world, course, Math.floor(world.nowMs / MINUTE_MS - 71) * MINUTE_MS, vitals, 52)
}
