import type { MoveFormDto } from '@/lib/schemas/stays'

/** The free beds of a chosen unit as options; empty while no unit is chosen. */
export function freeBedOptions(units: MoveFormDto['units'], unitId: string | undefined): { value: string; label: string }[] {
  return units.find(({ id }) => id === unitId)?.freeBeds.map(({ id, label }) => ({ value: id, label })) ?? []
}
