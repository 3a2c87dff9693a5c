import { describe, expect, it } from 'vitest'
import type { MoveReason, MoveStep, NextMove, NoMoveReason } from '@/lib/weaning/day-record'
import { describeMove } from '@/lib/weaning/describe-move'
import { STEP_ROLES } from '@/lib/weaning/move/step-roles'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { clockMs } from './fixtures'

const formatTime = (ms: number) => new Date(ms).toISOString().slice(11, 16)
const moveOf = (step: MoveStep, due: string, why: MoveReason, isOverdue = false): NextMove => ({
  kind: 'move',
  step,
  role: STEP_ROLES[step],
  sinceMs: clockMs('06:00'),
  dueMs: clockMs(due),
  isOverdue,
  why,
})
const at = (time: string) => ({ atMs: clockMs(time) })

describe('describeMove', () => {
  it.each<[NextMove, string, string]>([
    [moveOf('screen', '09:00', { code: 'window_open', closesMs: clockMs('09:00') }), 'RT · screen', 'by 09:00'],
    [
      moveOf('screen', '09:00', { code: 'window_closed', closedMs: clockMs('09:00') }, true),
      'RT · screen',
      'screening window closed 09:00',
    ],
    [
      moveOf('complete_screen', '09:00', { code: 'not_assessed', criteria: ['cough', 'rass'] }),
      'RT · complete screen',
      'cough on suction, RASS not assessed · by 09:00',
    ],
    [
      moveOf('hold', '07:10', { code: 'screen_ready', ...at('06:10') }),
      'Nurse · start sedation hold',
      'screen ready 06:10 · by 07:10',
    ],
    [
      moveOf('observe_hold', '09:10', { code: 'hold_running', startedMs: clockMs('07:40'), lastObservedMs: clockMs('08:40') }),
      'Nurse · observe sedation hold',
      'last look 08:40 · by 09:10',
    ],
    [
      moveOf('observe_hold', '08:10', { code: 'hold_running', startedMs: clockMs('07:40'), lastObservedMs: null }, true),
      'Nurse · observe sedation hold',
      'hold began 07:40 · due 08:10',
    ],
    [
      moveOf('end_hold', '08:10', { code: 'hold_limit_met', rules: ['a'], ruleWords: ['new arrhythmia'] }),
      'Nurse · record outcome of hold',
      'limit met: new arrhythmia',
    ],
    [
      moveOf('end_hold', '08:10', { code: 'hold_eyes_open', ...at('07:40') }),
      'Nurse · record outcome of hold',
      'eyes open to voice 07:40 · by 08:10',
    ],
    [
      moveOf('end_hold', '11:00', { code: 'hold_long_enough', sinceMs: clockMs('11:00') }),
      'Nurse · record outcome of hold',
      'lasted long enough without failing at 11:00',
    ],
    [
      moveOf('start_trial', '09:12', { code: 'pairing_window', closesMs: clockMs('09:12') }),
      'RT · start trial',
      'pairing window closes 09:12',
    ],
    [
      moveOf('start_trial', '06:50', { code: 'hold_not_needed', ...at('06:20') }),
      'RT · start trial',
      'no sedation hold needed · by 06:50',
    ],
    [
      moveOf('start_trial', '11:30', { code: 'hold_tolerated', ...at('11:00') }),
      'RT · start trial',
      'hold tolerated 11:00 · by 11:30',
    ],
    [
      moveOf('start_trial', '11:00', { code: 'trial_was_stopped', ...at('07:00') }),
      'RT · start trial',
      'last trial stopped 07:00 · by 11:00',
    ],
    [moveOf('observe_trial', '08:48', { code: 'trial_observation', minute: 30 }, true), 'RT · observation 30 min', 'due 08:48'],
    [
      moveOf('end_trial', '08:48', { code: 'trial_planned_end', ...at('08:48'), isLastLookMissing: true }),
      'RT · record outcome of trial',
      'planned end 08:48 · last observation still due',
    ],
    [
      moveOf('end_trial', '08:48', { code: 'trial_planned_end', ...at('08:48'), isLastLookMissing: false }),
      'RT · record outcome of trial',
      'planned end 08:48',
    ],
    [
      moveOf('end_trial', '08:10', { code: 'trial_limit_met', rules: ['a', 'b'], ruleWords: ['cyanosis', 'sweating'] }),
      'RT · record outcome of trial',
      'limit met: cyanosis; sweating',
    ],
    [moveOf('decide', '08:24', { code: 'trial_passed', ...at('07:24') }), 'Physician · decide', 'trial passed 07:24 · by 08:24'],
    [
      moveOf('decide_again', '15:00', { code: 'look_again', ...at('15:00') }),
      'Physician · look again and decide',
      'look again 15:00',
    ],
    [
      moveOf('extubate', '10:06', { code: 'decision_signed', ...at('08:06'), choice: 'extubate' }),
      'RT · extubate',
      'signed 08:06 · by 10:06',
    ],
    [
      moveOf('extubate', '10:06', { code: 'decision_signed', ...at('08:06'), choice: 'comfort_extubation' }),
      'RT · comfort-focused extubation',
      'signed 08:06 · by 10:06',
    ],
  ])('says %o', (move, title, detail) => {
    expect(describeMove(move, formatTime)).toMatchObject({ title, detail })
  })

  it.each<[NoMoveReason, string, string]>([
    [{ code: 'not_ready', criteria: ['fio2', 'peep'] }, 'No move today', 'screen not ready: FiO2, PEEP not met'],
    [{ code: 'excused', excuse: 'comfort_care' }, 'Excused today', 'comfort care'],
    [
      { code: 'started_after_window', startedMs: clockMs('10:15') },
      'No move today',
      'ventilation began 10:15, after the screening window',
    ],
    [{ code: 'before_window', opensMs: clockMs('05:00') }, 'No move yet', 'screening window opens 05:00'],
    [{ code: 'hold_unsafe', items: ['raised_icp'] }, 'No move today', 'sedation hold unsafe: raised intracranial pressure'],
    [{ code: 'hold_not_tolerated', ...at('07:15') }, 'No move today', 'sedation hold not tolerated 07:15'],
    [{ code: 'hold_stopped', ...at('07:15') }, 'No move today', 'sedation hold stopped 07:15'],
    [
      { code: 'trial_failed', ...at('07:00'), rules: ['x'], ruleWords: ['respiratory rate above 35 /min for 5 min'] },
      'No move today',
      'trial failed 07:00: respiratory rate above 35 /min for 5 min',
    ],
    [{ code: 'trial_failed', ...at('07:00'), rules: [], ruleWords: [] }, 'No move today', 'trial failed 07:00'],
    [{ code: 'look_again_later', ...at('09:00') }, 'No move today', 'not today, look again 09:00'],
    [{ code: 'look_again_later', atMs: null }, 'No move today', 'not today'],
    [{ code: 'tracheostomy_pathway' }, 'No move today', 'tracheostomy pathway'],
    [{ code: 'episode_ended', end: 'self_extubated', ...at('10:12') }, 'Ventilation ended', 'self-extubated 10:12'],
    [{ code: 'episode_ended', end: null, ...at('10:12') }, 'Ventilation ended', 'ended 10:12'],
    [{ code: 'not_adult' }, 'Not computed', 'under 18 years: the criteria are for adults'],
    [{ code: 'age_unknown' }, 'Birth date needed', 'age unknown: nothing is computed until the birth date is recorded'],
  ])('says why there is no move: %o', (reason, title, detail) => {
    expect(describeMove({ kind: 'none', reason }, formatTime)).toEqual({ title, detail, lateness: null })
  })

  it('says how late a move is, or since when without a clock', () => {
    const move = moveOf('observe_trial', '08:48', { code: 'trial_observation', minute: 30 }, true)
    expect(describeMove(move, formatTime, clockMs('08:52')).lateness).toBe('4 min late')
    expect(describeMove(move, formatTime, clockMs('10:16')).lateness).toBe('1 h 28 min late')
    expect(describeMove(move, formatTime, clockMs('10:48')).lateness).toBe('2 h late')
    expect(describeMove(move, formatTime, clockMs('09:48', '2026-12-04')).lateness).toBe('3 d 1 h late')
    expect(describeMove(move, formatTime, clockMs('08:48') + 5000).lateness).toBe('1 min late')
    expect(describeMove(move, formatTime).lateness).toBe('overdue since 08:48')
  })

  it('says nothing of lateness while a move is on time', () => {
    expect(
      describeMove(moveOf('screen', '09:00', { code: 'window_open', closesMs: clockMs('09:00') }), formatTime, clockMs('08:00'))
        .lateness,
    ).toBe(null)
  })
})

describe('sentenceCase', () => {
  it('makes the first letter capital and leaves names as they are written', () => {
    expect(['other vasopressor', 'pH below 7.32', 'FiO2', 'T-piece'].map(sentenceCase)).toEqual([
      'Other vasopressor',
      'pH below 7.32',
      'FiO2',
      'T-piece',
    ])
  })
})
