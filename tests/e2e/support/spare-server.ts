import { spawn, type ChildProcess } from 'node:child_process'
import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { clockAgo } from './forms'
import { baseUrlOf, PORTS, testFolder } from './places'

const FOLDER = testFolder('spare')

function runToEnd(args: string[]): Promise<void> {
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, args, { stdio: 'inherit' })
    child.on('error', reject)
    child.on('exit', (code) => (code === 0 ? resolve() : reject(new Error(`${args.join(' ')} ended with ${code}`))))
  })
}

async function waitUntil(isSo: () => Promise<boolean>, seconds = 60): Promise<void> {
  for (const end = Date.now() + seconds * 1000; Date.now() < end;) {
    if (await isSo()) return
    await new Promise((resolve) => setTimeout(resolve, 100))
  }
  throw new Error(`It did not come about in ${seconds} s.`)
}

const isHealthy = () =>
  fetch(`${baseUrlOf('spare')}/api/health`).then(
    (answer) => answer.ok,
    () => false,
  )

/** A production server of its own on a filled ward, to be killed and started again. `end` must be called. */
export async function startSpareServer() {
  await runToEnd(['--conditions=react-server', '--import', 'tsx', 'tests/e2e/support/fill-ward.ts', 'spare'])
  let child: ChildProcess | null = null
  const start = async () => {
    child = spawn(
      process.execPath,
      ['lib/start/serve-for-tests.mjs', '--port', String(PORTS.spare), '--folder', FOLDER, '--keep'],
      { stdio: 'inherit' },
    )
    await waitUntil(isHealthy)
  }
  /** SIGKILL to the server itself, as when the machine loses it in the middle of its work. */
  const kill = async () => {
    const running = child
    if (running === null || running.exitCode !== null) return
    const ended = new Promise((resolve) => running.once('exit', resolve))
    process.kill(Number(readFileSync(join(FOLDER, 'server.pid'), 'utf8')), 'SIGKILL')
    await ended
    child = null
  }
  await start()
  return {
    url: baseUrlOf('spare'),
    databaseFile: join(FOLDER, 'daybreath.db'),
    kill,
    startAgain: start,
    end: kill,
    clock: clockAgo,
  }
}
