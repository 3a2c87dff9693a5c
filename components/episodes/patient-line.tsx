import Link from 'next/link'
import type { Sex } from '@/lib/weaning/vocabulary'
import { SEX_WORDS } from '@/lib/weaning/words'

type PatientLineProps = {
  patientId: string
  bedLabel: string
  familyName: string
  givenName: string
  sex: Sex | null
  ageYears: number | null
  heightCm: number | null
  predictedBodyWeightKg: number | null
  ventilatorDayNumber: number | null
}

/** One line that says whom a page is about: bed, name, ventilator day, age, sex, height, predicted body weight. */
export function PatientLine({ patient, isLink = true }: { patient: PatientLineProps; isLink?: boolean }) {
  const name = `${patient.familyName}, ${patient.givenName}`
  return (
    <p className="flex flex-wrap items-baseline gap-x-3 gap-y-0.5">
      <span className="figure text-xl font-semibold text-ink">{patient.bedLabel}</span>
      {isLink ? (
        <Link
          href={`/patients/${patient.patientId}`}
          className="inline-flex min-h-[44px] items-center text-ink underline decoration-line decoration-2 hover:decoration-ink"
        >
          {name}
        </Link>
      ) : (
        <span className="text-ink">{name}</span>
      )}
      <span>{describePatient(patient)}</span>
    </p>
  )
}

/** "ventilator day 2 · man, 61 years, 176 cm · PBW 71.5 kg"; what is not known is said. */
export function describePatient(patient: Omit<PatientLineProps, 'patientId' | 'bedLabel' | 'familyName' | 'givenName'>): string {
  const who = [
    patient.sex === null ? 'sex not recorded' : SEX_WORDS[patient.sex],
    patient.ageYears === null ? 'age not known' : `${patient.ageYears} years`,
    patient.heightCm === null ? 'height not recorded' : `${Math.round(patient.heightCm)} cm`,
  ].join(', ')
  return [
    patient.ventilatorDayNumber === null ? null : `ventilator day ${patient.ventilatorDayNumber}`,
    who,
    patient.predictedBodyWeightKg === null ? 'PBW not computed' : `PBW ${patient.predictedBodyWeightKg.toFixed(1)} kg`,
  ]
    .filter((part) => part !== null)
    .join(' · ')
}
