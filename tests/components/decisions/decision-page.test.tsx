import { screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { expect, test, vi } from 'vitest'
import { DecisionPage } from '@/components/decisions/decision-page'
import type { DecisionDto, DecisionFormDto } from '@/lib/schemas/decisions'
import { isChecked, valueOf } from '../dom'
import { entry, stepForm } from '../step-fixtures'
import { refusal, serve, show } from '../step-server'

vi.mock('next/navigation', () => ({ useRouter: () => ({ push: vi.fn() }) }))

const formDto = (change: Partial<DecisionFormDto> = {}): DecisionFormDto => {
  const base = stepForm()
  return {
    ...base,
    evidence: {
      ventilatorDay: base.ventilatorDay,
      screen: null,
      hold: null,
      trial: null,
      rsbi: null,
      settings: base.prefill.settings,
      gas: null,
      cough: null,
      secretions: null,
    },
    evidenceHash: 'hash-one',
    missing: ['screen', 'trial', 'gas'],
    isTrialRunning: false,
    decisions: [],
    amending: null,
    signerName: 'Invented Physician',
    may: { sign: true },
    ...change,
  }
}

function open(dto = formDto()) {
  const server = serve(() => dto)
  show(<DecisionPage initial={dto} amend={null} />)
  return server
}
const sign = () => userEvent.click(screen.getByRole('button', { name: 'Sign the decision' }))
const password = () => screen.getByLabelText('Your password, to sign')

test('nothing is chosen beforehand, and what is not recorded is named', () => {
  open()
  for (const radio of screen.getAllByRole('radio')) expect(isChecked(radio)).toBe(false)
  expect(screen.getByText('Not recorded: screen, breathing trial, blood gas')).toBeTruthy()
})

test('not today needs reasons, a time to look again and the password', async () => {
  const { sent } = open()
  await userEvent.click(screen.getByRole('radio', { name: 'Not today' }))
  await sign()
  for (const words of ['Give at least one reason.', 'Give your password to sign.', 'on the 24-hour clock, such as 05:40']) {
    expect((await screen.findAllByText((text) => text.includes(words))).length).toBeGreaterThan(0)
  }
  expect(sent).toEqual([])
  await waitFor(() => expect(document.activeElement).toBe(screen.getByRole('checkbox', { name: 'Mental state' })))
})

test('shows the sentence that is signed and sends it with the hash of the evidence on the page', async () => {
  const { sent } = open()
  await userEvent.click(screen.getByRole('radio', { name: 'Not today' }))
  await userEvent.click(screen.getByRole('checkbox', { name: 'Secretions' }))
  await userEvent.type(screen.getByRole('textbox', { name: /Time to look again/ }), '1400')
  await userEvent.type(password(), 'a long enough password')
  expect(screen.getByText(/I have decided not to extubate this patient today \(reason: secretions\)/).textContent).toContain(
    'Signed by Invented Physician, physician, Medical ICU',
  )
  await sign()
  await waitFor(() => expect(sent).toHaveLength(1))
  expect(sent[0]).toMatchObject({
    path: '/api/episodes/e1/decisions',
    body: {
      choice: 'not_today',
      reasons: ['secretions'],
      lookAgain: { day: '2026-12-01', time: '14:00' },
      supportAfter: null,
      seenEvidenceHash: 'hash-one',
      password: 'a long enough password',
    },
  })
})

test('what belongs to another choice is not sent along', async () => {
  const { sent } = open()
  await userEvent.click(screen.getByRole('radio', { name: 'Not today' }))
  await userEvent.click(screen.getByRole('checkbox', { name: 'Secretions' }))
  await userEvent.click(screen.getByRole('radio', { name: 'Extubate' }))
  await userEvent.click(screen.getByRole('radio', { name: 'High flow' }))
  await userEvent.type(password(), 'a long enough password')
  await sign()
  await waitFor(() => expect(sent).toHaveLength(1))
  expect(sent[0]?.body).toMatchObject({ choice: 'extubate', reasons: [], lookAgain: null, supportAfter: 'high_flow' })
})

test('a wrong password is said at its field and nothing typed is lost', async () => {
  const { answers } = open()
  answers.push(
    refusal(422, {
      code: 'INVALID',
      message: 'Please look at the marked field.',
      fields: { password: 'This is not your password. Nothing was signed.' },
      requestId: 'r',
    }),
  )
  await userEvent.click(screen.getByRole('radio', { name: 'Extubate' }))
  await userEvent.click(screen.getByRole('radio', { name: 'Oxygen' }))
  await userEvent.type(screen.getByRole('textbox', { name: 'Note' }), 'awake')
  await userEvent.type(password(), 'wrong')
  await sign()
  expect((await screen.findAllByText('This is not your password. Nothing was signed.')).length).toBeGreaterThan(0)
  expect(valueOf(screen.getByRole('textbox', { name: 'Note' }))).toBe('awake')
  expect(isChecked(screen.getByRole('radio', { name: 'Extubate' }))).toBe(true)
})

test('when the record changes while it is read, the page says so, keeps what was typed, and signs the new state only once it was shown', async () => {
  let live = formDto()
  const { sent } = serve(() => live)
  show(<DecisionPage initial={live} amend={null} />)
  await userEvent.type(screen.getByRole('textbox', { name: 'Note' }), 'awake')
  live = formDto({ evidenceHash: 'hash-two', missing: ['gas'] })
  expect(await screen.findByText('The record changed while this page was open', {}, { timeout: 6_000 })).toBeTruthy()
  expect(screen.getByText('Not recorded: screen, breathing trial, blood gas')).toBeTruthy()
  await userEvent.click(screen.getByRole('button', { name: 'Show the record as it stands now' }))
  expect(screen.getByText('Not recorded: blood gas')).toBeTruthy()
  expect(valueOf(screen.getByRole('textbox', { name: 'Note' }))).toBe('awake')
  await userEvent.click(screen.getByRole('radio', { name: 'Tracheostomy pathway' }))
  await userEvent.type(password(), 'a long enough password')
  await sign()
  await waitFor(() => expect(sent).toHaveLength(1))
  expect(sent[0]?.body.seenEvidenceHash).toBe('hash-two')
})

test('a signed decision shows its statement and the beginning of its hash; only a physician signs', () => {
  const decision: DecisionDto = {
    ...entry('d1', 5),
    choice: 'extubate',
    reasons: [],
    lookAgainAt: null,
    supportAfter: 'oxygen',
    steroidsPlanned: null,
    note: null,
    statement:
      'I have decided to extubate this patient. Signed by Invented Physician, physician, Medical ICU, at 07:31 on 1 Dec 2026.',
    contentHash: '0123456789abcdef0123',
  }
  open(formDto({ decisions: [decision], seenLatestId: 'd1', may: { sign: false } }))
  expect(screen.getByText(decision.statement)).toBeTruthy()
  expect(screen.getByText('0123456789ab')).toBeTruthy()
  expect(screen.queryByRole('button', { name: 'Sign the decision' })).toBeNull()
})
