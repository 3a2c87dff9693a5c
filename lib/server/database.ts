import 'server-only'
import { sharedDatabase, type Db } from '@/db/client'
import { readEnv } from './env'

/** The database of this server, at the file that the environment names. */
export function requestDatabase(): Db {
  return sharedDatabase(readEnv().databaseFile)
}
