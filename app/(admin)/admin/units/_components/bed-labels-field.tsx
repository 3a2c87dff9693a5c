'use client'

import { useState } from 'react'
import type { Control } from 'react-hook-form'
import { CONTROL_LOOK, FieldFrame } from '@/components/forms/field-frame'
import { describedBy, useField } from '@/components/forms/use-field'
import { cn } from '@/lib/shared/cn'
import { readBedLabels } from './read-bed-labels'

type WithLabels = { bedLabels: string[] }

/** Bed labels as one line of text; the form holds the list. What was understood is said below while typing. */
export function BedLabelsField<Values extends WithLabels, Context, Output>({
  control,
}: {
  control: Control<Values, Context, Output>
}) {
  // The name exists in every form that extends WithLabels; the form library cannot see that through the type parameter.
  const { ids, path, value, error, register, change, blur } = useField({
    control: control as unknown as Control<WithLabels>,
    name: 'bedLabels',
  })
  const labels = Array.isArray(value) ? value.map(String) : []
  const [text, setText] = useState(labels.join(', '))
  const hint = (
    <>
      Separated by commas: M01, M02. A row is written M01..M16.{' '}
      <span role="status">
        {labels.length === 0 ? '' : `${labels.length} ${labels.length === 1 ? 'bed' : 'beds'}: ${labels.join(', ')}`}
      </span>
    </>
  )
  return (
    <FieldFrame ids={ids} label="Bed labels" hint={hint} error={error}>
      <input
        id={ids.control}
        type="text"
        name={path}
        ref={register}
        value={text}
        autoComplete="off"
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(ids, hint, error)}
        style={{ width: '28ch' }}
        className={cn(CONTROL_LOOK, 'max-w-full')}
        onChange={(event) => {
          setText(event.target.value)
          change(readBedLabels(event.target.value))
        }}
        onBlur={blur}
      />
    </FieldFrame>
  )
}
