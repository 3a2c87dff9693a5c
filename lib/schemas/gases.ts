import { z } from 'zod'
import { entryInput, type EntryDto } from './observed'
import { askSecondLook, optionalReading, requiredReading } from './reading'

/** An arterial blood gas, with the FiO2 at the time it was drawn. */
export const recordGasSchema = z
  .object({
    ...entryInput,
    ph: requiredReading('ph'),
    paCO2MmHg: requiredReading('paCO2MmHg'),
    paO2MmHg: requiredReading('paO2MmHg'),
    fio2Fraction: requiredReading('fio2Fraction'),
    bicarbonateMmolPerL: optionalReading('bicarbonateMmolPerL'),
    lactateMmolPerL: optionalReading('lactateMmolPerL'),
    haemoglobinGPerDl: optionalReading('haemoglobinGPerDl'),
  })
  .superRefine(askSecondLook)
export type RecordGasInput = z.output<typeof recordGasSchema>
export type GasDto = EntryDto & Omit<RecordGasInput, 'episodeId' | 'observed' | 'amends' | 'confirmedUnlikely'>
