import 'server-only'
import { createHash, randomBytes } from 'node:crypto'
import type { Tx } from '@/db/client'
import { expireAccountLinks, findAccountLink, insertAccountLink, type AccountLinkRow } from '@/db/queries/people'
import { readEnv } from '@/lib/server/env'
import { newId } from '@/lib/shared/ids'
import { HOUR_MS } from '@/lib/shared/time'
import type { AccountLinkKind } from '@/lib/weaning/vocabulary'

const LIFETIME_MS: Record<AccountLinkKind, number> = { setup: 24 * HOUR_MS, invitation: 7 * 24 * HOUR_MS }

/** Only this hash of a link's token is kept. */
function hashToken(token: string): string {
  return createHash('sha256').update(token).digest('hex')
}

/** Makes a one-time link (set-up 24 h, invitation 7 days) and ends the earlier ones, so that one at a time is open. Answers its address. */
export function createAccountLink(tx: Tx, link: { kind: AccountLinkKind; personId: string | null; now: number }): string {
  const token = randomBytes(32).toString('base64url')
  expireAccountLinks(tx, link.personId, link.now)
  insertAccountLink(tx, {
    id: newId(),
    kind: link.kind,
    personId: link.personId,
    tokenHash: hashToken(token),
    createdAt: link.now,
    expiresAt: link.now + LIFETIME_MS[link.kind],
  })
  return new URL(`/accept?token=${token}`, readEnv().baseUrl).href
}

/** The link of a token if it still opens at this moment; undefined when unknown, used, replaced or run out. */
export function findOpenLink(tx: Tx, token: string, now: number): AccountLinkRow | undefined {
  const link = findAccountLink(tx, hashToken(token))
  return link && link.usedAt === null && link.expiresAt > now ? link : undefined
}
