'use client'

import type { ReactNode } from 'react'
import { useWatch, type FieldPath, type FieldPathValue, type FieldValues, type UseFormReturn } from 'react-hook-form'
import { Toggle } from '@/components/forms/check-field'
import { NumberField } from '@/components/forms/number-field'
import { isUnlikely } from '@/lib/schemas/reading'
import { HARD_LIMITS, type LimitedReading } from '@/lib/weaning/published/hard-limits'
import { readingLabel, readingText, readingUnit } from './reading-label'

type ReadingFieldProps<Values extends FieldValues, Context, Output> = {
  form: UseFormReturn<Values, Context, Output>
  name: FieldPath<Values>
  reading: LimitedReading
  label?: string
  isLabelHidden?: boolean
  beside?: ReactNode
  hint?: ReactNode
  className?: string
  onTyped?: () => void
}

/**
 * A measured value with its unit. What is possible but unusual is kept only after a second look: a toggle appears, and what it confirms is
 * this value; typing another one asks anew. The form holds the confirmed names in `confirmedUnlikely`.
 */
export function ReadingField<Values extends FieldValues, Context, Output>(props: ReadingFieldProps<Values, Context, Output>) {
  const { form, name, reading, label = readingLabel(reading), onTyped, ...rest } = props
  const value: unknown = useWatch({ control: form.control, name })
  const confirmedName = 'confirmedUnlikely' as FieldPath<Values>
  const held: unknown = useWatch({ control: form.control, name: confirmedName })
  const confirmed = Array.isArray(held) ? held.filter((each): each is string => typeof each === 'string') : []
  const setConfirmed = (isConfirmed: boolean) => {
    const others = confirmed.filter((each) => each !== name)
    const next = isConfirmed ? [...others, name] : others
    form.setValue(confirmedName, next as FieldPathValue<Values, FieldPath<Values>>, { shouldDirty: true })
  }
  return (
    <div className="flex min-w-0 flex-col gap-2">
      <NumberField
        {...rest}
        control={form.control}
        name={name}
        label={label}
        unit={readingUnit(reading) || undefined}
        digits={digitsOf(reading)}
        isSigned={HARD_LIMITS[reading].hardMin < 0}
        onTyped={() => {
          if (confirmed.includes(name)) setConfirmed(false)
          onTyped?.()
        }}
      />
      {asksSecondLook(reading, value) ? (
        <Toggle
          label={`${readingText(reading, value)} is unusual: looked again, it is right`}
          isOn={confirmed.includes(name)}
          onToggle={(isOn) => {
            setConfirmed(isOn)
            if (isOn) form.clearErrors(name)
          }}
        />
      ) : null}
    </div>
  )
}

function asksSecondLook(reading: LimitedReading, value: unknown): value is number {
  const { hardMin, hardMax } = HARD_LIMITS[reading]
  return typeof value === 'number' && value >= hardMin && value <= hardMax && isUnlikely(reading, value)
}

function digitsOf(reading: LimitedReading): number {
  const { hardMax, decimals, hardMin } = HARD_LIMITS[reading]
  return Math.max(3, String(Math.floor(hardMax)).length + (decimals > 0 ? decimals + 1 : 0) + (hardMin < 0 ? 1 : 0))
}
