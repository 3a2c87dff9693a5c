import 'server-only'
import type { Db } from '@/db/client'
import type { Membership } from '@/lib/access/policy'

export type PersonActor = {
  kind: 'person'
  personId: string
  sessionId: string
  hospitalId: string
  name: string
  isAdministrator: boolean
  memberships: readonly Membership[]
}
export type Actor = PersonActor | { kind: 'job'; name: string } | { kind: 'system' }

/** Who asks, when, under which request id, on which database. Every verb takes it first. */
export type Ctx = {
  actor: Actor
  /** UTC milliseconds, the server's clock. */
  now: number
  requestId: string
  db: Db
  /** Given by the client for a write; the same key changes nothing twice. */
  idempotencyKey: string | null
}
export type PersonCtx = Ctx & { actor: PersonActor }
