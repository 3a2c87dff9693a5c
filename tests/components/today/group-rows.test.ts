import { expect, test } from 'vitest'
import { groupOf, groupRows } from '@/components/today/group-rows'
import type { TodayRowDto } from '@/lib/schemas/today'
import type { NextMove } from '@/lib/weaning/day-record'
import { makeRow, owed } from './rows'

const none = (reason: Extract<NextMove, { kind: 'none' }>['reason']): NextMove => ({ kind: 'none', reason })
const row = (bed: number, move: NextMove, change: Partial<TodayRowDto> = {}) => makeRow(bed, { move, ...change })

test('puts the reader’s own moves first, then those of others, then the rest', () => {
  const rows = [
    row(1, none({ code: 'not_ready', criteria: ['fio2'] })),
    row(2, owed('decide', 'physician', 500)),
    row(3, owed('screen', 'rt', 900)),
    row(4, none({ code: 'episode_ended', end: 'extubated', atMs: 0 }), { endedAtMs: 1 }),
    row(5, none({ code: 'before_window', opensMs: 1 })),
    row(6, none({ code: 'age_unknown' })),
  ]
  expect(groupRows(rows, ['rt']).map(({ group, rows: members }) => [group, ...members.map((member) => member.bedLabel)])).toEqual(
    [
      ['yours', 'M03'],
      ['others', 'M02'],
      ['unclear', 'M06'],
      ['later', 'M05'],
      ['none', 'M01'],
      ['after', 'M04'],
    ],
  )
  expect(groupRows(rows, ['physician'])[0]?.rows[0]?.bedLabel).toBe('M02')
})

test('orders what is owed by when it is due, then by bed', () => {
  const rows = [row(1, owed('screen', 'rt', 900)), row(2, owed('observe_trial', 'rt', 300)), row(3, owed('screen', 'rt', 900))]
  expect(groupRows(rows, ['rt'])[0]?.rows.map((member) => member.bedLabel)).toEqual(['M02', 'M01', 'M03'])
})

test('holds every row exactly once, whoever looks', () => {
  const rows = [
    row(1, owed('hold', 'nurse', 1)),
    row(2, none({ code: 'trial_failed', atMs: 1, rules: [], ruleWords: [] })),
    row(3, none({ code: 'not_adult' })),
  ]
  for (const roles of [['rt'], ['nurse'], ['physician'], ['unit_lead'], ['rt', 'nurse', 'physician'], []] as const) {
    const listed = groupRows(rows, roles).flatMap((group) => group.rows.map((member) => member.bedLabel))
    expect(listed.toSorted()).toEqual(['M01', 'M02', 'M03'])
  }
})

test('never says "nothing due until tomorrow" of a patient for whom no move can be worked out', () => {
  expect(groupOf(row(1, none({ code: 'age_unknown' })), ['rt'])).toBe('unclear')
  expect(groupOf(row(1, none({ code: 'before_window', opensMs: 1 })), ['rt'])).toBe('later')
})
