'use client'

import { useWatch, type FieldValues } from 'react-hook-form'
import { ChoiceField } from '@/components/forms/choice-field'
import type { FieldProps } from '@/components/forms/field-frame'
import { rassLevels } from '@/lib/weaning/published/rass-levels'

const ASCENDING = [...rassLevels].reverse()

/** "−2", "+1": a RASS level as it is said. */
export function rassText(level: number): string {
  return level > 0 ? `+${level}` : String(level).replace('-', '\u2212')
}

/** The ten levels of the RASS side by side; the chosen one is put into words below. */
export function RassChoice<Values extends FieldValues, Context, Output>(
  props: Omit<FieldProps<Values, Context, Output>, 'label' | 'hint'> & { onChosen?: () => void },
) {
  const value: unknown = useWatch({ control: props.control, name: props.name })
  const chosen = rassLevels.find(({ level }) => level === value)
  return (
    <ChoiceField
      {...props}
      label="RASS"
      clearLabel="not assessed"
      options={ASCENDING.map(({ level }) => ({ value: level, label: rassText(level) }))}
      hint={chosen ? `${rassText(chosen.level)}: ${chosen.name}${chosen.words === '' ? '' : `, ${chosen.words}`}` : undefined}
    />
  )
}
