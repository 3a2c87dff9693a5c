import type { PatientRow } from '@/lib/access/door'
import type { PatientPageDto } from '@/lib/schemas/patient-page'
import type { PatientHeadDto } from '@/lib/schemas/patients'
import { listUnlikely } from '@/lib/schemas/reading'
import type { SettingsDto } from '@/lib/schemas/settings'
import { ageYears } from '@/lib/shared/time'
import { isAdult } from '@/lib/weaning/indices/is-adult'
import { predictedBodyWeight } from '@/lib/weaning/indices/predicted-body-weight'
import { tidalVolumePerKg } from '@/lib/weaning/indices/tidal-volume-per-kg'

/** Who the patient is, on a calendar day (yyyy-mm-dd). */
export function toPatientHead(patient: PatientRow, day: string): PatientHeadDto {
  const age = ageYears(patient.birthDate, day)
  return {
    id: patient.id,
    recordNumber: patient.recordNumber,
    familyName: patient.familyName,
    givenName: patient.givenName,
    birthDate: patient.birthDate,
    ageYears: age,
    isAdult: isAdult(age),
    sex: patient.sex,
    heightCm: patient.heightCm,
    weightKg: patient.weightKg,
    version: patient.version,
    unlikely: listUnlikely({ heightCm: patient.heightCm, weightKg: patient.weightKg }),
  }
}

function weigh(patient: PatientRow, adult: boolean | null) {
  return predictedBodyWeight({ sex: patient.sex, heightCm: patient.heightCm, isAdult: adult })
}

/** Predicted body weight in kg, or why there is none. */
export function toBodyDto(
  patient: PatientRow,
  adult: boolean | null,
): Pick<PatientPageDto, 'predictedBodyWeightKg' | 'isHeightOutsideRange'> {
  const weight = weigh(patient, adult)
  if (!weight.known) return { predictedBodyWeightKg: weight, isHeightOutsideRange: false }
  return { predictedBodyWeightKg: { known: true, value: weight.value }, isHeightOutsideRange: weight.isOutsideRange }
}

/** Tidal volume per kg of predicted body weight from settings: the measured volume, else the set one. */
export function toTidalVolumePerKg(
  settings: SettingsDto | null,
  patient: PatientRow,
  adult: boolean | null,
): PatientPageDto['tidalVolumePerKg'] {
  const volume = settings?.measuredTidalVolumeMl ?? settings?.setTidalVolumeMl ?? null
  const from = settings === null || volume === null ? null : settings.measuredTidalVolumeMl === null ? 'set' : 'measured'
  return {
    reading: tidalVolumePerKg({ tidalVolumeMl: volume, predictedBodyWeight: weigh(patient, adult) }),
    from,
    observedAt: from === null ? null : (settings?.observedAt ?? null),
  }
}
