import { act, render, screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, expect, test, vi } from 'vitest'
import { TodayList } from '@/components/today/today-list'
import type { Membership } from '@/lib/access/policy'
import { Providers } from '@/lib/client/providers'
import type { TodayDto } from '@/lib/schemas/today'
import { makeRow, makeToday, NOW, owed } from './rows'

let answer: () => Promise<Response>
let asked: { path: string; active: string | null }[]

beforeEach(() => {
  asked = []
  answer = () => new Promise(() => {})
  document.cookie = 'daybreath-names=; Max-Age=0; Path=/'
  document.cookie = 'daybreath-keys=; Max-Age=0; Path=/'
  vi.spyOn(globalThis, 'fetch').mockImplementation((path, init) => {
    asked.push({ path: String(path), active: new Headers(init?.headers).get('x-daybreath-active') })
    return answer()
  })
})

function open(first: TodayDto, role: Membership['role'] = 'rt', change: { order?: 'mine' | 'bed'; hidden?: boolean } = {}): void {
  render(
    <Providers>
      <TodayList
        first={first}
        memberships={[{ unitId: 'micu', role }]}
        orderAtFirst={change.order ?? 'mine'}
        areNamesHiddenAtFirst={change.hidden ?? false}
      />
    </Providers>,
  )
}

test('says in one sentence where the unit stands', () => {
  open(
    makeToday([makeRow(1)], {
      counts: { ventilated: 14, screened: 9, ready: 3, onHold: 0, onTrial: 1, decisionsOwed: 2, overdue: 1 },
    }),
  )
  expect(screen.getByText(/ventilated:/).textContent?.replace(/\s+/g, ' ')).toBe(
    '14 ventilated: 9 screened, 3 ready, 1 on trial, 2 decisions owed · 1 overdue',
  )
})

test('opens the patient from the name and the form from the move, for those whose role may', () => {
  open(makeToday([makeRow(3)]))
  expect(screen.getByRole('link', { name: 'Family3, Given' }).getAttribute('href')).toBe('/patients/p3')
  expect(screen.getByRole('link', { name: 'RT · screen, bed M03' }).getAttribute('href')).toBe('/episodes/e3/screen')
})

test('shows the move as plain words to those whose role may not', () => {
  open(makeToday([makeRow(3)]), 'nurse')
  expect(screen.queryByRole('link', { name: /RT · screen/ })).toBeNull()
  expect(screen.getByText('RT · screen')).toBeTruthy()
})

test('says how late an overdue move is', () => {
  open(makeToday([makeRow(3, { move: owed('observe_trial', 'rt', NOW - 240_000, true) })]))
  expect(screen.getByText('4 min late')).toBeTruthy()
})

test('shows no ventilator settings as current once ventilation has ended', () => {
  const ended = { kind: 'none', reason: { code: 'episode_ended', end: 'extubated', atMs: NOW } } as const
  open(makeToday([makeRow(3, { endedAtMs: NOW, move: ended, moveHref: null })]))
  expect(screen.getByRole('heading', { level: 2 }).textContent).toBe('After extubation · 1')
  expect(screen.getByText(/last ventilator day/)).toBeTruthy()
  expect(document.body.textContent).not.toContain('PC-CSV')
})

test('groups by whose move it is, and lists by bed with the empty ones when asked', async () => {
  open(makeToday([makeRow(1, { move: owed('decide', 'physician', NOW) }), makeRow(2)]))
  expect(screen.getAllByRole('heading', { level: 2 }).map((heading) => heading.textContent)).toEqual([
    'Yours · 1',
    'Waiting on others · 1',
  ])
  expect(screen.queryByText(/Nobody ventilated in/)).toBeNull()
  await userEvent.click(screen.getByRole('radio', { name: 'By bed' }))
  const list = screen.getByRole('region', { name: 'By bed · 2' })
  expect(within(list).getAllByRole('listitem')).toHaveLength(2)
  expect(screen.getByText(/Nobody ventilated in/).textContent).toBe('Nobody ventilated in M15, M16')
})

test('hides every name with the switch or the key h, and remembers it for this session only', async () => {
  open(makeToday([makeRow(1), makeRow(2)]))
  await userEvent.keyboard('h')
  expect(screen.queryByText(/Family/)).toBeNull()
  expect(screen.getByRole('link', { name: 'name hidden, bed M01' })).toBeTruthy()
  expect(document.cookie).toContain('daybreath-names=hidden')
  await userEvent.click(screen.getByRole('checkbox', { name: 'Hide names' }))
  expect(screen.getByText('Family1, Given')).toBeTruthy()
})

test('never paints a name on a screen that hides them', () => {
  open(makeToday([makeRow(1)]), 'rt', { hidden: true })
  expect(document.body.innerHTML).not.toContain('Family1')
})

test('leaves the key h alone for people who have turned it off', async () => {
  document.cookie = 'daybreath-keys=off; Path=/'
  open(makeToday([makeRow(1)]))
  await userEvent.keyboard('h')
  expect(screen.getByText('Family1, Given')).toBeTruthy()
})

test('takes in a colleague’s entry by itself and announces the new move by bed, without a name', async () => {
  vi.useFakeTimers({ shouldAdvanceTime: true })
  try {
    open(makeToday([makeRow(1), makeRow(2)]))
    answer = () =>
      Promise.resolve(
        Response.json(
          makeToday([makeRow(1, { move: owed('hold', 'nurse', NOW + 3_600_000) }), makeRow(2)], { nowMs: NOW + 3_000 }),
        ),
      )
    await act(() => vi.advanceTimersByTimeAsync(3_200))
    await waitFor(() => expect(screen.getByText('Nurse · start sedation hold')).toBeTruthy())
    const spoken = screen.getAllByRole('status').map((region) => region.textContent)
    expect(spoken).toContain('Bed M01: Nurse · start sedation hold.')
    expect(spoken.join(' ')).not.toContain('Family')
    expect(asked[0]).toEqual({ path: '/api/units/micu/today', active: null })
  } finally {
    vi.useRealTimers()
  }
})

test('says plainly when the server has not been heard for 15 seconds, and keeps what it showed', async () => {
  vi.useFakeTimers({ shouldAdvanceTime: true })
  try {
    open(makeToday([makeRow(1)]))
    answer = () => Promise.reject(new TypeError('network'))
    await act(() => vi.advanceTimersByTimeAsync(12_000))
    expect(screen.queryByText('Not live')).toBeNull()
    await act(() => vi.advanceTimersByTimeAsync(8_000))
    expect(screen.getByText('Not live')).toBeTruthy()
    expect(screen.getByText('Family1, Given')).toBeTruthy()
    answer = () => Promise.resolve(Response.json(makeToday([makeRow(1)], { nowMs: NOW + 24_000 })))
    await act(() => vi.advanceTimersByTimeAsync(6_000))
    expect(screen.queryByText('Not live')).toBeNull()
  } finally {
    vi.useRealTimers()
  }
})

test('tells how to begin when nobody is ventilated, and offers it only to those who may', () => {
  open(makeToday([]))
  expect(screen.getByRole('link', { name: 'Admit a patient' }).getAttribute('href')).toBe('/units/micu/patients/admit')
})

test('does not offer admission to a unit lead, who may not admit', () => {
  open(makeToday([]), 'unit_lead')
  expect(screen.queryByRole('link', { name: 'Admit a patient' })).toBeNull()
  expect(screen.getByText(/begins by admitting a patient/)).toBeTruthy()
})
