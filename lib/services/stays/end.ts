import 'server-only'
import { findOpenEpisode, listEpisodesOfPatient } from '@/db/queries/episodes'
import { endStayRow, findOpenStay } from '@/db/queries/stays'
import { authorize } from '@/lib/access/door'
import type { EndStayInput } from '@/lib/schemas/stays'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError, invalidField } from '@/lib/shared/errors'
import { formatTime } from '@/lib/shared/format'
import { resolveObserved } from '../entries/resolve-observed'

/** The patient left the unit or died. Ventilation must have been ended first, so that its end is never guessed. */
export function endStay(ctx: Ctx, input: EndStayInput): { stayId: string } {
  const { patient, unit } = authorize(ctx, 'stay.end', { patientId: input.patientId })
  return once(ctx, 'stay.end', input, (tx) => {
    const present = findOpenStay(tx, patient.id)
    if (!present || present.id !== input.stayId) {
      throw new AppError('CONFLICT', 'This patient was moved or left in the meantime. Reload the page; nothing was changed.')
    }
    if (findOpenEpisode(tx, patient.id))
      throw new AppError('PRECONDITION', 'Ventilation still runs. Record how and when it ended first.')
    const at = resolveObserved(input.observed, unit.timeZone, ctx.now)
    const lastEpisodeEnd = listEpisodesOfPatient(tx, patient.id).at(-1)?.endedAt ?? 0
    if (at <= present.startedAt || at < lastEpisodeEnd) {
      const earliest = formatTime(Math.max(present.startedAt, lastEpisodeEnd), unit.timeZone, ctx.now)
      const what = lastEpisodeEnd > present.startedAt ? 'Ventilation ended at' : 'The patient has been in this bed since'
      throw invalidField('observed.time', `${what} ${earliest}. Give a later time.`)
    }
    const after = endStayRow(tx, present, { endedAt: at, end: input.end })
    writeAudit(tx, ctx, {
      action: 'stay.end',
      unitId: unit.id,
      subject: { kind: 'patient', id: patient.id },
      before: present,
      after,
    })
    return { stayId: present.id }
  })
}
