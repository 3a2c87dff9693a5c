import 'server-only'
import { hasMailOfDay, listMailRecipients, listUnitsWithSchedule } from '@/db/queries/mail'
import { findProtocolInForce } from '@/db/queries/protocols'
import type { Ctx } from '@/lib/server/ctx'
import { readEnv } from '@/lib/server/env'
import { AppError } from '@/lib/shared/errors'
import { listToday } from '../today/list'
import { dueMessages, type DueMessage } from './due-messages'
import { queueMessage } from './queue-message'

/**
 * Queues what every unit's mail owes at this moment, each in the unit's own time zone. Safe to run at any time and any number of times:
 * a message goes once for its unit, day (or trial), kind and recipient. Answers how many messages are new.
 */
// no-door: run by the mail.queue-due job only; each unit is read through listToday, which has the door
export function queueDueMail(ctx: Ctx): { queued: number } {
  if (ctx.actor.kind !== 'job') throw new AppError('FORBIDDEN', 'Only the scheduled job queues this mail.')
  let queued = 0
  for (const { unit, schedule } of listUnitsWithSchedule(ctx.db)) {
    const protocol = findProtocolInForce(ctx.db, unit.id, ctx.now)
    if (!protocol || !schedule) continue
    const today = listToday(ctx, { unitId: unit.id })
    const due = dueMessages(today, protocol.content, schedule, readEnv().baseUrl)
    if (due.length > 0) queued += queueForUnit(ctx, unit.id, today.day, due)
  }
  return { queued }
}

function queueForUnit(ctx: Ctx, unitId: string, day: string, due: DueMessage[]): number {
  return ctx.db.transaction(
    (tx) => {
      let queued = 0
      for (const { kind, occasion, toRoles, message } of due) {
        // A daily list is a picture of one moment: who joins the team later that day does not get an older or another one.
        if (kind !== 'decision_owed' && hasMailOfDay(tx, unitId, kind, day)) continue
        for (const { personId, email } of listMailRecipients(tx, unitId, toRoles)) {
          if (queueMessage(tx, { kind, unitId, day, occasion, personId, recipient: email, now: ctx.now }, message)) queued += 1
        }
      }
      return queued
    },
    { behavior: 'immediate' },
  )
}
