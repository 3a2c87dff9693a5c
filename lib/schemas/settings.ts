import { z } from 'zod'
import { VENTILATOR_MODES } from '@/lib/weaning/vocabulary'
import { entryInput, type EntryDto } from './observed'
import { askSecondLook, optionalReading, requiredReading } from './reading'

export const recordSettingsSchema = z
  .object({
    ...entryInput,
    mode: z.enum(VENTILATOR_MODES, { error: 'Choose the mode.' }),
    fio2Fraction: requiredReading('fio2Fraction'),
    peepCmH2O: requiredReading('peepCmH2O'),
    setRatePerMin: optionalReading('setRatePerMin'),
    setTidalVolumeMl: optionalReading('setTidalVolumeMl'),
    inspiratoryPressureCmH2O: optionalReading('inspiratoryPressureCmH2O'),
    pressureSupportCmH2O: optionalReading('pressureSupportCmH2O'),
    measuredRatePerMin: optionalReading('measuredRatePerMin'),
    measuredTidalVolumeMl: optionalReading('measuredTidalVolumeMl'),
    peakPressureCmH2O: optionalReading('peakPressureCmH2O'),
    plateauPressureCmH2O: optionalReading('plateauPressureCmH2O'),
    spo2Percent: optionalReading('spo2Percent'),
  })
  .superRefine(askSecondLook)
export type RecordSettingsInput = z.output<typeof recordSettingsSchema>
export type SettingsDto = EntryDto & Omit<RecordSettingsInput, 'episodeId' | 'observed' | 'amends' | 'confirmedUnlikely'>
