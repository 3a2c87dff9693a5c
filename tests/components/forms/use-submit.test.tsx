import { zodResolver } from '@hookform/resolvers/zod'
import { render, screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useForm } from 'react-hook-form'
import { beforeEach, expect, test, vi } from 'vitest'
import { z } from 'zod'
import { Form } from '@/components/forms/form'
import { FormErrorSummary } from '@/components/forms/form-error-summary'
import { NumberField } from '@/components/forms/number-field'
import { SubmitButton } from '@/components/forms/submit-button'
import { TextField } from '@/components/forms/text-field'
import { useSubmit } from '@/components/forms/use-submit'
import { LOCKED_EVENT, SIGNED_OUT_EVENT } from '@/lib/client/api'
import { Providers } from '@/lib/client/providers'

const schema = z.object({ note: z.string().min(1, 'Write a note.'), peep: z.number({ error: 'Give the PEEP.' }) })
type Sent = { path: string; body: unknown; key: string | null; active: string | null }

let sent: Sent[]
let answers: (() => Promise<Response>)[]

beforeEach(() => {
  sent = []
  answers = []
  vi.spyOn(globalThis, 'fetch').mockImplementation((path, init) => {
    const headers = new Headers(init?.headers)
    sent.push({
      path: String(path),
      body: JSON.parse(String(init?.body)),
      key: headers.get('idempotency-key'),
      active: headers.get('x-daybreath-active'),
    })
    return (answers.shift() ?? (() => Promise.resolve(Response.json({ id: 'e1' }))))()
  })
})

const refusal = (status: number, dto: object) => () => Promise.resolve(Response.json(dto, { status }))

function TestForm({ onRecorded }: { onRecorded: (answer: unknown) => void }) {
  const form = useForm({ resolver: zodResolver(schema), defaultValues: { note: '', peep: null as unknown as number } })
  const submit = useSubmit({ form, path: '/api/notes', onRecorded })
  return (
    <Form submit={submit} label="Note">
      <TextField control={form.control} name="note" label="Note" />
      <NumberField control={form.control} name="peep" label="PEEP" />
      <FormErrorSummary control={form.control} submit={submit} />
      <SubmitButton isSending={submit.isSending}>Record</SubmitButton>
    </Form>
  )
}

function open(): { recorded: unknown[] } {
  const recorded: unknown[] = []
  render(
    <Providers>
      <TestForm onRecorded={(answer) => recorded.push(answer)} />
    </Providers>,
  )
  return { recorded }
}
const note = () => screen.getByRole('textbox', { name: 'Note' })
const peep = () => screen.getByRole('textbox', { name: 'PEEP' })
const button = () => screen.getByRole('button')
async function fill(): Promise<void> {
  await userEvent.type(note(), 'calm night')
  await userEvent.type(peep(), '8')
}

test('sends the values once, with an idempotency key and as caused by a person', async () => {
  const { recorded } = open()
  await fill()
  await userEvent.click(button())
  await waitFor(() => expect(recorded).toEqual([{ id: 'e1' }]))
  expect(sent).toEqual([
    { path: '/api/notes', body: { note: 'calm night', peep: 8 }, key: expect.stringMatching(/^[0-9a-z]{24}$/), active: '1' },
  ])
})

test('is never disabled: pressed too early it sends nothing and leads to the first thing that is missing', async () => {
  open()
  await userEvent.type(note(), 'x')
  expect(button()).toHaveProperty('disabled', false)
  await userEvent.click(button())
  await waitFor(() => expect(document.activeElement).toBe(peep()))
  expect(sent).toEqual([])
  expect(screen.getByRole('alert').textContent).toContain('Give the PEEP.')
})

test('ignores the second half of a double tap, while sending and just after', async () => {
  const { recorded } = open()
  let answer: (response: Response) => void = () => {}
  answers = [
    () =>
      new Promise((resolve) => {
        answer = resolve
      }),
  ]
  await fill()
  await userEvent.dblClick(button())
  await waitFor(() => expect(button().textContent).toBe('Recording…'))
  await userEvent.click(button())
  answer(Response.json({ id: 'e1' }))
  await waitFor(() => expect(recorded).toHaveLength(1))
  await userEvent.click(button())
  await new Promise((resolve) => setTimeout(resolve, 30))
  expect(sent).toHaveLength(1)
  expect(recorded).toHaveLength(1)
})

test('puts the words of the server at their fields, moves there, and loses nothing that was typed', async () => {
  open()
  answers = [
    refusal(422, {
      code: 'INVALID',
      message: 'Please look at the marked field.',
      fields: { peep: 'PEEP is between 0 and 30 cmH2O.' },
      requestId: 'r',
    }),
  ]
  await fill()
  await userEvent.click(button())
  await waitFor(() => expect(document.activeElement).toBe(peep()))
  expect(peep().getAttribute('aria-invalid')).toBe('true')
  expect(screen.getByRole('alert').textContent).toContain('Please look at the marked field.')
  expect(screen.getByRole('link', { name: 'PEEP is between 0 and 30 cmH2O.' })).toBeTruthy()
  expect([note(), peep()].map((field) => (field as HTMLInputElement).value)).toEqual(['calm night', '8'])
})

test('repeats with the same key after a lost answer, so that it cannot be recorded twice, and says that it is not known', async () => {
  const { recorded } = open()
  answers = [() => Promise.reject(new TypeError('network'))]
  await fill()
  await userEvent.click(button())
  await waitFor(() =>
    expect(screen.getByRole('alert').textContent).toContain('it may not have been recorded. What you typed is still here'),
  )
  await userEvent.click(button())
  await waitFor(() => expect(recorded).toHaveLength(1))
  expect(sent[1]).toEqual(sent[0])
})

test('sends nothing from a device that is offline and says that nothing was recorded', async () => {
  open()
  vi.spyOn(window.navigator, 'onLine', 'get').mockReturnValue(false)
  await fill()
  await userEvent.click(button())
  await waitFor(() =>
    expect(screen.getByRole('alert').textContent).toContain('Nothing was recorded; what you typed is still here.'),
  )
  expect(sent).toEqual([])
})

test('takes a new key for the next filling', async () => {
  const { recorded } = open()
  await fill()
  await userEvent.click(button())
  await waitFor(() => expect(recorded).toHaveLength(1))
  await userEvent.type(note(), ', again')
  await userEvent.click(button())
  await waitFor(() => expect(recorded).toHaveLength(2))
  expect(sent[1]?.key).not.toBe(sent[0]?.key)
})

test('tells the page when the screen was locked meanwhile', async () => {
  open()
  const onLocked = vi.fn()
  window.addEventListener(LOCKED_EVENT, onLocked, { once: true })
  answers = [refusal(423, { code: 'LOCKED', message: 'This screen is locked.', requestId: 'r' })]
  await fill()
  await userEvent.click(button())
  await waitFor(() => expect(onLocked).toHaveBeenCalledOnce())
  expect(note()).toHaveProperty('value', 'calm night')
})

test('stays on the page when the session has ended and there is unsaved typing', async () => {
  open()
  window.addEventListener(SIGNED_OUT_EVENT, (event) => event.preventDefault(), { once: true })
  answers = [refusal(401, { code: 'UNAUTHENTICATED', message: 'Please sign in.', requestId: 'r' })]
  await fill()
  await userEvent.click(button())
  await waitFor(() => expect(screen.getByRole('link', { name: 'Sign in in a new tab' })).toBeTruthy())
  expect(note()).toHaveProperty('value', 'calm night')
})

test('moves on to the next field on Enter, and sends from the last one', async () => {
  const { recorded } = open()
  await userEvent.type(note(), 'x{Enter}')
  expect(document.activeElement).toBe(peep())
  expect(sent).toEqual([])
  await userEvent.type(peep(), '5{Enter}')
  await waitFor(() => expect(recorded).toHaveLength(1))
})
