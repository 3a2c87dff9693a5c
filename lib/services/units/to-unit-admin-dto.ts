import 'server-only'
import type { Tx } from '@/db/client'
import { findUnitOfHospital, listBedsOf, type listUnitsOfHospital } from '@/db/queries/units'
import type { UnitAdminDto } from '@/lib/schemas/units'
import { AppError } from '@/lib/shared/errors'

type UnitRow = ReturnType<typeof listUnitsOfHospital>[number]

/** Units as their administration sees them: settings and bed labels, nothing about who lies there. */
export function toUnitAdminDtos(tx: Tx, units: readonly UnitRow[]): UnitAdminDto[] {
  const beds = listBedsOf(
    tx,
    units.map((unit) => unit.id),
  )
  return units.map((unit) => ({
    id: unit.id,
    name: unit.name,
    timeZone: unit.timeZone,
    altitudeM: unit.altitudeM,
    barometricPressureMmHg: unit.barometricPressureMmHg,
    dayTrackFromHour: unit.dayTrackFromHour,
    dayTrackToHour: unit.dayTrackToHour,
    version: unit.version,
    beds: beds
      .filter((bed) => bed.unitId === unit.id)
      .map((bed) => ({ id: bed.id, label: bed.label, isRetired: bed.retiredAt !== null })),
  }))
}

/** One unit of the hospital; throws NOT_FOUND for any other. */
export function readUnitAdminDto(tx: Tx, unitId: string, hospitalId: string): UnitAdminDto {
  const unit = findUnitOfHospital(tx, unitId, hospitalId)
  const [dto] = unit ? toUnitAdminDtos(tx, [unit]) : []
  if (!dto) throw new AppError('NOT_FOUND', 'Not found. The unit may belong to another hospital.')
  return dto
}
