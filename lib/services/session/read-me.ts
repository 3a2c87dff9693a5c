import 'server-only'
import { findPersonOfHospital, listMembershipsOf } from '@/db/queries/people'
import { findSessionState } from '@/db/queries/sessions'
import { findHospital } from '@/db/queries/units'
import { authorize } from '@/lib/access/door'
import type { MeDto } from '@/lib/schemas/session'
import type { Ctx } from '@/lib/server/ctx'
import { AppError } from '@/lib/shared/errors'
import { MINUTE_MS } from '@/lib/shared/time'

/** The signed-in person's own name, roles and lock state. Also answered at a locked screen; holds no patient data. */
export function readMe(ctx: Ctx): MeDto {
  const { actor } = authorize(ctx, 'session.read', 'self')
  const person = findPersonOfHospital(ctx.db, actor.personId, actor.hospitalId)
  const hospital = findHospital(ctx.db, actor.hospitalId)
  const state = findSessionState(ctx.db, actor.sessionId)
  if (!person || !hospital || !state) throw new AppError('UNAUTHENTICATED', 'Please sign in.')
  const memberships = listMembershipsOf(ctx.db, [actor.personId]).map(({ unitId, unitName, timeZone, role }) => ({
    unitId,
    unitName,
    timeZone,
    role,
  }))
  const isIdle = ctx.now - state.lastActiveAt > hospital.idleLockMin * MINUTE_MS
  return {
    name: person.name,
    email: person.email,
    hospitalName: hospital.name,
    isDemo: hospital.isDemo,
    isAdministrator: person.isAdministrator,
    memberships,
    isLocked: state.lockedAt !== null || isIdle,
    idleLockMin: hospital.idleLockMin,
  }
}
