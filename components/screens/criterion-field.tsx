'use client'

import type { UseFormReturn } from 'react-hook-form'
import { ChoiceField } from '@/components/forms/choice-field'
import { YesNoField } from '@/components/forms/yes-no-field'
import { ReadingField } from '@/components/episodes/reading-field'
import { COUGHS, SECRETIONS, type ScreenCriterion } from '@/lib/weaning/vocabulary'
import { COUGH_WORDS, CRITERION_WORDS, SECRETIONS_WORDS } from '@/lib/weaning/words'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { CRITERION_INPUTS } from './criterion-inputs'
import type { ScreenFormInput } from './use-screen-form'
import { RassChoice } from '@/components/episodes/rass-choice'

type CriterionFieldProps = {
  form: UseFormReturn<ScreenFormInput>
  criterion: ScreenCriterion
  onTyped: () => void
}

/** The input of a criterion: numbers, yes or no, or a word. The criterion's name stands beside it, so labels are for screen readers. */
export function CriterionField({ form, criterion, onTyped }: CriterionFieldProps) {
  const input = CRITERION_INPUTS[criterion]
  const label = sentenceCase(CRITERION_WORDS[criterion])
  switch (input.kind) {
    case 'numbers':
      return (
        <div className="flex flex-wrap gap-x-3 gap-y-2">
          {input.readings.map((reading) => (
            <ReadingField
              key={reading.name}
              form={form}
              name={`readings.${reading.name}`}
              reading={reading.name}
              label={reading.label}
              isLabelHidden={input.readings.length === 1}
              onTyped={onTyped}
            />
          ))}
        </div>
      )
    case 'yesNo':
      return (
        <YesNoField
          control={form.control}
          name={`readings.${input.name}`}
          label={label}
          isLabelHidden
          clearLabel="not assessed"
          onChosen={onTyped}
        />
      )
    case 'word':
      return (
        <ChoiceField
          control={form.control}
          name={`readings.${input.name}`}
          label={label}
          isLabelHidden
          clearLabel="not assessed"
          onChosen={onTyped}
          options={
            input.name === 'cough'
              ? COUGHS.map((value) => ({ value, label: COUGH_WORDS[value] }))
              : SECRETIONS.map((value) => ({ value, label: SECRETIONS_WORDS[value] }))
          }
        />
      )
    case 'rass':
      return <RassChoice control={form.control} name="readings.rass" isLabelHidden onChosen={onTyped} />
  }
}
