// One production server for the bench, and a signed-in way to ask it.
import { spawn } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { ROOT, runProgram, waitUntilHealthy } from '../../lib/start/process.mjs'
import { serverArguments } from '../../lib/start/start.mjs'

const PASSWORD = 'invented for the bench only'

/** Fills a database and starts a server on it. */
export async function startServer({ folder, name, beds, historyDays, port }) {
  const database = join(folder, `${name}.db`)
  const env = {
    NODE_ENV: 'production',
    NEXT_TELEMETRY_DISABLED: '1',
    DAYBREATH_DEMO: '1',
    DAYBREATH_JOBS: '0',
    DAYBREATH_DATABASE: database,
    DAYBREATH_SECRET: 'for the bench only, 0123456789abcdef',
    DAYBREATH_BASE_URL: `http://localhost:${port}`,
    DAYBREATH_LOG_LEVEL: 'silent',
    SMTP_URL: '',
    MAIL_FOLDER: join(folder, 'mail'),
  }
  const lines = []
  const code = await runProgram('tests/bench/fill.ts', [database, String(beds), String(historyDays), PASSWORD], {
    env,
    onLine: (line) => lines.push(line),
  })
  if (code !== 0) throw new Error(`The bench database could not be filled.\n${lines.join('\n')}`)
  const { accounts, counts } = JSON.parse(lines.find((line) => line.startsWith('{')))
  const child = spawn(process.execPath, serverArguments({ host: '127.0.0.1', port }), {
    cwd: ROOT,
    env: { ...process.env, ...env },
    stdio: 'ignore',
  })
  const address = `http://localhost:${port}`
  if (!(await waitUntilHealthy(`http://127.0.0.1:${port}`))) throw new Error('The bench server did not answer.')
  const cookie = await signIn(address, accounts.find(({ role }) => role === 'unit_lead').email)
  const me = await (await fetch(`${address}/api/me`, { headers: { cookie } })).json()
  return { address, cookie, counts, database, env, unitId: findUnitId(me), pid: child.pid, stop: () => child.kill('SIGKILL') }
}

async function signIn(address, email) {
  const response = await fetch(`${address}/api/auth/sign-in/email`, {
    method: 'POST',
    headers: { 'content-type': 'application/json', origin: address },
    body: JSON.stringify({ email, password: PASSWORD }),
  })
  if (!response.ok) throw new Error(`Sign-in answered ${response.status}.`)
  return response.headers
    .getSetCookie()
    .map((one) => one.split(';')[0])
    .join('; ')
}

function findUnitId(me) {
  const found = /"unitId":"([^"]+)"/.exec(JSON.stringify(me)) ?? /"units":\[\{"id":"([^"]+)"/.exec(JSON.stringify(me))
  if (!found) throw new Error('The reader has no unit.')
  return found[1]
}

/** Resident memory of a process in MB. */
export function residentMb(pid) {
  return Number(/VmRSS:\s+(\d+)/.exec(readFileSync(`/proc/${pid}/status`, 'utf8'))[1]) / 1024
}
