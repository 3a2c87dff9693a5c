'use client'

import type { Control } from 'react-hook-form'
import { ChoiceField } from '@/components/forms/choice-field'
import { TextareaField } from '@/components/forms/textarea-field'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { EXCUSE_REASONS } from '@/lib/weaning/vocabulary'
import { EXCUSE_WORDS } from '@/lib/weaning/words'
import type { ScreenFormInput } from './use-screen-form'

/** Why there is no screen today. Readings already typed stay, and come back with "Back to the criteria". */
export function ExcuseFields({ control }: { control: Control<ScreenFormInput> }) {
  return (
    <div className="flex flex-col gap-5">
      <ChoiceField
        control={control}
        name="excuse"
        label="Why there is no screen today"
        layout="stacked"
        options={EXCUSE_REASONS.map((value) => ({ value, label: sentenceCase(EXCUSE_WORDS[value]) }))}
      />
      <TextareaField
        control={control}
        name="note"
        label="Note"
        hint="Needed for another reason, a few words are enough."
        rows={2}
        maxLength={1000}
      />
    </div>
  )
}
