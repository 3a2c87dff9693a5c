import { zodResolver } from '@hookform/resolvers/zod'
import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useForm } from 'react-hook-form'
import { expect, test } from 'vitest'
import { z } from 'zod'
import { NumberField } from '@/components/forms/number-field'

const schema = z.object({ peep: z.number({ error: 'Give the PEEP.' }).max(30, 'Not above 30 cmH2O.').nullable() })

function TestForm({ given = null, onSent }: { given?: number | null; onSent: (values: unknown) => void }) {
  const form = useForm({ resolver: zodResolver(schema), defaultValues: { peep: given } })
  return (
    <form noValidate onSubmit={(event) => void form.handleSubmit(onSent)(event)}>
      <NumberField control={form.control} name="peep" label="PEEP" unit="cmH2O" hint="8 or less" />
      <button type="button" onClick={() => form.reset({ peep: 6.5 })}>
        Carry over
      </button>
      <button type="submit">Send</button>
    </form>
  )
}

async function sent(type: (field: HTMLElement) => Promise<void>, given: number | null = null): Promise<unknown[]> {
  const calls: unknown[] = []
  render(<TestForm given={given} onSent={(values) => calls.push(values)} />)
  await type(screen.getByRole('textbox', { name: 'PEEP' }))
  await userEvent.click(screen.getByRole('button', { name: 'Send' }))
  return calls
}

test('hands a decimal comma on as a number', async () => {
  expect(await sent((field) => userEvent.type(field, '7,5'))).toEqual([{ peep: 7.5 }])
})

test('hands an emptied field on as not assessed, never as zero', async () => {
  expect(await sent((field) => userEvent.clear(field), 8)).toEqual([{ peep: null }])
})

test('keeps what was typed, though it cannot be read, and says at the field what would be right', async () => {
  expect(await sent((field) => userEvent.type(field, '8 cm'))).toEqual([])
  const field = screen.getByRole('textbox', { name: 'PEEP' })
  expect(field).toHaveProperty('value', '8 cm')
  expect(field.getAttribute('aria-invalid')).toBe('true')
  expect(describedText(field)).toContain('Write a number in digits, such as 0.40.')
})

test('keeps a trailing zero as it was typed', async () => {
  await sent((field) => userEvent.type(field, '8.50'))
  expect(screen.getByRole('textbox', { name: 'PEEP' })).toHaveProperty('value', '8.50')
})

test('wires unit, hint and the message of the schema to the field', async () => {
  expect(await sent((field) => userEvent.type(field, '31'))).toEqual([])
  expect(describedText(screen.getByRole('textbox', { name: 'PEEP' }))).toBe('cmH2O Not above 30 cmH2O. 8 or less')
})

test('shows a value that is set from outside instead of earlier typing', async () => {
  render(<TestForm onSent={() => {}} />)
  const field = screen.getByRole('textbox', { name: 'PEEP' })
  await userEvent.type(field, '9')
  await userEvent.click(screen.getByRole('button', { name: 'Carry over' }))
  expect(field).toHaveProperty('value', '6.5')
})

test('asks the phone for the keypad with a decimal sign', () => {
  render(<TestForm onSent={() => {}} />)
  expect(screen.getByRole('textbox', { name: 'PEEP' }).getAttribute('inputmode')).toBe('decimal')
})

function describedText(field: HTMLElement): string {
  const ids = (field.getAttribute('aria-describedby') ?? '').split(' ')
  return ids.map((id) => document.getElementById(id)?.textContent ?? `missing ${id}`).join(' ')
}
