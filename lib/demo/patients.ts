import { FAMILY_NAMES, GIVEN_NAMES } from './names'
import type { DemoPatient, PlacedStay, World } from './world'

/** Adds an invented patient. ageYears is by chance, mostly of older adults, unless given. */
export function addPatient(world: World, firstMs: number, given: { ageYears?: number } = {}): DemoPatient {
  const { random, rows, calendar } = world
  const sex = random.chance(0.44) ? 'female' : 'male'
  const ageYears = given.ageYears ?? Math.round(Math.max(19, Math.min(93, random.normal(62, 15))))
  const heightCm = Math.round(Math.max(148, Math.min(202, random.normal(sex === 'female' ? 163 : 176, 7))))
  const bmi = Math.max(17, Math.min(46, random.normal(28, 5)))
  const patient: DemoPatient = {
    id: random.id(),
    hospitalId: world.hospitalId,
    recordNumber: `KR-${String(100_000 + rows.patients.length * 7 + random.whole(0, 6)).padStart(6, '0')}`,
    familyName: random.pick(FAMILY_NAMES),
    givenName: random.pick(GIVEN_NAMES[sex]),
    birthDate: birthDate(calendar.dayOf(firstMs), ageYears, random.whole(1, 300)),
    sex,
    heightCm,
    weightKg: Math.round(bmi * (heightCm / 100) ** 2),
    createdAt: firstMs,
    createdBy: '',
    version: 1,
  }
  rows.patients.push(patient)
  return patient
}

/** So many days after the birthday that made the patient so many years old. */
function birthDate(day: string, ageYears: number, daysSinceBirthday: number): string {
  const date = new Date(`${day}T12:00:00Z`)
  date.setUTCDate(date.getUTCDate() - daysSinceBirthday)
  return `${date.getUTCFullYear() - ageYears}-${date.toISOString().slice(5, 10).replace('02-29', '02-28')}`
}

/** Adds where the patient was, and names a nurse of the first unit as the one who admitted. */
export function addStays({ rows, random }: World, patient: DemoPatient, stays: readonly PlacedStay[]): void {
  const [first] = stays
  if (!first) throw new Error('A patient needs a bed.')
  patient.createdBy = random.pick(first.unit.staff.nurse)
  for (const { unit, bed, startMs, endMs, end } of stays) {
    rows.stays.push({
      id: random.id(),
      patientId: patient.id,
      unitId: unit.id,
      bedId: bed.id,
      startedAt: startMs,
      endedAt: endMs,
      end,
      version: 1,
    })
  }
}
