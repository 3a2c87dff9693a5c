'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { BedsideForm } from '@/components/episodes/bedside-form'
import { ReadingField } from '@/components/episodes/reading-field'
import { useServerNow } from '@/components/episodes/use-server-now'
import { SelectField } from '@/components/forms/select-field'
import { Button } from '@/components/ui/button'
import { clockTime, wallClock } from '@/lib/client/wall-clock'
import type { SettingsFormDto } from '@/lib/schemas/bedside-forms'
import { recordSettingsSchema, type SettingsDto } from '@/lib/schemas/settings'
import { formatDuration } from '@/lib/shared/format'
import { VENTILATOR_MODES } from '@/lib/weaning/vocabulary'
import { MODE_WORDS } from '@/lib/weaning/words'

const SET = [
  'fio2Fraction',
  'peepCmH2O',
  'setRatePerMin',
  'setTidalVolumeMl',
  'inspiratoryPressureCmH2O',
  'pressureSupportCmH2O',
] as const
const MEASURED = [
  'measuredRatePerMin',
  'measuredTidalVolumeMl',
  'peakPressureCmH2O',
  'plateauPressureCmH2O',
  'spo2Percent',
] as const
const MODE_OPTIONS = VENTILATOR_MODES.map((mode) => ({ value: mode, label: `${mode}: ${MODE_WORDS[mode]}` }))
const CARRIED = ['mode', ...SET] as const

const OPTIONAL = {
  setRatePerMin: null,
  setTidalVolumeMl: null,
  inspiratoryPressureCmH2O: null,
  pressureSupportCmH2O: null,
  measuredRatePerMin: null,
  measuredTidalVolumeMl: null,
  peakPressureCmH2O: null,
  plateauPressureCmH2O: null,
  spo2Percent: null,
}

/** Ventilator settings of a moment: what is set, and what is measured with it. */
export function SettingsPage({ dto }: { dto: SettingsFormDto }) {
  const nowMs = useServerNow(dto.nowMs)
  const { amending, latest, patient } = dto
  const form = useSettingsForm(dto)
  const takeOver = () => {
    if (!latest) return
    for (const name of CARRIED) form.setValue(name, latest[name], { shouldDirty: true })
    form.setValue('confirmedUnlikely', latest.unlikely, { shouldDirty: true })
  }
  return (
    <BedsideForm
      dto={dto}
      form={form}
      title="Ventilator settings"
      path={`/api/episodes/${patient.episodeId}/settings`}
      mayRecord={dto.may.record}
      nowMs={nowMs}
    >
      {latest && !amending ? (
        <div>
          <Button onClick={takeOver}>
            Take over what was set at {clockTime(latest.observedAt, patient.timeZone, nowMs)},{' '}
            {formatDuration(nowMs - latest.observedAt)} ago
          </Button>
        </div>
      ) : null}
      <fieldset className="flex flex-col gap-4">
        <legend className="mb-2 text-lg font-bold">Set on the ventilator</legend>
        <SelectField control={form.control} name="mode" label="Mode" options={MODE_OPTIONS} prompt="Choose the mode" />
        <div className="flex flex-wrap gap-x-6 gap-y-4">
          {SET.map((name) => (
            <ReadingField key={name} form={form} name={name} reading={name} />
          ))}
        </div>
      </fieldset>
      <fieldset>
        <legend className="mb-2 text-lg font-bold">Measured</legend>
        <div className="flex flex-wrap gap-x-6 gap-y-4">
          {MEASURED.map((name) => (
            <ReadingField key={name} form={form} name={name} reading={name} />
          ))}
        </div>
      </fieldset>
    </BedsideForm>
  )
}

function useSettingsForm({ amending, patient, wallClock: now }: SettingsFormDto) {
  return useForm({
    resolver: zodResolver(recordSettingsSchema),
    defaultValues: {
      episodeId: patient.episodeId,
      observed: amending ? wallClock(amending.observedAt, patient.timeZone) : now,
      amends: amending ? { id: amending.id, reason: '' } : null,
      confirmedUnlikely: amending?.unlikely ?? [],
      ...OPTIONAL,
      ...(amending ? valuesOf(amending) : {}),
    },
  })
}

function valuesOf(entry: SettingsDto): Pick<SettingsDto, (typeof CARRIED)[number] | (typeof MEASURED)[number]> {
  const { mode, fio2Fraction, peepCmH2O, setRatePerMin, setTidalVolumeMl, inspiratoryPressureCmH2O, pressureSupportCmH2O } = entry
  const { measuredRatePerMin, measuredTidalVolumeMl, peakPressureCmH2O, plateauPressureCmH2O, spo2Percent } = entry
  return {
    mode,
    fio2Fraction,
    peepCmH2O,
    setRatePerMin,
    setTidalVolumeMl,
    inspiratoryPressureCmH2O,
    pressureSupportCmH2O,
    measuredRatePerMin,
    measuredTidalVolumeMl,
    peakPressureCmH2O,
    plateauPressureCmH2O,
    spo2Percent,
  }
}
