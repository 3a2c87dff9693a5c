import 'server-only'
import type { Tx } from '@/db/client'
import { listMailRecipients } from '@/db/queries/mail'
import { recordOpenedMessage } from '@/lib/mail/templates'
import { readEnv } from '@/lib/server/env'
import { localDay } from '@/lib/shared/time'
import { queueMessage } from './queue-message'

type OpenedMail = { unit: { id: string; name: string; timeZone: string }; bedLabel: string; openingId: string; now: number }

/** Tells every lead of the unit that someone from outside opened a record. */
// no-door: called by openings/open inside its own transaction, after its door
export function queueRecordOpenedMail(tx: Tx, { unit, bedLabel, openingId, now }: OpenedMail): void {
  const message = recordOpenedMessage({ unitName: unit.name, bedLabel, url: `${readEnv().baseUrl}/units/${unit.id}/openings` })
  for (const { personId, email } of listMailRecipients(tx, unit.id, ['unit_lead'])) {
    queueMessage(
      tx,
      {
        kind: 'record_opened',
        unitId: unit.id,
        day: localDay(now, unit.timeZone),
        occasion: openingId,
        personId,
        recipient: email,
        now,
      },
      message,
    )
  }
}
