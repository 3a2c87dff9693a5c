import { screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test, vi } from 'vitest'
import { ratePoints } from '@/components/trials/rate-chart'
import { TrialPage } from '@/components/trials/trial-page'
import type { RunningTrialDto, TrialFormDto, TrialObservationDto } from '@/lib/schemas/trials'
import { isChecked, valueOf } from '../dom'
import { entry, look, MIN, NOW_MS, stepForm } from '../step-fixtures'
import { serve, show } from '../step-server'

vi.mock('next/navigation', () => ({ useRouter: () => ({ push: vi.fn() }) }))

const formDto = (change: Partial<TrialFormDto> = {}): TrialFormDto => ({
  ...stepForm(),
  readiness: { isInOrder: true, missing: [], screen: null, hold: null, pairingWindowClosesMs: null },
  trials: [],
  running: null,
  amending: null,
  may: { start: true, observe: true, end: true },
  ...change,
})
const observation = (id: string, minute: number, breathsPerMin: number | null): TrialObservationDto => ({
  ...entry(id, 20 - minute),
  readings: look({ breathsPerMin, spo2Percent: 92 }),
  minute,
  rsbi: null,
})
const running = (change: Partial<RunningTrialDto> = {}): RunningTrialDto => ({
  ...entry('t1', 20),
  technique: 'pressure_support',
  pressureSupportCmH2O: 7,
  peepCmH2O: 5,
  fio2Fraction: 0.4,
  plannedDurationMin: 30,
  baseline: look({ breathsPerMin: 21, spo2Percent: 97, heartRatePerMin: 96 }),
  baselineRsbi: null,
  startedAnywayBecause: null,
  observations: [],
  end: null,
  rules: [],
  plannedEndMs: NOW_MS + 10 * MIN,
  nextObservation: { minute: 15, dueMs: NOW_MS - 5 * MIN },
  ...change,
})

function open(dto: TrialFormDto) {
  const server = serve(() => dto)
  show(<TrialPage initial={dto} amend={null} />)
  return server
}

test('no technique is chosen beforehand, and old measurements are no baseline', () => {
  open(formDto())
  for (const radio of within(screen.getByRole('radiogroup', { name: 'Technique' })).getAllByRole('radio'))
    expect(isChecked(radio)).toBe(false)
  expect(valueOf(screen.getByRole('textbox', { name: 'Respiratory rate' }))).toBe('')
  expect(valueOf(screen.getByRole('textbox', { name: 'FiO2' }))).toBe('0.4')
})

test('a value carried over has to be confirmed before the trial starts', async () => {
  const { sent } = open(formDto())
  await userEvent.click(screen.getByRole('radio', { name: 'T-piece' }))
  await userEvent.type(screen.getByRole('textbox', { name: 'Respiratory rate' }), '20')
  await userEvent.type(screen.getByRole('textbox', { name: 'SpO2' }), '96')
  await userEvent.type(screen.getByRole('textbox', { name: 'Heart rate' }), '88')
  await userEvent.click(screen.getByRole('button', { name: 'Start the trial' }))
  expect((await screen.findAllByText('Carried over: confirm it, or type the value of now.')).length).toBeGreaterThan(0)
  expect(sent).toEqual([])
  await userEvent.click(screen.getByRole('button', { name: /Confirm FiO2, carried over/ }))
  await userEvent.click(screen.getByRole('button', { name: 'Start the trial' }))
  await waitFor(() => expect(sent).toHaveLength(1))
  expect(sent[0]).toMatchObject({
    path: '/api/episodes/e1/trials',
    body: {
      technique: 't_piece',
      fio2Fraction: 0.4,
      peepCmH2O: null,
      pressureSupportCmH2O: null,
      plannedDurationMin: 30,
      startedAnywayBecause: null,
      baseline: { breathsPerMin: 20, tidalVolumeMl: null },
    },
  })
})

test('when the day does not lead to a trial, what is missing is named and a reason asked for', () => {
  const readiness = {
    isInOrder: false,
    missing: ['no screen is recorded today'],
    screen: null,
    hold: null,
    pairingWindowClosesMs: null,
  }
  open(formDto({ readiness }))
  expect(screen.getByText('no screen is recorded today')).toBeTruthy()
  expect(screen.getByRole('textbox', { name: 'Why the trial starts all the same' })).toBeTruthy()
})

test('a running trial shows its clock, how late the next look is, and the last value against its baseline', () => {
  open(formDto({ running: running({ observations: [observation('o1', 10, 33)] }) }))
  expect(screen.getByRole('timer').textContent).toBe('20:00')
  expect(screen.getByText('Observation 15 min was due 07:31, late by 5 min')).toBeTruthy()
  expect(screen.getByRole('img', { name: /minute 0: 21, minute 10: 33/ })).toBeTruthy()
  expect(screen.getByText(/baseline 21/)).toBeTruthy()
})

test('a stop rule that is met is said at once, and leaves the decision at the bedside', () => {
  const met = {
    id: 'r1',
    words: 'respiratory rate above 35 /min for 5 min',
    source: 'a source',
    state: 'met' as const,
    sinceMs: NOW_MS - 6 * MIN,
    metAtMs: NOW_MS,
    reachedAtMs: null,
    isBeyondNow: true,
    lastValue: 37,
  }
  open(formDto({ running: running({ rules: [met] }) }))
  const alert = screen.getAllByRole('alert').find((each) => each.textContent?.includes('A stop rule is met'))
  expect(alert?.textContent).toContain('respiratory rate above 35 /min for 5 min. The clinician at the bedside decides.')
})

test('what is typed into an observation stays when a colleague’s observation arrives', async () => {
  let live = formDto({ running: running() })
  serve(() => live)
  show(<TrialPage initial={live} amend={null} />)
  await userEvent.type(screen.getByRole('textbox', { name: 'Heart rate' }), '101')
  live = formDto({ running: running({ observations: [observation('o1', 15, 28)] }) })
  expect(await screen.findByRole('img', { name: /minute 15: 28/ }, { timeout: 6_000 })).toBeTruthy()
  expect(valueOf(screen.getByRole('textbox', { name: 'Heart rate' }))).toBe('101')
})

test('a pass before the planned end says that it needs a reason; a failure asks what the patient went back to', async () => {
  const { sent } = open(formDto({ running: running() }))
  await userEvent.click(screen.getByRole('button', { name: 'Passed' }))
  expect(screen.getByText('The planned end is 07:46.')).toBeTruthy()
  await userEvent.click(screen.getByRole('radio', { name: 'Failed' }))
  await userEvent.click(screen.getByRole('button', { name: 'Record the end' }))
  expect((await screen.findAllByText(/Say what the patient went back to/)).length).toBeGreaterThan(0)
  expect(sent).toEqual([])
})

test('the chart leaves out looks without a rate and starts from the baseline', () => {
  expect(ratePoints(running({ observations: [observation('a', 5, null), observation('b', 10, 30)] }))).toEqual([
    { minute: 0, rate: 21 },
    { minute: 10, rate: 30 },
  ])
})
