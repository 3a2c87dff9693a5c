import { prepareDatabase } from '@/lib/server/prepare-database'
import { runJob } from './run-job'

// Runs one job by hand: node --conditions=react-server --import tsx jobs/run.ts mail.queue-due
prepareDatabase()
const isFine = await runJob(process.argv[2] ?? '')
process.exitCode = isFine ? 0 : 1
