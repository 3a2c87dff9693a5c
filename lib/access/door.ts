import 'server-only'
import {
  findEpisode,
  findLatestStay,
  findPatientOfHospital,
  findUnit,
  findUnitAmong,
  findValidOpening,
} from '@/db/queries/access'
import type { episodes, patients, stays, units } from '@/db/schema'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx, PersonCtx } from '@/lib/server/ctx'
import { AuditedRefusal, type ErrorCode } from '@/lib/shared/errors'
import { ALLOWED_BY_OPENING, mayInUnit, POLICY, type Action } from './policy'

export type UnitRow = typeof units.$inferSelect
export type PatientRow = typeof patients.$inferSelect
export type EpisodeRow = typeof episodes.$inferSelect
export type StayRow = typeof stays.$inferSelect

/** What the door hands out: the thing asked for, its patient, stay and unit, read under the caller's right. */
export type InUnit = { unit: UnitRow }
export type PatientInUnit = InUnit & { patient: PatientRow; stay: StayRow; isOpening: boolean }
export type EpisodeInUnit = PatientInUnit & { episode: EpisodeRow }

/**
 * The one access check. Says who may do the action on the target, and hands the target out; "not yours" answers as not found, a
 * missing role as forbidden. Refusals are written to the audit log. Jobs pass with any unit action; nobody else passes without a rule.
 */
export function authorize(ctx: Ctx, action: Action, target: { episodeId: string }): EpisodeInUnit
export function authorize(ctx: Ctx, action: Action, target: { patientId: string }): PatientInUnit
export function authorize(ctx: Ctx, action: Action, target: { unitId: string }): InUnit
export function authorize(ctx: Ctx, action: Action, target: 'hospital' | 'self'): PersonCtx
export function authorize(
  ctx: Ctx,
  action: Action,
  target: { episodeId: string } | { patientId: string } | { unitId: string } | 'hospital' | 'self',
): EpisodeInUnit | PatientInUnit | InUnit | PersonCtx {
  const rule = POLICY[action] as (typeof POLICY)[Action] | undefined
  if (rule === undefined) return refuse(ctx, action, null, 'FORBIDDEN')
  if (typeof target === 'string') return authorizePerson(ctx, action, rule.scope)
  if (rule.scope !== 'unit') return refuse(ctx, action, null, 'FORBIDDEN')
  if ('unitId' in target) return { unit: authorizeUnit(ctx, action, target.unitId) }
  if ('patientId' in target) return authorizePatient(ctx, action, target.patientId)
  const episode = findEpisode(ctx.db, target.episodeId)
  if (!episode) return refuse(ctx, action, { kind: 'episode', id: target.episodeId }, 'NOT_FOUND')
  return { ...authorizePatient(ctx, action, episode.patientId), episode }
}

function authorizePerson(ctx: Ctx, action: Action, scope: 'unit' | 'hospital' | 'signed_in'): PersonCtx {
  if (ctx.actor.kind !== 'person' || scope === 'unit') return refuse(ctx, action, null, 'FORBIDDEN')
  if (scope === 'hospital' && !ctx.actor.isAdministrator) return refuse(ctx, action, null, 'FORBIDDEN')
  return ctx as PersonCtx
}

function authorizeUnit(ctx: Ctx, action: Action, unitId: string): UnitRow {
  const subject = { kind: 'unit', id: unitId }
  if (ctx.actor.kind !== 'person') {
    return findUnit(ctx.db, unitId) ?? refuse(ctx, action, subject, 'NOT_FOUND')
  }
  const { memberships, hospitalId } = ctx.actor
  const unit = findUnitAmong(
    ctx.db,
    unitId,
    hospitalId,
    memberships.map((held) => held.unitId),
  )
  if (!unit) return refuse(ctx, action, subject, 'NOT_FOUND')
  if (!mayInUnit(memberships, action, unitId)) return refuse(ctx, action, subject, 'FORBIDDEN', unitId)
  return unit
}

function authorizePatient(ctx: Ctx, action: Action, patientId: string): PatientInUnit {
  const subject = { kind: 'patient', id: patientId }
  if (ctx.actor.kind !== 'person') return refuse(ctx, action, subject, 'FORBIDDEN')
  const { memberships, hospitalId, personId } = ctx.actor
  const patient = findPatientOfHospital(ctx.db, patientId, hospitalId)
  const stay = patient && findLatestStay(ctx.db, patientId)
  const unit = stay && findUnit(ctx.db, stay.unitId)
  if (!patient || !stay || !unit) return refuse(ctx, action, subject, 'NOT_FOUND')
  const isMember = memberships.some((held) => held.unitId === unit.id)
  if (isMember && mayInUnit(memberships, action, unit.id)) return { patient, stay, unit, isOpening: false }
  if (!isMember && findValidOpening(ctx.db, personId, patientId, ctx.now)) {
    if (ALLOWED_BY_OPENING.includes(action)) return { patient, stay, unit, isOpening: true }
    return refuse(ctx, action, subject, 'FORBIDDEN', unit.id)
  }
  return refuse(ctx, action, subject, isMember ? 'FORBIDDEN' : 'NOT_FOUND', unit.id)
}

const LONGEST_ID = 64
const MESSAGES = {
  FORBIDDEN: 'Your role cannot do this.',
  NOT_FOUND: 'Not found. It may be in another unit.',
} as const

function refuse(
  ctx: Ctx,
  action: Action,
  subject: { kind: string; id: string } | null,
  code: Extract<ErrorCode, 'FORBIDDEN' | 'NOT_FOUND'>,
  unitId: string | null = null,
): never {
  ctx.db.transaction(
    (tx) => {
      // An id that was asked for is the client's invention: no longer than ours are.
      const asked = subject && { ...subject, id: subject.id.slice(0, LONGEST_ID) }
      writeAudit(tx, ctx, {
        action: 'access.denied',
        unitId,
        ...(asked ? { subject: asked } : {}),
        after: { asked: action, code },
      })
    },
    { behavior: 'immediate' },
  )
  throw new AuditedRefusal(code, MESSAGES[code])
}
