import 'server-only'
import { findMailSchedule, updateMailSchedule } from '@/db/queries/mail'
import { findProtocolInForce } from '@/db/queries/protocols'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { SaveMailScheduleInput } from '@/lib/schemas/mail'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatMinutes } from '@/lib/shared/format'

/** Sets when a unit's scheduled mail goes out. Refuses a morning list that would come after the screening window closed. */
export function saveMailSchedule(ctx: Ctx, input: SaveMailScheduleInput): { version: number } {
  const { unit } = authorize(ctx, 'mail.schedule', { unitId: input.unitId })
  return once(ctx, 'mail.schedule', input, (tx) => {
    const morningDueMin = input.morningTime === null ? null : toMinutes(input.morningTime)
    const closesMin = findProtocolInForce(tx, unit.id, ctx.now)?.content.screeningWindow.closesMin
    if (morningDueMin !== null && closesMin !== undefined && morningDueMin >= closesMin) {
      throw invalidField('morningTime', `The screening window closes at ${formatMinutes(closesMin)}. Give an earlier time.`)
    }
    const before = findMailSchedule(tx, unit.id)
    const change = { morningDueMin, isWindowEndOn: input.isWindowEndOn, isDecisionOwedOn: input.isDecisionOwedOn }
    if (!before || !updateMailSchedule(tx, unit.id, input.version, change)) {
      throw new AppError(
        'CONFLICT',
        'Someone changed the schedule in the meantime. Reload the page to see it; nothing was saved.',
      )
    }
    writeAudit(tx, ctx, {
      action: 'mail.schedule',
      unitId: unit.id,
      subject: { kind: 'unit', id: unit.id },
      before,
      after: change,
    })
    return { version: input.version + 1 }
  })
}

function toMinutes(time: string): number {
  const [hours = 0, minutes = 0] = time.split(':').map(Number)
  return hours * 60 + minutes
}
