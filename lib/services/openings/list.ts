import 'server-only'
import { listOpeningsOfUnit } from '@/db/queries/openings'
import { authorize } from '@/lib/access/door'
import type { OpeningListDto } from '@/lib/schemas/openings'
import type { Ctx } from '@/lib/server/ctx'

const LONGEST_LIST = 200

/** Who from outside opened a record of the unit, when and why; newest first, the last 200. */
export function listOpenings(ctx: Ctx, input: { unitId: string }): OpeningListDto {
  const { unit } = authorize(ctx, 'opening.list', { unitId: input.unitId })
  return {
    unit: { id: unit.id, name: unit.name, timeZone: unit.timeZone },
    nowMs: ctx.now,
    openings: listOpeningsOfUnit(ctx.db, unit.id, LONGEST_LIST).map(({ opening, personName, patient }) => ({
      id: opening.id,
      openedAt: opening.openedAt,
      expiresAt: opening.expiresAt,
      isOpen: opening.expiresAt > ctx.now,
      personName,
      reason: opening.reason,
      patientId: patient.id,
      familyName: patient.familyName,
      givenName: patient.givenName,
      recordNumber: patient.recordNumber,
    })),
  }
}
