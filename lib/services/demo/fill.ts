import 'server-only'
import { hashPassword } from 'better-auth/crypto'
import { listHospitalKinds } from '@/db/queries/start'
import { insertSeedRows, type SeedRows } from '@/db/seed'
import { demoTimeZone } from '@/lib/demo/calendar'
import { DEMO_UNITS, generateDemo, type Demo, type DemoUnitSpec } from '@/lib/demo/generate'
import type { DemoRole } from '@/lib/demo/staff'
import { writeAudit } from '@/lib/server/audit'
import type { Ctx } from '@/lib/server/ctx'
import { AppError } from '@/lib/shared/errors'
import { newId } from '@/lib/shared/ids'

export const DEMO_SEED = 20_261

export type FillDemoInput = {
  /** One for all demo sign-ins. */
  password: string
  seed?: number
  /** Whole days of history; two years when left out. */
  historyDays?: number
  units?: DemoUnitSpec[]
}
export type FilledDemo = { accounts: { role: DemoRole; email: string }[]; counts: Record<string, number> }

/**
 * Fills an empty database with the invented hospital, in one transaction with one audit row that says so. Refuses a database that
 * holds a hospital already. The rows follow from seed and clock; only the stored form of the password does not.
 */
// no-door: run by hand on a database in which nobody can sign in yet; refuses people and every database with a hospital
export async function fillDemo(ctx: Ctx, input: FillDemoInput): Promise<FilledDemo> {
  if (ctx.actor.kind === 'person') throw new AppError('FORBIDDEN', 'The demo is filled by hand on the server only.')
  refuseFilled(ctx)
  const { password, seed = DEMO_SEED, historyDays = 730, units = DEMO_UNITS } = input
  const demo = generateDemo({ seed, nowMs: ctx.now, timeZone: demoTimeZone(ctx.now), historyDays, units })
  demo.rows.account.push(...makeSignIns(demo, await hashPassword(password), ctx.now))
  return ctx.db.transaction(
    (tx) => {
      refuseFilled(ctx)
      const counts = insertSeedRows(ctx.db, demo.rows)
      const after = {
        what: 'Invented demo data imported in one batch; none of it was entered by a person.',
        seed,
        historyDays,
        counts,
      }
      writeAudit(tx, ctx, { action: 'demo.import', after })
      return { accounts: demo.accounts.map(({ role, email }) => ({ role, email })), counts }
    },
    { behavior: 'immediate' },
  )
}

function refuseFilled(ctx: Ctx): void {
  if (listHospitalKinds(ctx.db).length === 0) return
  throw new AppError('PRECONDITION', 'This database holds a hospital already. The demo fills an empty database only.')
}

/** The sign-in rows as better-auth keeps them: for everybody, so that nobody stands on the people page as invited and not come. */
function makeSignIns({ rows }: Demo, hash: string, now: number): SeedRows['account'] {
  const at = new Date(now)
  return rows.people.map(({ id: personId }) => ({
    id: newId(),
    accountId: personId,
    providerId: 'credential',
    userId: personId,
    accessToken: null,
    refreshToken: null,
    idToken: null,
    accessTokenExpiresAt: null,
    refreshTokenExpiresAt: null,
    scope: null,
    password: hash,
    createdAt: at,
    updatedAt: at,
  }))
}
