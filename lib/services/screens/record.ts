import 'server-only'
import { findNewestScreen, findScreenVersion, insertScreen } from '@/db/queries/screens'
import { authorize } from '@/lib/access/door'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import type { RecordedScreenDto, RecordScreenInput } from '@/lib/schemas/screens'
import { invalidField } from '@/lib/shared/errors'
import { judgeScreen } from '@/lib/weaning/screen/judge-screen'
import { SCREEN_RESULT_WORDS } from '@/lib/weaning/words'
import { placeEntry } from '../entries/place-entry'
import { judgingProtocol } from '../steps/judging-protocol'
import { refuseUnseen } from '../steps/refuse-unseen'
import { requireAdult } from '../steps/require-adult'

/**
 * Records a daily screen, judged whole by the protocol in force when it was observed, or excused with its reason. A correction is judged
 * by the protocol version of the entry that it corrects. Adults only, unless excused. Answers the result.
 */
export function recordScreen(ctx: Ctx, input: RecordScreenInput): RecordedScreenDto {
  const found = authorize(ctx, 'screen.record', { episodeId: input.episodeId })
  return once(ctx, 'screen.record', input, (tx) => {
    const { observed, amends } = input
    const earlier = amends ? findScreenVersion(tx, amends.id) : undefined
    const { columns, protocol } = placeEntry(tx, ctx, found, { observed, amends, findAmended: () => earlier })
    if (!amends) {
      const newest = findNewestScreen(tx, found.episode.id)
      const result = newest ? SCREEN_RESULT_WORDS[newest.row.result] : ''
      refuseUnseen(newest, input, { what: 'a screen', result, timeZone: found.unit.timeZone, now: ctx.now })
    }
    const judging = judgingProtocol(tx, earlier?.row.protocolVersionId, protocol)
    const judged = input.excuse === null ? judge() : null
    const row = insertScreen(tx, {
      ...columns,
      protocolVersionId: judging.id,
      result: judged?.result ?? 'excused',
      excuse: input.excuse,
      note: input.note,
      readings: input.readings,
      verdict: judged,
    })
    const action = amends ? 'screen.amend' : 'screen.record'
    writeAudit(tx, ctx, { action, unitId: columns.unitId, subject: { kind: 'screen', id: row.id }, after: row })
    return { id: row.id, result: row.result }

    function judge() {
      requireAdult(found, columns.ventilatorDay)
      if (input.readings === null)
        throw invalidField('readings', 'Give at least one reading, or excuse the patient from today’s screen.')
      return judgeScreen(judging.content.screen, input.readings, true)
    }
  })
}
