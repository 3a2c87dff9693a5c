import 'server-only'
import type { Ctx } from '@/lib/server/ctx'
import { readEnv } from '@/lib/server/env'
import { AppError } from '@/lib/shared/errors'
import { fillDemo } from './fill'
import { makeDemoPassword } from './make-password'

/**
 * Fills this process's database with the demo hospital and prints one line of JSON for each sign-in: role, e-mail, password. The password
 * is DAYBREATH_DEMO_PASSWORD, or made by chance. Answers counts only, since what a job answers is kept.
 */
// no-door: run by hand on a database in which nobody can sign in yet; fillDemo refuses all others
export async function fillDemoFromEnv(ctx: Ctx): Promise<{ accounts: number; rows: number }> {
  const { isDemo, demoPassword } = readEnv()
  if (!isDemo)
    throw new AppError(
      'PRECONDITION',
      'The demo is filled only with DAYBREATH_DEMO=1, so that invented and real patients never mix.',
    )
  const password = demoPassword ?? makeDemoPassword()
  const { accounts, counts } = await fillDemo(ctx, { password })
  for (const account of accounts) process.stdout.write(`${JSON.stringify({ ...account, password })}\n`)
  return { accounts: accounts.length, rows: Object.values(counts).reduce((sum, count) => sum + count, 0) }
}
