'use client'

import type { FieldPath, FieldValues, UseFormReturn } from 'react-hook-form'
import { ReadingField } from '@/components/episodes/reading-field'
import { ChoiceField } from '@/components/forms/choice-field'
import { DateField } from '@/components/forms/date-field'
import { TextField } from '@/components/forms/text-field'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { SEXES } from '@/lib/weaning/vocabulary'
import { SEX_WORDS } from '@/lib/weaning/words'

/** Who the patient is, and the body that predicted weight goes by. What is not known stays open, and then nothing is computed from it. */
export function IdentityFields<Values extends FieldValues, Context, Output>({
  form,
  today,
}: {
  form: UseFormReturn<Values, Context, Output>
  today: string
}) {
  const name = (field: string) => field as FieldPath<Values>
  return (
    <>
      <TextField control={form.control} name={name('recordNumber')} label="Record number" width={18} maxLength={40} />
      <div className="flex flex-wrap gap-x-5 gap-y-4">
        <TextField control={form.control} name={name('familyName')} label="Family name" width={26} maxLength={80} />
        <TextField control={form.control} name={name('givenName')} label="Given name" width={26} maxLength={80} />
      </div>
      <DateField
        control={form.control}
        name={name('birthDate')}
        label="Date of birth"
        max={today}
        hint="Without it, criteria and indices are not computed: they are for adults."
      />
      <ChoiceField
        control={form.control}
        name={name('sex')}
        label="Sex, for predicted body weight"
        options={SEXES.map((value) => ({ value, label: sentenceCase(SEX_WORDS[value]) }))}
        clearLabel="not recorded"
      />
      <div className="flex flex-wrap gap-x-5 gap-y-4">
        <ReadingField form={form} name={name('heightCm')} reading="heightCm" hint="For predicted body weight" />
        <ReadingField form={form} name={name('weightKg')} reading="weightKg" hint="For doses; measured or estimated" />
      </div>
    </>
  )
}
