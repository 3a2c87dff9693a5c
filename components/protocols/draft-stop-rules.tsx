'use client'

import { useState } from 'react'
import { useFieldArray } from 'react-hook-form'
import { NumberField } from '@/components/forms/number-field'
import { TextField } from '@/components/forms/text-field'
import { Button } from '@/components/ui/button'
import { CONTROL_LOOK } from '@/components/forms/field-frame'
import type { StopRule } from '@/lib/weaning/protocol'
import { holdFailGirard2008 } from '@/lib/weaning/published/hold-girard-2008'
import { stopBoles2007 } from '@/lib/weaning/published/stop-boles-2007'
import { stopGirard2008 } from '@/lib/weaning/published/stop-girard-2008'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { describeRule } from '@/lib/weaning/stop/describe-rule'
import { OBSERVED_UNITS } from '@/lib/weaning/words'
import type { DraftForm } from './draft-form'

type ListName = 'content.trial.stopRules' | 'content.hold.failRules'

/** The published lists that a unit can take further rules from. A hold has no baseline, so no change from it. */
const PUBLISHED: Record<ListName, StopRule[]> = {
  'content.trial.stopRules': [...stopGirard2008.rules, ...stopBoles2007.rules].map(({ rule }) => rule),
  'content.hold.failRules': [...holdFailGirard2008.rules, ...stopBoles2007.rules]
    .map(({ rule }) => rule)
    .filter(({ kind }) => kind !== 'change'),
}

/** Rules that stop a trial or end a hold: limits and times can be set, rules taken out, and rules of published lists added. */
export function DraftStopRules({ form, name, label }: { form: DraftForm; name: ListName; label: string }) {
  const rules = useFieldArray({ control: form.control, name, keyName: 'key' })
  const [chosen, setChosen] = useState('')
  const held = new Set(rules.fields.map(({ id }) => id))
  const further = PUBLISHED[name].filter(
    ({ id }, index, all) => !held.has(id) && all.findIndex((rule) => rule.id === id) === index,
  )
  const add = () => {
    const rule = further.find(({ id }) => id === chosen)
    if (rule) rules.append(rule)
    setChosen('')
  }
  return (
    <fieldset className="flex min-w-0 flex-col gap-3">
      <legend className="font-semibold">{label}</legend>
      <ul className="border-t border-line">
        {rules.fields.map((rule, index) => (
          <li key={rule.key} className="flex flex-wrap items-start justify-between gap-3 border-b border-line py-3">
            <RuleFields form={form} path={`${name}.${index}`} rule={rule} />
            <Button variant="quiet" onClick={() => rules.remove(index)}>
              Take out<span className="sr-only">: {describeRule(rule)}</span>
            </Button>
          </li>
        ))}
      </ul>
      <div className="flex flex-wrap items-end gap-3">
        <label className="flex min-w-0 flex-col gap-1.5">
          <span>Add a published rule</span>
          <select className={`${CONTROL_LOOK} max-w-full`} value={chosen} onChange={(event) => setChosen(event.target.value)}>
            <option value="">Choose</option>
            {further.map((rule) => (
              <option key={rule.id} value={rule.id}>
                {sentenceCase(describeRule(rule))}
              </option>
            ))}
          </select>
        </label>
        <Button onClick={add}>Add</Button>
      </div>
    </fieldset>
  )
}

function RuleFields({ form, path, rule }: { form: DraftForm; path: `${ListName}.${number}`; rule: StopRule }) {
  const { control } = form
  const words = sentenceCase(describeRule(rule))
  return (
    <div className="flex min-w-0 flex-col gap-3">
      <p className="font-semibold">{words}</p>
      <div className="flex flex-wrap gap-4">
        {rule.kind === 'limit' ? (
          <NumberField control={control} name={`${path}.limit.value`} label="Limit" unit={OBSERVED_UNITS[rule.reading]} />
        ) : null}
        {rule.kind === 'change' ? (
          <NumberField
            control={control}
            name={`${path}.by`}
            label="Change"
            unit={rule.as === 'percent' ? '%' : OBSERVED_UNITS[rule.reading]}
          />
        ) : null}
        {rule.kind === 'limit' || rule.kind === 'change' ? (
          <NumberField control={control} name={`${path}.sustainedMin`} label="For at least" unit="min" isWhole />
        ) : null}
        {rule.kind === 'signs' ? <NumberField control={control} name={`${path}.atLeast`} label="Signs together" isWhole /> : null}
        <TextField control={control} name={`${path}.source`} label="Source" width={44} />
      </div>
    </div>
  )
}
