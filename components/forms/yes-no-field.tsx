'use client'

import type { FieldValues } from 'react-hook-form'
import { ChoiceField, type ChoiceOption } from './choice-field'
import type { FieldProps } from './field-frame'

type YesNoFieldProps<Values extends FieldValues, Context, Output> = FieldProps<Values, Context, Output> & {
  yes?: string
  no?: string
  clearLabel?: string
  onChosen?: (value: boolean | null) => void
}

/** Yes or no, held as true, false or null while unanswered. */
export function YesNoField<Values extends FieldValues, Context, Output>(props: YesNoFieldProps<Values, Context, Output>) {
  const { yes = 'yes', no = 'no', onChosen, ...rest } = props
  const options: ChoiceOption[] = [
    { value: true, label: yes },
    { value: false, label: no },
  ]
  return <ChoiceField {...rest} options={options} onChosen={(value) => onChosen?.(typeof value === 'boolean' ? value : null)} />
}
