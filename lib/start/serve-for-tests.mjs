// A production server for the browser tests: own port, own empty folder, nothing taken from .env.
// Use: node lib/start/serve-for-tests.mjs --port 3211 --folder <path> [--demo]. Without --demo the database is empty and the
// set-up link stands in <folder>/server.log; with it the demo hospital is filled and its accounts stand in <folder>/accounts.jsonl.
import { spawn } from 'node:child_process'
import { appendFileSync, mkdirSync, rmSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { parseArgs } from 'node:util'
import { main, readPort, Refusal, ROOT, runProgram } from './process.mjs'
import { serverArguments } from './start.mjs'

function testSettings(folder, port, isDemo) {
  return {
    NEXT_TELEMETRY_DISABLED: '1',
    NODE_ENV: 'production',
    DAYBREATH_DEMO: isDemo ? '1' : '0',
    DAYBREATH_JOBS: process.env.DAYBREATH_JOBS ?? '1',
    DAYBREATH_DATABASE: join(folder, 'daybreath.db'),
    DAYBREATH_SECRET: 'for-browser-tests-only-0123456789abcdef',
    DAYBREATH_BASE_URL: `http://localhost:${port}`,
    DAYBREATH_TRUSTED_PROXY_HEADER: process.env.DAYBREATH_TRUSTED_PROXY_HEADER ?? '',
    DAYBREATH_LOG_LEVEL: 'info',
    SMTP_URL: process.env.DAYBREATH_TEST_SMTP_URL ?? '',
    MAIL_FROM: '',
    MAIL_FOLDER: join(folder, 'mail'),
  }
}

async function serveForTests(args) {
  const { values } = parseArgs({
    args,
    options: {
      port: { type: 'string' },
      folder: { type: 'string' },
      demo: { type: 'boolean', default: false },
      keep: { type: 'boolean', default: false },
    },
  })
  const { folder, demo, keep } = values
  if (!folder || !folder.includes('daybreath'))
    throw new Refusal('--folder is needed, and "daybreath" in its path: it is emptied first.')
  const port = readPort(values.port, 3211)
  if (!keep) rmSync(folder, { recursive: true, force: true })
  mkdirSync(folder, { recursive: true, mode: 0o700 })
  const env = testSettings(folder, port, demo)
  if (demo && !keep) {
    const lines = []
    const code = await runProgram('jobs/run.ts', ['demo.fill'], { env, onLine: (line) => lines.push(line) })
    if (code !== 0) throw new Refusal(`The demo hospital could not be filled.\n${lines.join('\n')}`)
    writeFileSync(join(folder, 'accounts.jsonl'), `${lines.filter((line) => line.startsWith('{')).join('\n')}\n`)
  }
  const child = spawn(process.execPath, serverArguments({ host: '127.0.0.1', port }), {
    cwd: ROOT,
    env: { ...process.env, ...env },
    stdio: ['ignore', 'pipe', 'pipe'],
  })
  const log = join(folder, 'server.log')
  for (const stream of [child.stdout, child.stderr]) stream.on('data', (chunk) => appendFileSync(log, chunk))
  writeFileSync(join(folder, 'server.pid'), String(child.pid))
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => child.kill(signal))
  child.on('exit', (code) => process.exit(code ?? 1))
}

main(import.meta.url, serveForTests)
