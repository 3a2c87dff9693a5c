import type { Ctx } from '@/lib/server/ctx'

/** Whether the actor may correct an entry: its author, or a physician of the unit that the patient is in. */
// no-door: answers a question about an entry; the verbs that ask it have been through the door
export function mayAmend(ctx: Ctx, unitId: string, authorId: string | null): boolean {
  if (ctx.actor.kind !== 'person') return false
  if (ctx.actor.personId === authorId) return true
  return ctx.actor.memberships.some((held) => held.unitId === unitId && held.role === 'physician')
}
