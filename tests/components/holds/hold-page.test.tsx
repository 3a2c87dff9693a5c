import { screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test, vi } from 'vitest'
import { HoldPage } from '@/components/holds/hold-page'
import { RestartList } from '@/components/holds/restart-list'
import type { HoldFormDto, HoldObservationDto, RunningHoldDto } from '@/lib/schemas/holds'
import { isChecked, valueOf } from '../dom'
import { entry, look, MIN, NOW_MS, stepForm } from '../step-fixtures'
import { serve, show } from '../step-server'

vi.mock('next/navigation', () => ({ useRouter: () => ({ push: vi.fn() }) }))

const formDto = (change: Partial<HoldFormDto> = {}): HoldFormDto => ({
  ...stepForm(),
  latestScreen: null,
  holds: [],
  running: null,
  lastInfusions: null,
  amending: null,
  may: { start: true, observe: true, end: true },
  ...change,
})
const observation = (id: string, minutesAgo: number): HoldObservationDto => ({
  ...entry(id, minutesAgo),
  readings: look({ rass: -2, spo2Percent: 95 }),
  opensEyesToVoice: 'no',
})
const running = (observations: HoldObservationDto[] = []): RunningHoldDto => ({
  ...entry('h1', 40),
  start: 'started',
  safety: {},
  infusions: [
    { drug: 'propofol', rate: 30, unit: 'mg/h', purpose: 'sedation' },
    { drug: 'fentanyl', rate: 50, unit: 'µg/h', purpose: 'pain' },
  ],
  note: null,
  observations,
  end: null,
  rules: [],
  nextObservationDueMs: NOW_MS - 10 * MIN,
  toleratedByTimeAtMs: NOW_MS + 200 * MIN,
  eyesOpenedAtMs: null,
  isTolerated: false,
  restartFraction: 0.5,
  restartsIfNotTolerated: [{ drug: 'propofol', unit: 'mg/h', rateBefore: 30, rate: 15 }],
})

function open(dto: HoldFormDto) {
  const server = serve(() => dto)
  show(<HoldPage initial={dto} amend={null} />)
  return server
}
const safety = () => within(screen.getByRole('group', { name: /Safety screen/ })).getAllByRole('radiogroup')
async function answerAll(answer: 'yes' | 'no'): Promise<void> {
  for (const item of safety()) await userEvent.click(within(item).getByRole('radio', { name: answer }))
}

test('nothing is chosen beforehand, and no sedation is recorded in two taps', async () => {
  const { sent } = open(formDto())
  for (const radio of screen.getAllByRole('radio')) expect(isChecked(radio)).toBe(false)
  await userEvent.click(screen.getByRole('radio', { name: /hold not needed/ }))
  await userEvent.click(screen.getByRole('button', { name: 'Record: hold not needed' }))
  await waitFor(() => expect(sent).toHaveLength(1))
  expect(sent[0]).toMatchObject({ path: '/api/episodes/e1/holds', body: { start: 'not_needed', safety: null, infusions: [] } })
})

test('a safety item that is not answered keeps the hold from starting', async () => {
  const { sent } = open(formDto())
  await userEvent.click(screen.getByRole('radio', { name: 'Continuous sedation is running' }))
  await userEvent.click(screen.getByRole('button', { name: 'Start the hold' }))
  expect((await screen.findAllByText(/what is not assessed does not count as absent/)).length).toBeGreaterThanOrEqual(
    safety().length,
  )
  expect(sent).toEqual([])
})

test('an item that is present makes the hold unsafe, and the button says so before it is pressed', async () => {
  const { sent } = open(formDto())
  await userEvent.click(screen.getByRole('radio', { name: 'Continuous sedation is running' }))
  await userEvent.click(
    within(screen.getByRole('radiogroup', { name: 'Raised intracranial pressure' })).getByRole('radio', { name: 'yes' }),
  )
  expect(screen.getByText('Unsafe: raised intracranial pressure')).toBeTruthy()
  await userEvent.click(screen.getByRole('button', { name: 'Record: hold unsafe today' }))
  await waitFor(() => expect(sent).toHaveLength(1))
  expect(sent[0]?.body).toMatchObject({ start: 'unsafe', safety: { raised_icp: true } })
})

test('the last hold gives its drugs but never its rates', async () => {
  const { sent } = open(
    formDto({
      lastInfusions: {
        observedAt: NOW_MS - 1440 * MIN,
        infusions: [{ drug: 'propofol', rate: 30, unit: 'mg/h', purpose: 'sedation' }],
      },
    }),
  )
  await userEvent.click(screen.getByRole('radio', { name: 'Continuous sedation is running' }))
  await answerAll('no')
  await userEvent.click(screen.getByRole('button', { name: /Fill in the drugs of the last hold/ }))
  expect(valueOf(screen.getByRole('textbox', { name: 'Drug' }))).toBe('propofol')
  expect(valueOf(screen.getByRole('textbox', { name: 'Rate' }))).toBe('')
  await userEvent.click(screen.getByRole('button', { name: 'Start the hold' }))
  expect((await screen.findAllByText('Give the rate as a number.')).length).toBeGreaterThan(0)
  expect(sent).toEqual([])
  await userEvent.type(screen.getByRole('textbox', { name: 'Rate' }), '25')
  await userEvent.click(screen.getByRole('button', { name: 'Start the hold' }))
  await waitFor(() => expect(sent).toHaveLength(1))
  expect(sent[0]?.body).toMatchObject({
    start: 'started',
    infusions: [{ drug: 'propofol', rate: 25, unit: 'mg/h', purpose: 'sedation' }],
  })
})

test('a running hold counts from the server’s time and says how late the next look is', () => {
  open(formDto({ running: running() }))
  expect(screen.getByRole('timer').textContent).toBe('40:00')
  expect(screen.getByText('Next observation was due 07:26, late by 10 min')).toBeTruthy()
})

test('what is typed into an observation stays when a colleague’s observation arrives', async () => {
  let live = formDto({ running: running() })
  serve(() => live)
  show(<HoldPage initial={live} amend={null} />)
  await userEvent.type(screen.getByRole('textbox', { name: 'SpO2' }), '93')
  live = formDto({ running: running([observation('o1', 1)]) })
  expect(await screen.findByText(/does not open eyes to voice/, {}, { timeout: 6_000 })).toBeTruthy()
  expect(valueOf(screen.getByRole('textbox', { name: 'SpO2' }))).toBe('93')
})

test('a hold that was not tolerated shows half the rate as computed, and what goes on for pain', async () => {
  open(formDto({ running: running() }))
  await userEvent.click(screen.getByRole('button', { name: 'Not tolerated' }))
  expect(screen.getByText('15')).toBeTruthy()
  expect(screen.getByText(/Half of the rate before, computed. The prescriber decides/)).toBeTruthy()
  expect(screen.getAllByText('fentanyl').length).toBeGreaterThan(0)
})

test('a restart rate is never rounded into another one', () => {
  show(<RestartList fraction={0.5} restarts={[{ drug: 'propofol', unit: 'mg/h', rateBefore: 15.5, rate: 7.75 }]} />)
  expect(screen.getByText('7.75')).toBeTruthy()
})
