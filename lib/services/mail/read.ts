import 'server-only'
import { findMailSchedule, hasMailOfDay, listMailOfUnit, listMailRecipients } from '@/db/queries/mail'
import { findProtocolInForce } from '@/db/queries/protocols'
import { authorize, type UnitRow } from '@/lib/access/door'
import { mayInUnit } from '@/lib/access/policy'
import type { Ctx } from '@/lib/server/ctx'
import { readEnv } from '@/lib/server/env'
import type { MailEntryDto, MailPageDto } from '@/lib/schemas/mail'
import { formatMinutes } from '@/lib/shared/format'
import { localDay, shiftDay, wallClockMs } from '@/lib/shared/time'
import type { ClinicalRole, MailKind } from '@/lib/weaning/vocabulary'

const MOST_ENTRIES = 200

/** A unit's Mail page: the ledger newest first, the schedule, and what goes next. Addresses are for the unit lead only. */
export function readMail(ctx: Ctx, input: { unitId: string }): MailPageDto {
  const { unit } = authorize(ctx, 'mail.read', { unitId: input.unitId })
  const maySchedule = ctx.actor.kind === 'person' && mayInUnit(ctx.actor.memberships, 'mail.schedule', unit.id)
  const schedule = findMailSchedule(ctx.db, unit.id)
  const entries = listMailOfUnit(ctx.db, unit.id, MOST_ENTRIES).map(({ mail, personName }): MailEntryDto => ({
    id: mail.id,
    kind: mail.kind,
    state: mail.state,
    personName,
    recipient: maySchedule ? mail.recipient : null,
    subject: mail.subject,
    bodyText: mail.bodyText,
    attempts: mail.attempts,
    lastError: mail.lastError,
    queuedAt: mail.queuedAt,
    nextAttemptAt: mail.nextAttemptAt,
    sentAt: mail.sentAt,
  }))
  return {
    unit: { id: unit.id, name: unit.name, timeZone: unit.timeZone },
    nowMs: ctx.now,
    isKeptAsFiles: readEnv().smtpUrl === null,
    schedule: schedule
      ? {
          version: schedule.version,
          isWindowEndOn: schedule.isWindowEndOn,
          isDecisionOwedOn: schedule.isDecisionOwedOn,
          morningTime: schedule.morningDueMin === null ? null : formatMinutes(schedule.morningDueMin),
        }
      : null,
    upcoming: schedule ? listUpcoming(ctx, unit, schedule) : [],
    entries,
    maySchedule,
  }
}

function listUpcoming(
  ctx: Ctx,
  unit: UnitRow,
  schedule: { morningDueMin: number | null; isWindowEndOn: boolean },
): MailPageDto['upcoming'] {
  const upcoming: MailPageDto['upcoming'] = []
  const today = localDay(ctx.now, unit.timeZone)
  const add = (kind: MailKind, minutes: number, toRoles: ClinicalRole[]) => {
    const isOver = hasMailOfDay(ctx.db, unit.id, kind, today) || wallClockMs(today, minutes, unit.timeZone) <= ctx.now
    const atMs = wallClockMs(isOver ? shiftDay(today, 1) : today, minutes, unit.timeZone)
    upcoming.push({ kind, atMs, toRoles, recipients: listMailRecipients(ctx.db, unit.id, toRoles).length })
  }
  if (schedule.morningDueMin !== null) add('morning_due', schedule.morningDueMin, ['rt'])
  const protocol = findProtocolInForce(ctx.db, unit.id, ctx.now)
  if (schedule.isWindowEndOn && protocol) add('window_end', protocol.content.screeningWindow.closesMin, ['rt', 'unit_lead'])
  return upcoming.sort((a, b) => a.atMs - b.atMs)
}
