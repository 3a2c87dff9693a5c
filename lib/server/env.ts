import 'server-only'
import { z } from 'zod'

// The one place that reads process.env. .env.example tells what each means.
const envSchema = z.object({
  DAYBREATH_DATABASE: z.string().min(1).default('data/daybreath.db'),
  DAYBREATH_BASE_URL: z
    .url({ protocol: /^https?$/, error: 'must be the address people type, such as https://daybreath.example' })
    .default('http://localhost:3000'),
  DAYBREATH_SECRET: z
    .string({ error: 'is missing: give at least 32 random characters (openssl rand -base64 32)' })
    .min(32, 'is too short: give at least 32 random characters (openssl rand -base64 32)'),
  DAYBREATH_DEMO: z
    .enum(['0', '1'], { error: 'must be 0 or 1' })
    .default('0')
    .transform((value) => value === '1'),
  DAYBREATH_DEMO_PASSWORD: z.string().min(15, 'is too short: give at least 15 characters').optional(),
  DAYBREATH_JOBS: z
    .enum(['0', '1'], { error: 'must be 0 or 1' })
    .default('1')
    .transform((value) => value === '1'),
  DAYBREATH_TRUSTED_PROXY_HEADER: z.string().min(1).optional(),
  DAYBREATH_LOG_LEVEL: z.enum(['debug', 'info', 'warn', 'error', 'silent']).default('info'),
  SMTP_URL: z
    .string()
    .regex(/^smtps?:\/\//, 'must begin with smtp:// or smtps://')
    .optional(),
  MAIL_FROM: z.string().min(3).default('Daybreath <daybreath@localhost>'),
  MAIL_FOLDER: z.string().min(1).default('data/mail'),
})

export type Env = {
  databaseFile: string
  baseUrl: string
  secret: string
  isDemo: boolean
  /** For the demo's sign-ins; made by chance when not given. */
  demoPassword: string | null
  runsJobs: boolean
  trustedProxyHeader: string | null
  logLevel: 'debug' | 'info' | 'warn' | 'error' | 'silent'
  smtpUrl: string | null
  mailFrom: string
  mailFolder: string
}

/** Reads and checks the given variables. Throws one error that names every variable that is wrong, and how. */
export function parseEnv(variables: Record<string, string | undefined>): Env {
  const given = Object.fromEntries(Object.entries(variables).filter(([, value]) => value !== ''))
  const parsed = envSchema.safeParse(given)
  if (!parsed.success) {
    const lines = parsed.error.issues.map((issue) => `  ${issue.path.join('.')} ${issue.message}`)
    throw new Error(`Daybreath cannot start, these settings are wrong:\n${lines.join('\n')}\nEach is explained in .env.example.`)
  }
  const env = parsed.data
  return {
    databaseFile: env.DAYBREATH_DATABASE,
    baseUrl: env.DAYBREATH_BASE_URL,
    secret: env.DAYBREATH_SECRET,
    isDemo: env.DAYBREATH_DEMO,
    demoPassword: env.DAYBREATH_DEMO_PASSWORD ?? null,
    runsJobs: env.DAYBREATH_JOBS,
    trustedProxyHeader: env.DAYBREATH_TRUSTED_PROXY_HEADER ?? null,
    logLevel: env.DAYBREATH_LOG_LEVEL,
    smtpUrl: env.SMTP_URL ?? null,
    mailFrom: env.MAIL_FROM,
    mailFolder: env.MAIL_FOLDER,
  }
}

/** How much is logged; wrong values are refused by readEnv, here they count as the default. */
export function readLogLevel(): Env['logLevel'] {
  const parsed = envSchema.shape.DAYBREATH_LOG_LEVEL.safeParse(process.env.DAYBREATH_LOG_LEVEL)
  return parsed.success ? parsed.data : 'info'
}

let cached: Env | undefined

/** The settings of this process, read once. */
export function readEnv(): Env {
  cached ??= parseEnv(process.env)
  return cached
}
