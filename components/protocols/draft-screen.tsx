'use client'

import { useFieldArray } from 'react-hook-form'
import { CheckListField, Toggle } from '@/components/forms/check-field'
import { NumberField } from '@/components/forms/number-field'
import { SelectField } from '@/components/forms/select-field'
import { TextField } from '@/components/forms/text-field'
import { COUGHS, SCREEN_CRITERIA, SECRETIONS } from '@/lib/weaning/vocabulary'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { describeLimit } from '@/lib/weaning/screen/describe-limit'
import { CRITERION_UNITS, CRITERION_WORDS } from '@/lib/weaning/words'
import { CRITERION_TEMPLATES, FIXED_CRITERIA } from './criterion-templates'
import type { DraftForm } from './draft-form'

export const COMPARATOR_OPTIONS = [
  { value: 'atMost', label: 'at most' },
  { value: 'below', label: 'below' },
  { value: 'atLeast', label: 'at least' },
  { value: 'above', label: 'above' },
]

/** The criteria of the screen: each can be switched on with its limit and the source of it. */
export function DraftScreen({ form }: { form: DraftForm }) {
  const rules = useFieldArray({ control: form.control, name: 'content.screen' })
  const switchTo = (template: (typeof CRITERION_TEMPLATES)[number], isOn: boolean) => {
    const index = rules.fields.findIndex(({ criterion }) => criterion === template.criterion)
    if (!isOn) return rules.remove(index)
    const order = SCREEN_CRITERIA.indexOf(template.criterion)
    const before = rules.fields.findIndex(({ criterion }) => SCREEN_CRITERIA.indexOf(criterion) > order)
    rules.insert(before === -1 ? rules.fields.length : before, template)
  }
  return (
    <ul className="border-t border-line">
      {CRITERION_TEMPLATES.map((template) => {
        const index = rules.fields.findIndex(({ criterion }) => criterion === template.criterion)
        const label = sentenceCase(CRITERION_WORDS[template.criterion])
        return (
          <li key={template.criterion} className="flex flex-col gap-3 border-b border-line py-3">
            {FIXED_CRITERIA.includes(template.criterion) ? (
              <p className="font-semibold">{label}, always on</p>
            ) : (
              <div>
                <Toggle label={label} isOn={index !== -1} onToggle={(isOn) => switchTo(template, isOn)} />
              </div>
            )}
            {index === -1 ? null : (
              <RuleFields key={rules.fields[index]?.id} form={form} index={index} rule={template} label={label} />
            )}
          </li>
        )
      })}
    </ul>
  )
}

type RuleFieldsProps = { form: DraftForm; index: number; rule: (typeof CRITERION_TEMPLATES)[number]; label: string }

function RuleFields({ form, index, rule, label }: RuleFieldsProps) {
  const path = `content.screen.${index}` as const
  const { control } = form
  const limits = rule.kind === 'number' ? (form.getValues(`${path}.limits`) as unknown[]) : []
  return (
    <div className="flex flex-wrap items-start gap-x-6 gap-y-3 pl-2">
      {limits.map((_, place) => (
        <div key={place} className="flex min-w-0 flex-wrap gap-3">
          <SelectField
            control={control}
            name={`${path}.limits.${place}.comparator`}
            label={`${label}: kind of limit`}
            options={COMPARATOR_OPTIONS}
          />
          <NumberField
            control={control}
            name={`${path}.limits.${place}.value`}
            label={`${label}: limit`}
            unit={CRITERION_UNITS[rule.criterion]}
            isSigned={rule.criterion === 'rass'}
          />
        </div>
      ))}
      {rule.kind === 'yesNo' ? (
        <p className="min-h-[44px] pt-2">
          Must be: <span className="font-semibold">{describeLimit(rule)}</span>
        </p>
      ) : null}
      {rule.kind === 'word' ? (
        <CheckListField
          control={control}
          name={`${path}.accept`}
          label={`${label}: accepted`}
          options={(rule.criterion === 'cough' ? COUGHS : SECRETIONS).map((word) => ({ value: word, label: word }))}
          className="min-w-0 basis-full"
        />
      ) : null}
      <TextField control={control} name={`${path}.source`} label={`${label}: source`} width={44} className="min-w-0" />
    </div>
  )
}
