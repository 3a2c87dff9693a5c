'use client'

import type { ReactNode } from 'react'
import type { FieldPath, FieldValues, UseFormReturn } from 'react-hook-form'
import { CheckListField } from '@/components/forms/check-field'
import { BEDSIDE_SIGNS } from '@/lib/weaning/vocabulary'
import { SIGN_WORDS } from '@/lib/weaning/words'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { GAS_NUMBERS, type ObservedNumber } from './observation-values'
import { RassChoice } from './rass-choice'
import { ReadingField } from './reading-field'

type ObservationFieldsProps<Values extends FieldValues, Context, Output> = {
  form: UseFormReturn<Values, Context, Output>
  /** Where the readings live: "readings" or "baseline". */
  at: 'readings' | 'baseline'
  numbers: readonly ObservedNumber[]
  hasGas?: boolean
  hasRass?: boolean
  signsLabel?: string
  /** Stands beside a number: the age of a value carried over. */
  besideOf?: (reading: ObservedNumber) => ReactNode
  onTyped?: (reading: ObservedNumber) => void
}

/** One look at the patient: numbers, RASS, and signs as large toggles. */
export function ObservationFields<Values extends FieldValues, Context, Output>(
  props: ObservationFieldsProps<Values, Context, Output>,
) {
  const { form, at, numbers, hasGas = false, hasRass = true, signsLabel = 'Signs seen', besideOf, onTyped } = props
  const name = (reading: string) => `${at}.${reading}` as FieldPath<Values>
  return (
    <div className="flex flex-col gap-5">
      <div className="flex flex-wrap gap-x-5 gap-y-4">
        {numbers.map((reading) => (
          <ReadingField
            key={reading}
            form={form}
            name={name(reading)}
            reading={reading}
            beside={besideOf?.(reading)}
            onTyped={() => onTyped?.(reading)}
          />
        ))}
      </div>
      {hasRass ? <RassChoice control={form.control} name={name('rass')} /> : null}
      <CheckListField
        control={form.control}
        name={name('signs')}
        label={signsLabel}
        hint="What is not marked counts as looked for and not seen."
        tone="stop"
        options={BEDSIDE_SIGNS.map((value) => ({ value, label: sentenceCase(SIGN_WORDS[value]) }))}
      />
      {hasGas ? (
        <details>
          <summary className="min-h-[44px] cursor-pointer py-2.5 underline decoration-line decoration-2 underline-offset-4">
            Blood gas of this moment
          </summary>
          <div className="flex flex-wrap gap-x-5 gap-y-4 pt-2">
            {GAS_NUMBERS.map((reading) => (
              <ReadingField key={reading} form={form} name={name(reading)} reading={reading} />
            ))}
          </div>
        </details>
      ) : null}
    </div>
  )
}
