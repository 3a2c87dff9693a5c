import 'server-only'
import { hasAnyHospital } from '@/db/queries/people'
import { requestDatabase } from '@/lib/server/database'
import { readEnv } from '@/lib/server/env'

/** What the sign-in page must say: whether all data is invented, and whether anybody has set Daybreath up yet. Open to everybody. */
export function readSignInPage(): { isDemo: boolean; isSetUp: boolean } {
  return { isDemo: readEnv().isDemo, isSetUp: hasAnyHospital(requestDatabase()) }
}
