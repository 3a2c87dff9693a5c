import { runRecorded } from '@/lib/services/jobs/run-recorded'
import { tidyJobRuns } from '@/lib/services/jobs/tidy'
import { deliverConfiguredMail } from '@/lib/services/mail/deliver-configured'
import { queueDueMail } from '@/lib/services/mail/queue-due'
import { fillDemoFromEnv } from '@/lib/services/demo/fill-from-env'

/** Every job: its name, when it runs (cron with seconds; null = only by hand) and the one verb it calls. */
export const JOBS = [
  { name: 'mail.queue-due', schedule: '0 * * * * *', isQuiet: true, run: queueDueMail },
  { name: 'mail.deliver', schedule: '*/10 * * * * *', isQuiet: true, run: deliverConfiguredMail },
  { name: 'jobs.tidy', schedule: '0 30 3 * * *', isQuiet: false, run: tidyJobRuns },
  { name: 'demo.fill', schedule: null, isQuiet: false, run: fillDemoFromEnv },
] as const satisfies readonly (Parameters<typeof runRecorded>[0] & { schedule: string | null })[]
