import { screen, waitFor, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, expect, test, vi } from 'vitest'
import { ScreenPage } from '@/components/screens/screen-page'
import type { ScreenDto, ScreenFormDto } from '@/lib/schemas/screens'
import { judgeScreen } from '@/lib/weaning/screen/judge-screen'
import { isChecked, valueOf } from '../dom'
import { entry, MIN, NO_SCREEN_READINGS, NOW_MS, stepForm } from '../step-fixtures'
import { refusal, serve, show } from '../step-server'

const push = vi.fn()
vi.mock('next/navigation', () => ({ useRouter: () => ({ push }) }))

beforeEach(() => push.mockReset())

const formDto = (change: Partial<ScreenFormDto> = {}): ScreenFormDto => ({
  ...stepForm(),
  screens: [],
  amending: null,
  may: { record: true, amend: true },
  ...change,
})
const line = (name: string) => within(screen.getByRole('group', { name }))
const verdict = () => screen.getByRole('status', { name: 'Verdict as typed so far' })
const choose = (name: string, answer: string) => userEvent.click(line(name).getByRole('radio', { name: answer }))
const record = () => userEvent.click(screen.getByRole('button', { name: 'Record screen' }))

async function fillRest(): Promise<void> {
  await userEvent.type(line('Norepinephrine').getByRole('textbox'), '0.04')
  await choose('Other vasopressor', 'no')
  await choose('Active ischaemia in 24 h', 'no')
}

function open(dto = formDto()) {
  const server = serve(() => dto)
  show(<ScreenPage initial={dto} amend={null} />)
  return server
}

test('a value carried over stands in its field but is not assessed until it is confirmed', async () => {
  open()
  expect(valueOf(line('FiO2').getByRole('textbox'))).toBe('0.4')
  expect(line('FiO2').getByRole('button', { name: /Confirm FiO2, carried over from 06:10/ })).toBeTruthy()
  expect(line('FiO2').getAllByText('not assessed').length).toBeGreaterThan(0)
  expect(verdict().textContent).toContain('Incomplete')
  await userEvent.click(line('FiO2').getByRole('button'))
  expect(line('FiO2').getByText('met')).toBeTruthy()
  expect(verdict().textContent).toContain('4 not assessed: PEEP')
})

test('one tap confirms all, and the verdict follows what is typed', async () => {
  open()
  await userEvent.click(screen.getByRole('button', { name: 'Confirm all 2 carried-over values' }))
  await fillRest()
  expect(verdict().textContent).toContain('Ready')
  await userEvent.clear(line('PEEP').getByRole('textbox'))
  await userEvent.type(line('PEEP').getByRole('textbox'), '9')
  expect(verdict().textContent).toContain('Not ready')
  expect(verdict().textContent).toContain('Not met: PEEP')
})

test('Enter in the field of a value carried over confirms it and moves on', async () => {
  open()
  await userEvent.click(line('FiO2').getByRole('textbox'))
  await userEvent.keyboard('{Enter}')
  expect(line('FiO2').getByText('met')).toBeTruthy()
  expect(document.activeElement).toBe(line('PEEP').getByRole('textbox'))
})

test('recording asks once about values that are not confirmed, and sends them as not assessed only when told to', async () => {
  const { sent } = open()
  await fillRest()
  await record()
  expect(sent).toEqual([])
  const confirm = await screen.findByRole('button', { name: 'Confirm them all' })
  await waitFor(() => expect(document.activeElement).toBe(confirm))
  await userEvent.click(screen.getByRole('button', { name: 'Record them as not assessed' }))
  await waitFor(() => expect(sent).toHaveLength(1))
  expect(sent[0]?.body.readings).toEqual({
    ...NO_SCREEN_READINGS,
    norepinephrineMcgPerKgMin: 0.04,
    otherVasopressor: false,
    ischaemia: false,
  })
})

test('sends what was confirmed and typed, and goes to the patient', async () => {
  const { sent } = open()
  await userEvent.click(screen.getByRole('button', { name: /Confirm all/ }))
  await fillRest()
  await record()
  await waitFor(() => expect(push).toHaveBeenCalledWith('/patients/p1'))
  expect(sent).toHaveLength(1)
  expect(sent[0]).toMatchObject({
    path: '/api/episodes/e1/screens',
    body: {
      episodeId: 'e1',
      observed: { day: '2026-12-01', time: '07:36' },
      excuse: null,
      seenLatestId: null,
      readings: {
        fio2Fraction: 0.4,
        peepCmH2O: 5,
        norepinephrineMcgPerKgMin: 0.04,
        otherVasopressor: false,
        ischaemia: false,
        breathsPerMin: null,
      },
    },
  })
})

test('FiO2 typed as 50 is refused at its field with the likely value, counts for nothing, and nothing else is lost', async () => {
  const { sent } = open()
  await userEvent.click(screen.getByRole('button', { name: /Confirm all/ }))
  await fillRest()
  await userEvent.clear(line('FiO2').getByRole('textbox'))
  await userEvent.type(line('FiO2').getByRole('textbox'), '50')
  expect(verdict().textContent).toContain('Incomplete')
  await record()
  expect(await line('FiO2').findByText('FiO2 is a fraction here: 0.50?')).toBeTruthy()
  await waitFor(() => expect(document.activeElement).toBe(line('FiO2').getByRole('textbox')))
  expect(valueOf(line('Norepinephrine').getByRole('textbox'))).toBe('0.04')
  expect(sent).toEqual([])
})

test('an unusual value is kept only after a second look, and another value asks anew', async () => {
  open()
  const peep = line('PEEP').getByRole('textbox')
  await userEvent.clear(peep)
  await userEvent.type(peep, '25')
  const toggle = line('PEEP').getByRole('checkbox', { name: '25 is unusual: looked again, it is right' })
  await userEvent.click(toggle)
  expect(isChecked(toggle)).toBe(true)
  await userEvent.clear(peep)
  await userEvent.type(peep, '26')
  expect(isChecked(line('PEEP').getByRole('checkbox', { name: /26 is unusual/ }))).toBe(false)
})

test('the RSBI is computed from rate and volume, and how it was measured is asked for', async () => {
  const { sent } = open()
  await userEvent.type(screen.getByRole('textbox', { name: 'Respiratory rate, spontaneous' }), '24')
  await userEvent.type(screen.getByRole('textbox', { name: 'Tidal volume, spontaneous' }), '410')
  expect(line('RSBI').getByText('58.5')).toBeTruthy()
  await userEvent.click(screen.getByRole('button', { name: /Confirm all/ }))
  await record()
  expect(await line('RSBI').findByText(/Say how rate and volume were measured/)).toBeTruthy()
  expect(sent).toEqual([])
})

test('an excuse needs its reason, and goes without readings', async () => {
  const { sent } = open()
  await userEvent.click(screen.getByRole('button', { name: 'Excuse from the screen today' }))
  await userEvent.click(screen.getByRole('button', { name: 'Record as excused today' }))
  expect((await screen.findAllByText('Choose why there is no screen today.')).length).toBeGreaterThan(0)
  expect(sent).toEqual([])
  await userEvent.click(screen.getByRole('radio', { name: 'Prone position' }))
  await userEvent.click(screen.getByRole('button', { name: 'Record as excused today' }))
  await waitFor(() => expect(sent).toHaveLength(1))
  expect(sent[0]?.body).toMatchObject({ excuse: 'prone', readings: null })
})

test('when a colleague recorded meanwhile, the choice is given, and recording both says so', async () => {
  const { sent, answers } = open()
  answers.push(
    refusal(409, {
      code: 'CONFLICT',
      message: 'Invented Colleague recorded a screen in the meantime, at 07:36: ready.',
      requestId: 'r',
    }),
  )
  await userEvent.click(screen.getByRole('button', { name: /Confirm all/ }))
  await fillRest()
  await record()
  const dialog = within(await screen.findByRole('dialog'))
  expect(dialog.getByText(/Invented Colleague recorded a screen/)).toBeTruthy()
  await userEvent.click(dialog.getByRole('button', { name: 'Record mine as well' }))
  await waitFor(() => expect(sent).toHaveLength(2))
  expect(sent[0]?.body.recordAnyway).toBe(false)
  expect(sent[1]?.body.recordAnyway).toBe(true)
  expect(sent[1]?.body.readings).toEqual(sent[0]?.body.readings)
})

test('completing an incomplete screen takes its readings over, to be confirmed', () => {
  const readings = { ...NO_SCREEN_READINGS, fio2Fraction: 0.45, peepCmH2O: 6, otherVasopressor: false, ischaemia: false }
  const left: ScreenDto = {
    ...entry('s1', 20),
    result: 'incomplete',
    excuse: null,
    note: null,
    readings,
    verdict: judgeScreen(stepForm().protocol.content.screen, readings, true),
  }
  open(formDto({ screens: [left], seenLatestId: 's1' }))
  expect(valueOf(line('FiO2').getByRole('textbox'))).toBe('0.45')
  expect(isChecked(line('Other vasopressor').getByRole('radio', { name: 'no' }))).toBe(true)
  expect(line('Other vasopressor').getByRole('button', { name: /Confirm other vasopressor/ })).toBeTruthy()
  expect(verdict().textContent).toContain('5 not assessed')
})

test('values older than 12 h are not carried over', () => {
  const base = stepForm()
  const settings = base.prefill.settings && { ...base.prefill.settings, observedAt: NOW_MS - 721 * MIN }
  open(formDto({ prefill: { settings, gas: null } }))
  expect(valueOf(line('FiO2').getByRole('textbox'))).toBe('')
})

test('under 18 there is no form, and the page says why', () => {
  const base = stepForm()
  open(formDto({ patient: { ...base.patient, ageYears: 17, isAdult: false } }))
  expect(screen.getByText(/under 18/)).toBeTruthy()
  expect(screen.queryByRole('button', { name: 'Record screen' })).toBeNull()
})

test('without the role there is no form', () => {
  open(formDto({ may: { record: false, amend: false } }))
  expect(screen.getByText('An RT or a physician of this unit records the screen.')).toBeTruthy()
  expect(screen.queryByRole('textbox')).toBeNull()
})

test('says when a colleague records a screen while the form is open, and keeps what was typed', async () => {
  let live = formDto()
  serve(() => live)
  show(<ScreenPage initial={live} amend={null} />)
  await userEvent.type(line('Norepinephrine').getByRole('textbox'), '0.04')
  live = formDto({
    screens: [{ ...entry('s2', 0), result: 'ready', excuse: null, note: null, readings: null, verdict: null }],
    seenLatestId: 's2',
  })
  expect(await screen.findByText('Another screen was just recorded', {}, { timeout: 6_000 })).toBeTruthy()
  expect(valueOf(line('Norepinephrine').getByRole('textbox'))).toBe('0.04')
})
