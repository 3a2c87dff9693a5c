import 'server-only'
import { findAirwayEventVersion, insertAirwayEvent } from '@/db/queries/airway-events'
import { updateEpisode } from '@/db/queries/episodes'
import { authorize } from '@/lib/access/door'
import type { RecordAirwayInput } from '@/lib/schemas/airway'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { once } from '@/lib/server/once'
import { AppError } from '@/lib/shared/errors'
import { placeEntry } from '../entries/place-entry'

/**
 * Records a tracheostomy placed while ventilation goes on, and changes the episode's airway; or corrects when it was placed. Begin and end of
 * ventilation have verbs of their own and are corrected there.
 */
export function recordAirway(ctx: Ctx, input: RecordAirwayInput): { id: string } {
  const found = authorize(ctx, 'airway.record', { episodeId: input.episodeId })
  return once(ctx, 'airway.record', input, (tx) => {
    const amended = input.amends ? findAirwayEventVersion(tx, input.amends.id) : undefined
    if (amended && amended.row.event !== input.event) {
      throw new AppError(
        'PRECONDITION',
        'Begin and end of ventilation are corrected on the episode’s own page. Nothing was changed.',
      )
    }
    if (!input.amends && found.episode.airway === 'tracheostomy') {
      throw new AppError(
        'PRECONDITION',
        'A tracheostomy stands on record for this patient already. Correct that entry if its time is wrong.',
      )
    }
    const { columns } = placeEntry(tx, ctx, found, { observed: input.observed, amends: input.amends, findAmended: () => amended })
    const row = insertAirwayEvent(tx, { ...columns, event: input.event, reason: input.reason ?? null })
    const episode = input.amends ? found.episode : updateEpisode(tx, found.episode, { airway: 'tracheostomy' })
    if (!episode)
      throw new AppError('CONFLICT', 'Someone changed this episode in the meantime. Reload the page; nothing was recorded.')
    writeAudit(tx, ctx, {
      action: input.amends ? 'airway.amend' : 'airway.record',
      unitId: columns.unitId,
      subject: { kind: 'airway_event', id: row.id },
      before: { airway: found.episode.airway },
      after: row,
    })
    return { id: row.id }
  })
}
