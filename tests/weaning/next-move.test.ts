import { describe, expect, it } from 'vitest'
import type { DayRecord } from '@/lib/weaning/day-record'
import { nextMove } from '@/lib/weaning/next-move'
import { defaultProtocol } from '@/lib/weaning/published/default-protocol'
import { clockAt, clockMs, decisionOf, holdOf, recordOf, screenOf, TODAY, trialOf, YESTERDAY } from './fixtures'

/** The next move of a record at a time of 1 December 2026, window 05:00 to 09:00. */
const moveAt = (time: string, parts: Partial<DayRecord> = {}) =>
  nextMove({ protocol: defaultProtocol, record: recordOf(parts), clock: clockAt(time) })
const times = (since: string, due: string) => ({ sinceMs: clockMs(since), dueMs: clockMs(due) })
const tolerated = (start: string, end: string) => holdOf(start, { endedMs: clockMs(end), outcome: 'tolerated' })
const notNeeded = (time: string) => holdOf(time, { start: 'not_needed' })
const ended = (start: string, end: string, outcome: 'passed' | 'failed' | 'stopped') =>
  trialOf(start, { endedMs: clockMs(end), outcome })
const passedTrial = { screens: [screenOf('06:00')], holds: [notNeeded('06:20')], trials: [ended('06:40', '07:10', 'passed')] }

describe('outside the day', () => {
  it('has no move once ventilation has ended, even with a trial running', () => {
    const move = moveAt('08:00', { episodeEndedMs: clockMs('07:30'), episodeEnd: 'self_extubated', trials: [trialOf('07:20')] })
    expect(move).toEqual({ kind: 'none', reason: { code: 'episode_ended', end: 'self_extubated', atMs: clockMs('07:30') } })
  })
  it('has no move under 18 years or with unknown age', () => {
    expect(moveAt('08:00', { isAdult: false })).toEqual({ kind: 'none', reason: { code: 'not_adult' } })
    expect(moveAt('08:00', { isAdult: null })).toEqual({ kind: 'none', reason: { code: 'age_unknown' } })
  })
})

describe('the screen', () => {
  it('is not owed before the window opens', () => {
    expect(moveAt('04:59')).toEqual({ kind: 'none', reason: { code: 'before_window', opensMs: clockMs('05:00') } })
  })
  it.each([
    ['05:00', false, 'window_open'],
    ['09:00', false, 'window_open'],
    ['09:01', true, 'window_closed'],
    ['23:59', true, 'window_closed'],
  ])('is the RT’s move at %s, overdue %s', (time, isOverdue, code) => {
    expect(moveAt(time)).toMatchObject({
      kind: 'move',
      step: 'screen',
      role: 'rt',
      ...times('05:00', '09:00'),
      isOverdue,
      why: { code },
    })
  })
  it('is owed since the intubation when that came after the window opened', () => {
    expect(moveAt('08:30', { episodeStartedMs: clockMs('08:00') })).toMatchObject({ step: 'screen', ...times('08:00', '09:00') })
    expect(moveAt('10:00', { episodeStartedMs: clockMs('09:00') })).toMatchObject({ step: 'screen', isOverdue: true })
  })
  it('is not owed on a day on which ventilation began after the window had closed', () => {
    expect(moveAt('11:00', { episodeStartedMs: clockMs('09:01') })).toEqual({
      kind: 'none',
      reason: { code: 'started_after_window', startedMs: clockMs('09:01') },
    })
  })
  it('of yesterday does not count for today', () => {
    expect(moveAt('06:00', { screens: [screenOf('06:00', { ventilatorDay: YESTERDAY })] })).toMatchObject({ step: 'screen' })
  })
  it('is owed even when a hold was already recorded', () => {
    expect(moveAt('06:00', { holds: [notNeeded('05:30')] })).toMatchObject({ step: 'screen' })
    expect(moveAt('04:50', { holds: [notNeeded('04:30')] })).toMatchObject({ reason: { code: 'before_window' } })
  })
  it('that is incomplete is to be completed by the end of the window', () => {
    const screens = [screenOf('06:10', { result: 'incomplete', notAssessed: ['cough', 'rass'] })]
    const why = { code: 'not_assessed', criteria: ['cough', 'rass'] }
    expect(moveAt('06:30', { screens })).toMatchObject({
      step: 'complete_screen',
      role: 'rt',
      ...times('06:10', '09:00'),
      isOverdue: false,
      why,
    })
    expect(moveAt('09:30', { screens })).toMatchObject({ step: 'complete_screen', isOverdue: true })
    const late = [screenOf('10:00', { result: 'incomplete', notAssessed: ['cough'] })]
    expect(moveAt('10:30', { screens: late })).toMatchObject({
      step: 'complete_screen',
      ...times('10:00', '10:00'),
      isOverdue: true,
    })
  })
  it('that is not ready ends the day', () => {
    expect(moveAt('08:00', { screens: [screenOf('06:00', { result: 'not_ready', notMet: ['fio2'] })] })).toEqual({
      kind: 'none',
      reason: { code: 'not_ready', criteria: ['fio2'] },
    })
  })
  it('that is excused ends the day', () => {
    expect(moveAt('08:00', { screens: [screenOf('06:00', { result: 'excused', excuse: 'prone' })] })).toEqual({
      kind: 'none',
      reason: { code: 'excused', excuse: 'prone' },
    })
  })
  it('counts by the later of the list when two share a minute', () => {
    const screens = [screenOf('06:00'), screenOf('06:00', { result: 'not_ready', notMet: ['peep'] })]
    expect(moveAt('08:00', { screens })).toMatchObject({ reason: { code: 'not_ready' } })
  })
  it('counts by the latest of the day, whatever the order of the list', () => {
    const screens = [screenOf('07:30'), screenOf('06:00', { result: 'not_ready', notMet: ['peep'] })]
    expect(moveAt('08:00', { screens })).toMatchObject({ step: 'hold', sinceMs: clockMs('07:30') })
    const worse = [screenOf('06:00'), screenOf('07:30', { result: 'not_ready', notMet: ['peep'] })]
    expect(moveAt('08:00', { screens: worse })).toMatchObject({ reason: { code: 'not_ready' } })
  })
})

describe('the sedation hold', () => {
  const screens = [screenOf('06:00')]
  it.each([
    ['06:30', false],
    ['07:00', false],
    ['07:01', true],
  ])('is the nurse’s move after a ready screen, at %s overdue %s', (time, isOverdue) => {
    const why = { code: 'screen_ready', atMs: clockMs('06:00') }
    expect(moveAt(time, { screens })).toMatchObject({ step: 'hold', role: 'nurse', ...times('06:00', '07:00'), isOverdue, why })
  })
  it('of the same day counts even when it was earlier than the latest screen', () => {
    expect(moveAt('07:40', { screens: [screenOf('07:30')], holds: [notNeeded('05:30')] })).toMatchObject({
      step: 'start_trial',
      ...times('07:30', '08:00'),
      why: { code: 'hold_not_needed', atMs: clockMs('05:30') },
    })
  })
  it('of yesterday does not count', () => {
    const yesterdays = holdOf('07:00', { ventilatorDay: YESTERDAY, start: 'not_needed' })
    expect(moveAt('06:30', { screens, holds: [yesterdays] })).toMatchObject({ step: 'hold' })
  })
  it('that is unsafe, not tolerated or stopped ends the day', () => {
    const unsafe = holdOf('06:30', { start: 'unsafe', unsafeBecause: ['raised_icp'] })
    expect(moveAt('08:00', { screens, holds: [unsafe] })).toEqual({
      kind: 'none',
      reason: { code: 'hold_unsafe', items: ['raised_icp'] },
    })
    for (const [outcome, code] of [
      ['not_tolerated', 'hold_not_tolerated'],
      ['stopped', 'hold_stopped'],
    ] as const) {
      const hold = holdOf('06:30', { endedMs: clockMs('07:15'), outcome })
      expect(moveAt('08:00', { screens, holds: [hold] })).toEqual({ kind: 'none', reason: { code, atMs: clockMs('07:15') } })
    }
  })
  it('counts by the latest of the day', () => {
    const holds = [holdOf('06:30', { start: 'unsafe', unsafeBecause: ['raised_icp'] }), notNeeded('07:30')]
    expect(moveAt('08:00', { screens, holds })).toMatchObject({ step: 'start_trial' })
  })
})

describe('a running hold', () => {
  const screens = [screenOf('06:00')]
  it('owes a look 30 min after its start, then after each look', () => {
    const hold = holdOf('07:00')
    expect(moveAt('07:20', { screens, holds: [hold] })).toMatchObject({
      step: 'observe_hold',
      role: 'nurse',
      ...times('07:00', '07:30'),
      isOverdue: false,
      why: { code: 'hold_running', lastObservedMs: null },
    })
    const looked = holdOf('07:00', { lastObservedMs: clockMs('07:35') })
    expect(moveAt('08:06', { screens, holds: [looked] })).toMatchObject({
      step: 'observe_hold',
      ...times('07:35', '08:05'),
      isOverdue: true,
    })
  })
  it('owes its outcome once a fail rule is met', () => {
    const hold = holdOf('07:00', {
      lastObservedMs: clockMs('07:40'),
      failRulesMet: ['breaths_high'],
      failRulesMetMs: clockMs('07:35'),
    })
    expect(moveAt('07:41', { screens, holds: [hold] })).toMatchObject({
      step: 'end_hold',
      role: 'nurse',
      ...times('07:35', '07:35'),
      isOverdue: true,
      why: { code: 'hold_limit_met', rules: ['breaths_high'], ruleWords: ['respiratory rate above 35 /min for 5 min'] },
    })
  })
  it('owes its outcome by the next look once the eyes have opened to voice', () => {
    const hold = holdOf('07:00', { lastObservedMs: clockMs('07:40'), opensEyesMs: clockMs('07:40') })
    expect(moveAt('07:50', { screens, holds: [hold] })).toMatchObject({
      step: 'end_hold',
      ...times('07:40', '08:10'),
      isOverdue: false,
      why: { code: 'hold_eyes_open' },
    })
  })
  it('owes its outcome after 4 h without failing', () => {
    const hold = holdOf('07:00', { lastObservedMs: clockMs('10:50') })
    expect(moveAt('10:59', { screens, holds: [hold] })).toMatchObject({ step: 'observe_hold', dueMs: clockMs('11:00') })
    expect(moveAt('11:00', { screens, holds: [hold] })).toMatchObject({
      step: 'end_hold',
      dueMs: clockMs('11:00'),
      isOverdue: false,
      why: { code: 'hold_long_enough', sinceMs: clockMs('11:00') },
    })
  })
  it('comes first whatever day it began and whatever the screen says', () => {
    const hold = holdOf('23:30', { ventilatorDay: YESTERDAY })
    expect(
      moveAt('06:00', { holds: [hold], screens: [screenOf('05:30', { result: 'not_ready', notMet: ['peep'] })] }),
    ).toMatchObject({
      step: 'end_hold',
      dueMs: clockMs('03:30'),
    })
  })
  it('does not hide the answer to a trial passed during it, nor an extubation signed since, while no fail rule is met', () => {
    const hold = holdOf('06:10')
    const trials = [ended('06:40', '07:10', 'passed')]
    expect(moveAt('07:20', { screens, holds: [hold], trials })).toMatchObject({ step: 'decide' })
    expect(moveAt('07:50', { screens, holds: [hold], trials, decisions: [decisionOf('07:40')] })).toMatchObject({
      step: 'extubate',
    })
    expect(
      moveAt('07:50', { screens, holds: [hold], decisions: [decisionOf('07:40', { choice: 'comfort_extubation' })] }),
    ).toMatchObject({
      step: 'extubate',
    })
    const failing = holdOf('06:10', { failRulesMet: ['new_arrhythmia'], failRulesMetMs: clockMs('07:15') })
    expect(moveAt('07:20', { screens, holds: [failing], trials })).toMatchObject({ step: 'end_hold' })
  })
  it('that began after the trial was passed comes before the answer to it', () => {
    expect(moveAt('07:40', { screens, holds: [holdOf('07:30')], trials: [ended('06:40', '07:10', 'passed')] })).toMatchObject({
      step: 'observe_hold',
    })
  })
  it('comes before "no move" after a failed trial, and before another look', () => {
    const hold = holdOf('06:10')
    expect(moveAt('07:20', { screens, holds: [hold], trials: [ended('06:40', '07:10', 'failed')] })).toMatchObject({
      step: 'observe_hold',
    })
    const decisions = [decisionOf('07:15', { choice: 'not_today', lookAgainMs: clockMs('15:00') })]
    expect(moveAt('07:20', { screens, holds: [hold], trials: [ended('06:40', '07:10', 'passed')], decisions })).toMatchObject({
      step: 'observe_hold',
    })
  })
})

describe('the start of the trial', () => {
  const screens = [screenOf('06:00')]
  it('is due 30 min after a hold that was not needed', () => {
    expect(moveAt('06:40', { screens, holds: [notNeeded('06:20')] })).toMatchObject({
      step: 'start_trial',
      role: 'rt',
      ...times('06:20', '06:50'),
      isOverdue: false,
      why: { code: 'hold_not_needed' },
    })
    expect(moveAt('06:51', { screens, holds: [notNeeded('06:20')] })).toMatchObject({ isOverdue: true })
  })
  it('is due when the pairing window closes after a hold that was tolerated', () => {
    expect(moveAt('08:52', { screens, holds: [tolerated('07:12', '08:20')] })).toMatchObject({
      step: 'start_trial',
      ...times('08:20', '09:12'),
      isOverdue: false,
      why: { code: 'pairing_window', closesMs: clockMs('09:12') },
    })
    expect(moveAt('09:13', { screens, holds: [tolerated('07:12', '08:20')] })).toMatchObject({ isOverdue: true })
  })
  it('is due 30 min after the end of a hold that outlasted the window', () => {
    expect(moveAt('11:05', { screens, holds: [tolerated('07:00', '11:00')] })).toMatchObject({
      step: 'start_trial',
      ...times('11:00', '11:30'),
      why: { code: 'hold_tolerated', atMs: clockMs('11:00') },
    })
  })
  it('is due 30 min after a later screen of the day', () => {
    const record = {
      screens: [screenOf('06:00'), screenOf('13:00')],
      holds: [tolerated('07:00', '08:00')],
      trials: [ended('08:30', '08:50', 'failed')],
    }
    expect(moveAt('13:10', record)).toMatchObject({
      step: 'start_trial',
      ...times('13:00', '13:30'),
      why: { code: 'hold_tolerated' },
    })
  })
})

describe('a running trial', () => {
  const before = { screens: [screenOf('06:00')], holds: [notNeeded('06:20')] }
  const looked = (...clock: string[]) => clock.map((time) => clockMs(time))

  it('owes its looks in order', () => {
    expect(moveAt('08:01', { ...before, trials: [trialOf('08:00')] })).toMatchObject({
      step: 'observe_trial',
      role: 'rt',
      ...times('08:00', '08:02'),
      isOverdue: false,
      why: { code: 'trial_observation', minute: 2 },
    })
    expect(moveAt('08:12', { ...before, trials: [trialOf('08:00', { observedMs: looked('08:02', '08:05') })] })).toMatchObject({
      step: 'observe_trial',
      ...times('08:05', '08:10'),
      isOverdue: true,
      why: { minute: 10 },
    })
  })
  it('owes its outcome as soon as a stop rule is met', () => {
    const trial = trialOf('08:00', {
      observedMs: looked('08:02', '08:05', '08:10'),
      stopRulesMet: ['systolic_low', 'gone'],
      stopRulesMetMs: clockMs('08:05'),
    })
    expect(moveAt('08:11', { ...before, trials: [trial] })).toMatchObject({
      step: 'end_trial',
      role: 'rt',
      ...times('08:05', '08:05'),
      isOverdue: true,
      why: {
        code: 'trial_limit_met',
        rules: ['systolic_low', 'gone'],
        ruleWords: ['systolic blood pressure below 90 mmHg', 'a rule of an earlier protocol version'],
      },
    })
  })
  it('owes its outcome from the planned end on, and says whether the last look is missing', () => {
    const trials = [trialOf('08:00', { observedMs: looked('08:15') })]
    expect(moveAt('08:29', { ...before, trials })).toMatchObject({ step: 'observe_trial', dueMs: clockMs('08:30') })
    expect(moveAt('08:30', { ...before, trials })).toMatchObject({
      step: 'end_trial',
      ...times('08:00', '08:30'),
      isOverdue: false,
      why: { code: 'trial_planned_end', isLastLookMissing: true },
    })
    const done = [trialOf('08:00', { observedMs: looked('08:15', '08:29') })]
    expect(moveAt('08:29', { ...before, trials: done })).toMatchObject({ step: 'end_trial', why: { isLastLookMissing: false } })
    expect(moveAt('08:31', { ...before, trials: done })).toMatchObject({ step: 'end_trial', isOverdue: true })
  })
  it('comes before everything else, whatever day it began', () => {
    const trial = trialOf('23:45', { ventilatorDay: YESTERDAY, plannedDurationMin: 30 })
    expect(moveAt('00:20', { trials: [trial] })).toMatchObject({ step: 'end_trial', dueMs: clockMs('00:15'), isOverdue: true })
    const signed = [decisionOf('07:30')]
    expect(moveAt('08:01', { ...before, trials: [trialOf('08:00')], decisions: signed })).toMatchObject({ step: 'observe_trial' })
  })
  it('comes before a running hold, unless only the hold has a limit met', () => {
    const calm = holdOf('07:30')
    const failing = holdOf('07:30', { failRulesMet: ['spo2_low'], failRulesMetMs: clockMs('08:00') })
    const stopping = trialOf('08:00', { stopRulesMet: ['spo2_low'], stopRulesMetMs: clockMs('08:05') })
    expect(moveAt('08:06', { ...before, holds: [calm], trials: [trialOf('08:00')] })).toMatchObject({ step: 'observe_trial' })
    expect(moveAt('08:06', { ...before, holds: [failing], trials: [trialOf('08:00')] })).toMatchObject({ step: 'end_hold' })
    expect(moveAt('08:06', { ...before, holds: [failing], trials: [stopping] })).toMatchObject({ step: 'end_trial' })
  })
})

describe('after the trial', () => {
  const before = { screens: [screenOf('06:00')], holds: [notNeeded('06:20')] }

  it.each([
    ['07:30', false],
    ['08:10', false],
    ['08:11', true],
  ])('that was passed the physician decides within 60 min, at %s overdue %s', (time, isOverdue) => {
    const why = { code: 'trial_passed', atMs: clockMs('07:10') }
    expect(moveAt(time, passedTrial)).toMatchObject({
      step: 'decide',
      role: 'physician',
      ...times('07:10', '08:10'),
      isOverdue,
      why,
    })
  })
  it('that was passed a later screen does not take the question away', () => {
    expect(moveAt('10:00', { ...passedTrial, screens: [screenOf('06:00'), screenOf('09:30')] })).toMatchObject({ step: 'decide' })
  })
  it('that failed there is no move, with the rules in words', () => {
    const trials = [trialOf('06:40', { endedMs: clockMs('07:00'), outcome: 'failed', stopRulesMet: ['breaths_high'] })]
    expect(moveAt('08:00', { ...before, trials })).toEqual({
      kind: 'none',
      reason: {
        code: 'trial_failed',
        atMs: clockMs('07:00'),
        rules: ['breaths_high'],
        ruleWords: ['respiratory rate above 35 /min for 5 min'],
      },
    })
  })
  it('that was stopped it is due again 4 h later', () => {
    expect(moveAt('08:00', { ...before, trials: [ended('06:40', '07:00', 'stopped')] })).toMatchObject({
      step: 'start_trial',
      role: 'rt',
      ...times('07:00', '11:00'),
      why: { code: 'trial_was_stopped' },
    })
  })
  it('a screen later than a failed or stopped one restarts the flow from that screen', () => {
    for (const outcome of ['failed', 'stopped'] as const) {
      const trials = [ended('06:40', '07:00', outcome)]
      const ready = [screenOf('06:00'), screenOf('08:00')]
      expect(moveAt('08:10', { ...before, screens: ready, trials })).toMatchObject({
        step: 'start_trial',
        ...times('08:00', '08:30'),
      })
      const worse = [screenOf('06:00'), screenOf('08:00', { result: 'not_ready', notMet: ['spo2'] })]
      expect(moveAt('08:10', { ...before, screens: worse, trials })).toMatchObject({ reason: { code: 'not_ready' } })
    }
  })
  it('a screen at or before its end does not restart the flow', () => {
    const trials = [ended('06:40', '07:00', 'failed')]
    expect(moveAt('08:10', { ...before, screens: [screenOf('06:00'), screenOf('07:00')], trials })).toMatchObject({
      reason: { code: 'trial_failed' },
    })
  })
  it('counts by the latest of the day', () => {
    const trials = [ended('06:40', '07:00', 'failed'), ended('12:00', '12:30', 'passed')]
    expect(moveAt('12:40', { ...before, trials })).toMatchObject({ step: 'decide', sinceMs: clockMs('12:30') })
  })
})

describe('the decision', () => {
  const decided = (time: string, parts: Parameters<typeof decisionOf>[1]) => ({
    ...passedTrial,
    decisions: [decisionOf(time, parts)],
  })

  it.each(['extubate', 'comfort_extubation'] as const)('to %s is the RT’s move within 2 h', (choice) => {
    const why = { code: 'decision_signed', atMs: clockMs('07:30'), choice }
    expect(moveAt('08:00', decided('07:30', { choice }))).toMatchObject({
      step: 'extubate',
      role: 'rt',
      ...times('07:30', '09:30'),
      isOverdue: false,
      why,
    })
    expect(moveAt('09:31', decided('07:30', { choice }))).toMatchObject({ step: 'extubate', isOverdue: true })
  })
  it('counts when it was signed at the moment the trial ended, and not when it was signed before', () => {
    expect(moveAt('08:00', decided('07:10', {}))).toMatchObject({ step: 'extubate' })
    expect(moveAt('08:00', decided('07:09', {}))).toMatchObject({ step: 'decide' })
  })
  it('to extubate does not survive a trial that failed after it', () => {
    const trials = [ended('06:40', '07:10', 'failed')]
    expect(moveAt('08:00', { ...passedTrial, trials, decisions: [decisionOf('07:00')] })).toMatchObject({
      reason: { code: 'trial_failed' },
    })
  })
  it('"not today" with a time today is the physician’s again at that time', () => {
    const record = decided('07:30', { choice: 'not_today', lookAgainMs: clockMs('15:00') })
    const why = { code: 'look_again', atMs: clockMs('15:00') }
    expect(moveAt('10:00', record)).toMatchObject({
      step: 'decide_again',
      role: 'physician',
      ...times('07:30', '15:00'),
      isOverdue: false,
      why,
    })
    expect(moveAt('15:01', record)).toMatchObject({ step: 'decide_again', isOverdue: true })
  })
  it('"not today" with a later day, or without a time, leaves no move today', () => {
    for (const atMs of [clockMs('00:00', '2026-12-02'), clockMs('10:00', '2026-12-02'), null]) {
      expect(moveAt('10:00', decided('07:30', { choice: 'not_today', lookAgainMs: atMs }))).toEqual({
        kind: 'none',
        reason: { code: 'look_again_later', atMs },
      })
    }
  })
  it('for the tracheostomy pathway leaves no move', () => {
    expect(moveAt('10:00', decided('07:30', { choice: 'tracheostomy_pathway' }))).toEqual({
      kind: 'none',
      reason: { code: 'tracheostomy_pathway' },
    })
  })
  it('can be signed without a trial, or without a screen', () => {
    const decisions = [decisionOf('07:30', { choice: 'comfort_extubation' })]
    expect(moveAt('08:00', { decisions })).toMatchObject({ step: 'extubate' })
    expect(
      moveAt('08:00', { screens: [screenOf('06:00', { result: 'excused', excuse: 'comfort_care' })], decisions }),
    ).toMatchObject({ step: 'extubate' })
    expect(moveAt('08:00', { screens: [screenOf('07:45')], decisions: [decisionOf('07:30')] })).toMatchObject({
      step: 'extubate',
    })
  })
  it('"not today" without a screen does not replace the screen that is owed', () => {
    const decisions = [decisionOf('05:30', { choice: 'not_today', lookAgainMs: clockMs('15:00') })]
    expect(moveAt('06:00', { decisions })).toMatchObject({ step: 'screen' })
    const night = [decisionOf('03:00', { choice: 'not_today', lookAgainMs: clockMs('15:00') })]
    expect(moveAt('04:00', { decisions: night })).toMatchObject({ step: 'decide_again' })
    expect(moveAt('05:00', { decisions: night })).toMatchObject({ step: 'screen' })
  })
  it('"not today" after a trial stands without a screen', () => {
    const decisions = [decisionOf('07:30', { choice: 'not_today', lookAgainMs: clockMs('15:00') })]
    expect(moveAt('10:00', { trials: passedTrial.trials, decisions })).toMatchObject({ step: 'decide_again' })
  })
  it('"not today" gives way to a later screen that is ready, and to no other', () => {
    for (const choice of ['not_today', 'tracheostomy_pathway'] as const) {
      const record = decided('07:30', { choice, lookAgainMs: clockMs('15:00') })
      expect(moveAt('12:10', { ...record, screens: [screenOf('06:00'), screenOf('12:00')] })).toMatchObject({
        step: 'start_trial',
        ...times('12:00', '12:30'),
      })
    }
    const worse = screenOf('12:00', { result: 'not_ready', notMet: ['spo2'] })
    const record = decided('07:30', { choice: 'not_today', lookAgainMs: clockMs('15:00') })
    expect(moveAt('12:10', { ...record, screens: [screenOf('06:00'), worse] })).toMatchObject({ step: 'decide_again' })
  })
  it('is asked for again by a trial passed after it', () => {
    const record = decided('07:30', { choice: 'not_today', lookAgainMs: clockMs('15:00') })
    const trials = [...passedTrial.trials, ended('12:20', '12:50', 'passed')]
    expect(moveAt('13:00', { ...record, trials })).toMatchObject({ step: 'decide', sinceMs: clockMs('12:50') })
  })
  it('counts by the latest of the day', () => {
    const decisions = [decisionOf('09:00'), decisionOf('07:30', { choice: 'not_today', lookAgainMs: clockMs('09:00') })]
    expect(moveAt('09:10', { ...passedTrial, decisions })).toMatchObject({ step: 'extubate' })
  })
})

describe('what yesterday left open', () => {
  const yesterday = { ventilatorDay: YESTERDAY }
  const passed = trialOf('22:00', { ...yesterday, endedMs: clockMs('22:30', YESTERDAY), outcome: 'passed' })
  const signed = decisionOf('23:00', yesterday)
  const notToday = (lookAgainMs: number | null) => decisionOf('23:00', { ...yesterday, choice: 'not_today', lookAgainMs })

  it('a passed trial without an answer stands until the window opens', () => {
    expect(moveAt('04:59', { trials: [passed] })).toMatchObject({
      step: 'decide',
      dueMs: clockMs('23:30', YESTERDAY),
      isOverdue: true,
    })
    expect(moveAt('05:00', { trials: [passed] })).toMatchObject({ step: 'screen' })
  })
  it('a trial that ran over midnight is answered for', () => {
    const overMidnight = trialOf('23:50', { ...yesterday, endedMs: clockMs('00:20'), outcome: 'passed' })
    expect(moveAt('00:30', { trials: [overMidnight] })).toMatchObject({ step: 'decide', dueMs: clockMs('01:20') })
    expect(moveAt('01:00', { trials: [overMidnight], decisions: [decisionOf('00:40')] })).toMatchObject({ step: 'extubate' })
  })
  it('a signed extubation stands until the window opens', () => {
    expect(moveAt('04:00', { trials: [passed], decisions: [signed] })).toMatchObject({ step: 'extubate', isOverdue: true })
    expect(moveAt('05:00', { trials: [passed], decisions: [signed] })).toMatchObject({ step: 'screen' })
  })
  it('a time to look again stands until the window opens', () => {
    expect(moveAt('04:00', { decisions: [notToday(clockMs('03:00'))] })).toMatchObject({ step: 'decide_again', isOverdue: true })
    expect(moveAt('04:00', { decisions: [notToday(clockMs('10:00'))] })).toMatchObject({ step: 'decide_again', isOverdue: false })
    expect(moveAt('04:00', { decisions: [notToday(clockMs('10:00', '2026-12-03'))] })).toMatchObject({
      reason: { code: 'look_again_later' },
    })
    expect(moveAt('05:00', { decisions: [notToday(clockMs('10:00'))] })).toMatchObject({ step: 'screen' })
  })
  it('nothing stands after a failed trial, a tracheostomy pathway or an empty day', () => {
    const failed = trialOf('22:00', { ...yesterday, endedMs: clockMs('22:30', YESTERDAY), outcome: 'failed' })
    const pathway = decisionOf('23:00', { ...yesterday, choice: 'tracheostomy_pathway' })
    for (const record of [{ trials: [failed] }, { trials: [passed], decisions: [pathway] }, {}]) {
      expect(moveAt('04:00', record)).toMatchObject({ reason: { code: 'before_window' } })
    }
  })
  it('does not reach back more than a day', () => {
    const older = trialOf('22:00', { ventilatorDay: '2026-11-29', endedMs: clockMs('22:30', '2026-11-29'), outcome: 'passed' })
    expect(moveAt('04:00', { trials: [older] })).toMatchObject({ reason: { code: 'before_window' } })
  })
  it('gives way to anything recorded today', () => {
    expect(moveAt('04:50', { trials: [passed], screens: [screenOf('04:40')] })).toMatchObject({ step: 'hold' })
  })
  it('a look promised for today stands when today ends before a trial', () => {
    const decisions = [notToday(clockMs('14:00'))]
    const screens = [screenOf('06:00', { result: 'not_ready', notMet: ['spo2'] })]
    expect(moveAt('08:00', { decisions, screens })).toMatchObject({ step: 'decide_again', dueMs: clockMs('14:00') })
    expect(moveAt('08:00', { decisions: [notToday(clockMs('04:00'))], screens })).toMatchObject({ reason: { code: 'not_ready' } })
    expect(moveAt('08:00', { decisions: [notToday(clockMs('14:00', '2026-12-02'))], screens })).toMatchObject({
      reason: { code: 'not_ready' },
    })
    const excused = [screenOf('06:00', { result: 'excused', excuse: 'prone' })]
    expect(moveAt('08:00', { decisions, screens: excused })).toMatchObject({ reason: { code: 'excused' } })
    const tried = [ended('06:40', '07:00', 'failed')]
    expect(moveAt('08:00', { decisions, screens: [screenOf('06:00')], trials: tried })).toMatchObject({
      reason: { code: 'trial_failed' },
    })
    const again = [ended('06:40', '07:00', 'failed')]
    const later = [screenOf('06:00'), screenOf('07:30', { result: 'not_ready', notMet: ['spo2'] })]
    expect(moveAt('08:00', { decisions, screens: later, trials: again })).toMatchObject({ reason: { code: 'not_ready' } })
  })
})

describe('a whole day', () => {
  it('passes from hand to hand', () => {
    const record = recordOf()
    const stepAt = (time: string) => {
      const move = nextMove({ protocol: defaultProtocol, record, clock: clockAt(time) })
      return move.kind === 'move' ? `${move.role} ${move.step}` : move.reason.code
    }
    const steps = [stepAt('04:00'), stepAt('05:10')]
    record.screens.push(screenOf('06:00'))
    steps.push(stepAt('06:05'))
    record.holds.push(holdOf('07:00'))
    steps.push(stepAt('07:05'))
    record.holds.splice(0, 1, tolerated('07:00', '08:00'))
    steps.push(stepAt('08:05'))
    record.trials.push(trialOf('08:20'))
    steps.push(stepAt('08:21'))
    record.trials.splice(0, 1, ended('08:20', '08:50', 'passed'))
    steps.push(stepAt('08:55'))
    record.decisions.push(decisionOf('09:20'))
    steps.push(stepAt('09:25'))
    Object.assign(record, { episodeEndedMs: clockMs('09:50'), episodeEnd: 'extubated' })
    steps.push(stepAt('10:00'))
    expect(steps).toEqual([
      'before_window',
      'rt screen',
      'nurse hold',
      'nurse observe_hold',
      'rt start_trial',
      'rt observe_trial',
      'physician decide',
      'rt extubate',
      'episode_ended',
    ])
    expect(record.screens[0]?.ventilatorDay).toBe(TODAY)
  })
})
