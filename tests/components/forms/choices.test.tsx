import { render, screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { useForm } from 'react-hook-form'
import { expect, test } from 'vitest'
import { CheckListField } from '@/components/forms/check-field'
import { ChoiceField } from '@/components/forms/choice-field'
import { Form } from '@/components/forms/form'
import { ObservedField } from '@/components/forms/observed-field'
import { YesNoField } from '@/components/forms/yes-no-field'

const NOW = Date.parse('2026-12-01T08:52:00Z')
type Values = {
  cough: string | null
  effort: boolean | null
  signs: string[]
  observed: { day: string; time: string; fold?: 'first' | 'second' }
}

function TestForm({ onChange, foldProblem }: { onChange: (values: Values) => void; foldProblem?: string }) {
  const defaultValues: Values = { cough: null, effort: null, signs: [], observed: { day: '2026-12-01', time: '08:00' } }
  const form = useForm<Values>({ defaultValues })
  return (
    <Form
      submit={{
        onSubmit: (event) => {
          event.preventDefault()
          onChange(form.getValues())
        },
      }}
    >
      <ChoiceField
        control={form.control}
        name="cough"
        label="Cough"
        clearLabel="not assessed"
        options={[
          { value: 'strong', label: 'strong' },
          { value: 'weak', label: 'weak' },
        ]}
      />
      <YesNoField control={form.control} name="effort" label="Spontaneous effort" />
      <CheckListField
        control={form.control}
        name="signs"
        label="Signs"
        tone="stop"
        options={[
          { value: 'sweating', label: 'Sweating' },
          { value: 'agitation', label: 'Agitation' },
        ]}
      />
      <ObservedField control={form.control} name="observed" timeZone="America/Denver" nowMs={NOW} />
      <button type="button" onClick={() => form.setError('observed.fold', { message: foldProblem })}>
        Ask
      </button>
      <button type="submit">Send</button>
    </Form>
  )
}

async function send(onto: Values[]): Promise<Values | undefined> {
  await userEvent.click(screen.getByRole('button', { name: 'Send' }))
  return onto.at(-1)
}

test('chooses with the arrow keys and goes back to not assessed', async () => {
  const got: Values[] = []
  render(<TestForm onChange={(values) => got.push(structuredClone(values))} />)
  const group = screen.getByRole('radiogroup', { name: 'Cough' })
  expect(group).toBeTruthy()
  await userEvent.click(screen.getByRole('radio', { name: 'strong' }))
  await userEvent.keyboard('{ArrowRight}')
  expect((await send(got))?.cough).toBe('weak')
  await userEvent.click(screen.getByRole('radio', { name: 'not assessed' }))
  expect((await send(got))?.cough).toBeNull()
})

test('holds no as false and unanswered as null', async () => {
  const got: Values[] = []
  render(<TestForm onChange={(values) => got.push(structuredClone(values))} />)
  expect((await send(got))?.effort).toBeNull()
  await userEvent.click(screen.getByRole('radio', { name: 'no' }))
  expect((await send(got))?.effort).toBe(false)
})

test('keeps a list in the order of its options, whatever order it was tapped in', async () => {
  const got: Values[] = []
  render(<TestForm onChange={(values) => got.push(structuredClone(values))} />)
  await userEvent.click(screen.getByRole('checkbox', { name: 'Agitation' }))
  await userEvent.click(screen.getByRole('checkbox', { name: 'Sweating' }))
  expect((await send(got))?.signs).toEqual(['sweating', 'agitation'])
  await userEvent.click(screen.getByRole('checkbox', { name: 'Agitation' }))
  expect((await send(got))?.signs).toEqual(['sweating'])
})

test('passes over a whole group of choices with Enter', async () => {
  render(<TestForm onChange={() => {}} />)
  await userEvent.click(screen.getByRole('radio', { name: 'weak' }))
  await userEvent.keyboard('{Enter}')
  expect(document.activeElement).toBe(screen.getByRole('radio', { name: 'yes' }))
})

test('reads a typed time on the clock of the unit, and "Now" gives that clock', async () => {
  const got: Values[] = []
  render(<TestForm onChange={(values) => got.push(structuredClone(values))} />)
  const time = screen.getByRole('textbox', { name: 'Time, 24-hour clock' })
  await userEvent.clear(time)
  await userEvent.type(time, '0540')
  expect((await send(got))?.observed).toEqual({ day: '2026-12-01', time: '05:40' })
  expect(time).toHaveProperty('value', '05:40')
  await userEvent.click(screen.getByRole('button', { name: 'Now' }))
  expect((await send(got))?.observed).toEqual({ day: '2026-12-01', time: '01:52' })
})

test('offers yesterday by its name', async () => {
  const got: Values[] = []
  render(<TestForm onChange={(values) => got.push(structuredClone(values))} />)
  await userEvent.selectOptions(screen.getByRole('combobox', { name: 'Day' }), 'yesterday, Mon 30 Nov')
  expect((await send(got))?.observed.day).toBe('2026-11-30')
})

test('asks which of the two hours only when the server says that it was doubled', async () => {
  const got: Values[] = []
  render(<TestForm onChange={(values) => got.push(structuredClone(values))} foldProblem="This hour came twice." />)
  expect(screen.queryByRole('radiogroup', { name: 'Which 08:00' })).toBeNull()
  await userEvent.click(screen.getByRole('button', { name: 'Ask' }))
  await userEvent.click(screen.getByRole('radio', { name: /^the second 08:00/ }))
  expect((await send(got))?.observed.fold).toBe('second')
})
