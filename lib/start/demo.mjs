// npm run demo: the invented hospital, on its own database below data/demo, for this machine only. `-- --fresh` starts over.
import { existsSync, readFileSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { build } from './build.mjs'
import { main, readPort, Refusal, refuseTakenPort, ROOT, runProgram, say, serve, waitUntilHealthy } from './process.mjs'
import { readOrMakeSecret } from './secret.mjs'
import { setup } from './setup.mjs'
import { serverArguments } from './start.mjs'

const FOLDER = join(ROOT, 'data', 'demo')
const DATABASE = join(FOLDER, 'daybreath.db')
/** Written last, when the demo hospital is complete: one line for each demo sign-in. */
const ACCOUNTS = join(FOLDER, 'accounts.jsonl')

/** Everything is set here and nothing taken over: the demo must not write to a real database or send a real letter. */
function demoSettings(port) {
  return {
    NEXT_TELEMETRY_DISABLED: '1',
    NODE_ENV: 'production',
    DAYBREATH_DEMO: '1',
    DAYBREATH_JOBS: '1',
    DAYBREATH_DATABASE: DATABASE,
    DAYBREATH_SECRET: readOrMakeSecret(join(FOLDER, 'secret')),
    DAYBREATH_BASE_URL: `http://localhost:${port}`,
    DAYBREATH_TRUSTED_PROXY_HEADER: '',
    DAYBREATH_LOG_LEVEL: process.env.DAYBREATH_LOG_LEVEL ?? 'warn',
    SMTP_URL: '',
    MAIL_FROM: '',
    MAIL_FOLDER: join(FOLDER, 'mail'),
  }
}

/** Fills the demo hospital when it is not there. A filling that was cut short is thrown away and begun again. */
async function fill(env) {
  if (existsSync(ACCOUNTS) && existsSync(DATABASE)) return
  for (const end of ['', '-wal', '-shm']) rmSync(DATABASE + end, { force: true })
  say('Filling the demo hospital: invented people, patients and two years of history.')
  const lines = []
  const code = await runProgram('jobs/run.ts', ['demo.fill'], { env, onLine: (line) => lines.push(line) })
  const accounts = lines.filter((line) => readAccount(line) !== null)
  if (code !== 0 || accounts.length === 0) throw new Refusal(`The demo hospital could not be filled.\n${lines.join('\n')}`)
  writeFileSync(ACCOUNTS, `${accounts.join('\n')}\n`, { mode: 0o600 })
}

/** One printed line as an account, or null when it is something else. */
function readAccount(line) {
  try {
    const { role, email, password } = JSON.parse(line)
    return typeof role === 'string' && typeof email === 'string' && typeof password === 'string'
      ? { role, email, password }
      : null
  } catch {
    return null
  }
}

function printAccounts(address) {
  const accounts = readFileSync(ACCOUNTS, 'utf8').split('\n').map(readAccount).filter(Boolean)
  say(`\nThe demo is at ${address}\nEverything in it is invented. Sign in as:`)
  const width = (key) => Math.max(...accounts.map((account) => account[key].length))
  for (const { role, email, password } of accounts) {
    say(`  ${role.padEnd(width('role'))}  ${email.padEnd(width('email'))}  ${password}`)
  }
  say('\nStop with Ctrl+C. What was entered is kept; npm run demo -- --fresh starts over.')
}

async function demo(args) {
  const unknown = args.filter((argument) => argument !== '--fresh')
  if (unknown.length > 0) throw new Refusal(`Unknown: ${unknown.join(' ')}. The demo knows --fresh only.`)
  const port = readPort(process.env.PORT, 3000)
  await refuseTakenPort('127.0.0.1', port)
  await setup()
  await build()
  if (args.includes('--fresh')) rmSync(FOLDER, { recursive: true, force: true })
  const env = demoSettings(port)
  await fill(env)
  serve(serverArguments({ host: '127.0.0.1', port }), env)
  if (await waitUntilHealthy(env.DAYBREATH_BASE_URL.replace('localhost', '127.0.0.1'))) printAccounts(env.DAYBREATH_BASE_URL)
  else throw new Refusal(`The demo did not answer at ${env.DAYBREATH_BASE_URL}.`)
}

main(import.meta.url, demo)
