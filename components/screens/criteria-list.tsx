'use client'

import { useWatch, type UseFormReturn } from 'react-hook-form'
import { ChoiceField } from '@/components/forms/choice-field'
import { ReadingField } from '@/components/episodes/reading-field'
import type { ScreenRule } from '@/lib/weaning/protocol'
import type { ScreenReadings } from '@/lib/weaning/readings'
import { valueBesideLimit } from '@/lib/weaning/compare/value-beside-limit'
import { breathingIndex } from '@/lib/weaning/indices/breathing-index'
import { CRITERION_DECIMALS, describeLimit } from '@/lib/weaning/screen/describe-limit'
import type { ScreenVerdict } from '@/lib/weaning/screen/verdict'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { RSBI_CONDITIONS } from '@/lib/weaning/vocabulary'
import { CRITERION_UNITS, CRITERION_WORDS, RSBI_CONDITION_WORDS, UNKNOWN_WORDS } from '@/lib/weaning/words'
import { Value } from '@/components/ui/value'
import { CarriedValues } from '@/components/episodes/carried-values'
import { CriterionField } from './criterion-field'
import { readingsOf, RSBI_READINGS } from './criterion-inputs'
import { CriterionLine } from './criterion-line'
import type { Carried } from './screen-values'
import type { ScreenFormInput } from './use-screen-form'

type CriteriaListProps = {
  form: UseFormReturn<ScreenFormInput>
  rules: readonly ScreenRule[]
  verdict: ScreenVerdict
  /** The readings that count at this moment. */
  counted: ScreenReadings
  carried: Carried
  confirm: (names: readonly string[]) => void
  timeZone: string
  nowMs: number
  isAdult: boolean | null
}

/** The criteria of the unit's protocol, a line each, and the RSBI, which is computed whether or not the unit asks for it. */
export function CriteriaList(props: CriteriaListProps) {
  const { rules, verdict, form, carried, confirm, timeZone, nowMs } = props
  const rsbiRule = rules.find((rule) => rule.criterion === 'rsbi')
  return (
    <div className="border-b-2 border-ink">
      {rules
        .filter((rule) => rule.criterion !== 'rsbi')
        .map((rule) => {
          const names = readingsOf(rule.criterion)
          const open = names.filter((name) => name in carried)
          const judged = verdict.criteria.find((each) => each.criterion === rule.criterion)
          return (
            <CriterionLine
              key={rule.criterion}
              label={sentenceCase(CRITERION_WORDS[rule.criterion])}
              limit={<LimitWords rule={rule} counted={judged?.value ?? null} />}
              source={rule.source}
              mark={judged?.mark ?? null}
              markNote={
                judged?.unknownBecause && judged.unknownBecause !== 'missing' ? UNKNOWN_WORDS[judged.unknownBecause] : undefined
              }
              onKeyDown={(event) => {
                if (event.key === 'Enter' && event.target instanceof HTMLInputElement) confirm(open)
              }}
            >
              <div className="flex flex-wrap items-center gap-x-3 gap-y-2">
                <CriterionField form={form} criterion={rule.criterion} onTyped={() => confirm(open)} />
                <CarriedValues
                  observedAt={open.map((name) => carried[name])}
                  onConfirm={() => confirm(open)}
                  label={CRITERION_WORDS[rule.criterion]}
                  timeZone={timeZone}
                  nowMs={nowMs}
                />
              </div>
            </CriterionLine>
          )
        })}
      <RsbiLine {...props} rule={rsbiRule} />
    </div>
  )
}

function LimitWords({ rule, counted }: { rule: ScreenRule; counted: number | string | boolean | null }) {
  const isComputed = rule.criterion === 'pfRatio' && rule.kind === 'number' && typeof counted === 'number'
  return (
    <>
      {isComputed ? (
        <Value
          value={valueBesideLimit(counted, CRITERION_DECIMALS.pfRatio, rule.limits)}
          unit={CRITERION_UNITS.pfRatio}
          className="block"
        />
      ) : null}
      {describeLimit(rule)}
    </>
  )
}

type RsbiLineProps = Omit<CriteriaListProps, 'rules'> & { rule: ScreenRule | undefined }

/** Rate and volume as typed, the index computed from them, and the condition under which they were measured. */
function RsbiLine({ form, rule, verdict, counted, isAdult, carried, confirm, timeZone, nowMs }: RsbiLineProps) {
  const open = RSBI_READINGS.filter((name) => name in carried)
  const onTyped = () => confirm(open)
  const index = breathingIndex({ breathsPerMin: counted.breathsPerMin, tidalVolumeMl: counted.tidalVolumeMl, isAdult })
  const judged = verdict.criteria.find((each) => each.criterion === 'rsbi')
  const condition: unknown = useWatch({ control: form.control, name: 'readings.rsbiCondition' })
  const limits = rule?.kind === 'number' ? rule.limits : []
  return (
    <CriterionLine
      label="RSBI"
      remark="computed"
      limit={
        <span className="block">
          <Value
            value={index.known ? valueBesideLimit(index.value, CRITERION_DECIMALS.rsbi, limits) : null}
            unit="/min/L"
            size="large"
            className="block"
          />
          {rule ? describeLimit(rule) : 'no criterion of this unit'}
          {condition !== null && condition !== 'unsupported_one_minute' && condition !== undefined
            ? '; reads lower on support than without'
            : ''}
        </span>
      }
      source={
        rule?.source ??
        'Published for one minute without support, on room air: Yang & Tobin 1991, doi:10.1056/NEJM199105233242101'
      }
      mark={judged?.mark ?? null}
      onKeyDown={(event) => {
        if (event.key === 'Enter' && event.target instanceof HTMLInputElement) onTyped()
      }}
    >
      <div className="flex flex-col gap-2">
        <div className="flex flex-wrap gap-x-3 gap-y-2">
          <ReadingField
            form={form}
            name="readings.breathsPerMin"
            reading="breathsPerMin"
            label="Respiratory rate, spontaneous"
            onTyped={onTyped}
          />
          <ReadingField
            form={form}
            name="readings.tidalVolumeMl"
            reading="tidalVolumeMl"
            label="Tidal volume, spontaneous"
            onTyped={onTyped}
          />
        </div>
        <CarriedValues
          observedAt={open.map((name) => carried[name])}
          onConfirm={onTyped}
          label="rate and volume"
          timeZone={timeZone}
          nowMs={nowMs}
        />
        <ChoiceField
          control={form.control}
          name="readings.rsbiCondition"
          label="Measured"
          clearLabel="not assessed"
          onChosen={onTyped}
          options={RSBI_CONDITIONS.map((value) => ({ value, label: RSBI_CONDITION_WORDS[value] }))}
        />
      </div>
    </CriterionLine>
  )
}
