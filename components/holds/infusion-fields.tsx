'use client'

import { useFieldArray, type UseFormReturn } from 'react-hook-form'
import { ChoiceField } from '@/components/forms/choice-field'
import { FieldError } from '@/components/forms/field-frame'
import { NumberField } from '@/components/forms/number-field'
import { SelectField } from '@/components/forms/select-field'
import { TextField } from '@/components/forms/text-field'
import { Button } from '@/components/ui/button'
import { INFUSION_UNITS } from '@/lib/schemas/holds'
import { blankInfusion } from './infusion-input'
import type { HoldStartInput } from './use-hold-start'

const PURPOSES = [
  { value: 'sedation', label: 'for sedation', note: 'stops with the hold' },
  { value: 'pain', label: 'for pain', note: 'goes on' },
]

/** The continuous infusions as they run just before the hold. Restart rates are computed from what stands here. */
export function InfusionFields({ form }: { form: UseFormReturn<HoldStartInput> }) {
  const { fields, append, remove } = useFieldArray({ control: form.control, name: 'infusions' })
  const problem = form.formState.errors.infusions
  const message = problem?.root?.message ?? (typeof problem?.message === 'string' ? problem.message : undefined)
  return (
    <fieldset className="flex flex-col gap-4" data-invalid={message ? '' : undefined}>
      <legend className="mb-2 text-lg font-bold">Continuous infusions running now</legend>
      {fields.map((field, index) => (
        <div
          key={field.id}
          role="group"
          aria-label={`Infusion ${index + 1}`}
          className="flex flex-wrap items-end gap-x-4 gap-y-3 border-t border-line pt-3"
        >
          <TextField control={form.control} name={`infusions.${index}.drug`} label="Drug" width={18} maxLength={60} />
          <NumberField control={form.control} name={`infusions.${index}.rate`} label="Rate" digits={6} />
          <SelectField
            control={form.control}
            name={`infusions.${index}.unit`}
            label="Unit"
            options={INFUSION_UNITS.map((unit) => ({ value: unit, label: unit }))}
          />
          <ChoiceField control={form.control} name={`infusions.${index}.purpose`} label="Given" options={PURPOSES} />
          <Button variant="quiet" onClick={() => remove(index)} aria-label={`Remove infusion ${index + 1}`}>
            Remove
          </Button>
        </div>
      ))}
      <div>
        <Button onClick={() => append(blankInfusion())}>Add an infusion</Button>
      </div>
      <FieldError id="infusions-error" message={message} />
    </fieldset>
  )
}
