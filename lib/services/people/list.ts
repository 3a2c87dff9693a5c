import 'server-only'
import { listPeopleOfHospital } from '@/db/queries/people'
import { listUnitsOfHospital } from '@/db/queries/units'
import { authorize } from '@/lib/access/door'
import type { PeopleDto } from '@/lib/schemas/people'
import type { Ctx } from '@/lib/server/ctx'
import { toPersonDtos } from './to-person-dto'

/** Everybody with an account in the administrator's hospital, and the units that roles can be given in. */
export function listPeople(ctx: Ctx): PeopleDto {
  const { actor } = authorize(ctx, 'people.manage', 'hospital')
  return {
    people: toPersonDtos(ctx.db, listPeopleOfHospital(ctx.db, actor.hospitalId), ctx.now),
    units: listUnitsOfHospital(ctx.db, actor.hospitalId).map(({ id, name }) => ({ id, name })),
  }
}
