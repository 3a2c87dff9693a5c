'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useState } from 'react'
import { useForm, type FieldErrors } from 'react-hook-form'
import type { z } from 'zod'
import { NO_OBSERVATION } from '@/components/episodes/observation-values'
import { notAnswered } from '@/components/episodes/not-answered'
import { wallClock } from '@/lib/client/wall-clock'
import { startTrialSchema, type TrialFormDto } from '@/lib/schemas/trials'
import { HOUR_MS } from '@/lib/shared/time'

export type TrialStartInput = z.input<typeof startTrialSchema>
export type CarriedField = 'fio2Fraction' | 'baseline.breathsPerMin' | 'baseline.tidalVolumeMl' | 'baseline.spo2Percent'
export type CarriedTrial = Partial<Record<CarriedField, number>>

/** A baseline is of now: measured values older than this are not offered, and settings of the ventilator not older than 12 h. Common practice, no source. */
const BASELINE_CARRIED_MS = HOUR_MS
const SETTING_CARRIED_MS = 12 * HOUR_MS

const parse = zodResolver(startTrialSchema)
const UNCONFIRMED = { type: 'unconfirmed', message: 'Carried over: confirm it, or type the value of now.' }

/** The start of a trial being filled in, with the values that are carried over and not yet confirmed. */
export function useTrialStart(dto: TrialFormDto) {
  const [start] = useState(() => startFrom(dto))
  const [carried, setCarried] = useState<CarriedTrial>(start.carried)
  const resolver: typeof parse = async (values, context, options) => {
    const open = Object.keys(carried)
    if (open.length > 0) return { values: {}, errors: unconfirmedErrors(open) }
    return parse(values, context, options)
  }
  const form = useForm({ shouldFocusError: false, resolver, defaultValues: start.values })
  const confirm = (names: readonly string[]) => {
    setCarried((now) => Object.fromEntries(Object.entries(now).filter(([name]) => !names.includes(name))) as CarriedTrial)
    form.clearErrors(names as CarriedField[])
  }
  return { form, carried, confirm }
}

function unconfirmedErrors(names: readonly string[]): FieldErrors<TrialStartInput> {
  const baseline = Object.fromEntries(
    names.filter((name) => name.startsWith('baseline.')).map((name) => [name.slice('baseline.'.length), UNCONFIRMED]),
  )
  return {
    ...(names.includes('fio2Fraction') ? { fio2Fraction: UNCONFIRMED } : {}),
    ...(Object.keys(baseline).length > 0 ? { baseline } : {}),
  } as FieldErrors<TrialStartInput>
}

function startFrom(dto: TrialFormDto): { values: TrialStartInput; carried: CarriedTrial } {
  const shared = { episodeId: dto.patient.episodeId, seenLatestId: dto.seenLatestId, recordAnyway: false }
  if (dto.amending?.kind === 'start') {
    const { trial } = dto.amending
    const { technique, pressureSupportCmH2O, peepCmH2O, fio2Fraction, plannedDurationMin, startedAnywayBecause, unlikely } = trial
    const values = {
      ...shared,
      observed: wallClock(trial.observedAt, dto.patient.timeZone),
      amends: { id: trial.id, reason: '' },
      technique,
      pressureSupportCmH2O,
      peepCmH2O,
      fio2Fraction,
      plannedDurationMin,
      startedAnywayBecause,
      baseline: baselineOf(trial.baseline),
      confirmedUnlikely: unlikely,
    }
    return { values, carried: {} }
  }
  const { settings } = dto.prefill
  const carried: CarriedTrial = {}
  const offer = <Value>(name: CarriedField, value: Value | null | undefined, forMs: number): Value | null => {
    if (value === null || value === undefined || !settings || dto.nowMs - settings.observedAt > forMs) return null
    carried[name] = settings.observedAt
    return value
  }
  const baseline = baselineOf({
    ...NO_OBSERVATION,
    breathsPerMin: offer('baseline.breathsPerMin', settings?.measuredRatePerMin, BASELINE_CARRIED_MS),
    tidalVolumeMl: offer('baseline.tidalVolumeMl', settings?.measuredTidalVolumeMl, BASELINE_CARRIED_MS),
    spo2Percent: offer('baseline.spo2Percent', settings?.spo2Percent, BASELINE_CARRIED_MS),
  })
  const values = {
    ...shared,
    observed: dto.wallClock,
    amends: null,
    technique: notAnswered<TrialStartInput['technique']>(),
    pressureSupportCmH2O: null,
    peepCmH2O: null,
    fio2Fraction: offer('fio2Fraction', settings?.fio2Fraction, SETTING_CARRIED_MS) ?? notAnswered<number>(),
    plannedDurationMin: dto.protocol.content.trial.defaultDurationMin,
    startedAnywayBecause: null,
    baseline,
    confirmedUnlikely: [],
  }
  return { values, carried }
}

/** Readings as the form starts from: what the baseline must have is left unanswered rather than null. */
function baselineOf(readings: TrialFormDto['trials'][number]['baseline']): TrialStartInput['baseline'] {
  return {
    ...readings,
    breathsPerMin: readings.breathsPerMin ?? notAnswered<number>(),
    spo2Percent: readings.spo2Percent ?? notAnswered<number>(),
    heartRatePerMin: readings.heartRatePerMin ?? notAnswered<number>(),
  }
}
