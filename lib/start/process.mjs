// Small helpers of the start scripts. Like all of them it uses Node's own modules only: nothing may be installed yet.
import { spawn } from 'node:child_process'
import { createServer } from 'node:net'
import { fileURLToPath } from 'node:url'

export const ROOT = fileURLToPath(new URL('../..', import.meta.url))
export const NEXT = 'node_modules/next/dist/bin/next'

/** A refusal that is told as one plain message, without a stack. */
export class Refusal extends Error {}

/** Says what happens next. */
export function say(text) {
  console.log(text)
}

/**
 * Runs a program in the project's folder and waits for it.
 * @param {string} command
 * @param {string[]} args
 * @param {{ env?: Record<string, string>, quiet?: boolean, onLine?: (line: string) => void }} [options] quiet keeps the output back unless it fails
 * @returns {Promise<number>} its exit code
 */
export function run(command, args, { env = {}, quiet = false, onLine } = {}) {
  return new Promise((resolve, reject) => {
    const isRead = quiet || onLine !== undefined
    const child = spawn(command, args, {
      cwd: ROOT,
      env: { ...process.env, ...env },
      stdio: ['ignore', isRead ? 'pipe' : 'inherit', quiet ? 'pipe' : 'inherit'],
    })
    const kept = []
    child.stdout?.on('data', (chunk) => kept.push(chunk))
    child.stderr?.on('data', (chunk) => kept.push(chunk))
    child.on('error', reject)
    child.on('close', (code) => {
      const text = Buffer.concat(kept).toString()
      if (quiet && code !== 0) process.stderr.write(text)
      if (onLine) text.split('\n').filter(Boolean).forEach(onLine)
      resolve(code ?? 1)
    })
  })
}

/** Runs a program that must succeed. */
export async function mustRun(what, command, args, options) {
  const code = await run(command, args, options)
  if (code !== 0) throw new Refusal(`${what} failed (exit code ${code}).`)
}

/** Runs one of our TypeScript programs, such as a job by name. The condition lets server modules load outside a server. */
export function runProgram(file, args, options) {
  return run(process.execPath, ['--conditions=react-server', '--import', 'tsx', file, ...args], options)
}

/** Runs npm, the same one that started us when there is one. */
export function runNpm(args, options) {
  const path = process.env.npm_execpath
  return path?.endsWith('.js') ? run(process.execPath, [path, ...args], options) : run('npm', args, options)
}

/**
 * Starts a server that lives as long as this script: signals are passed on, its exit code becomes ours.
 * @param {string[]} args
 * @param {Record<string, string>} env
 */
export function serve(args, env) {
  const child = spawn(process.execPath, args, { cwd: ROOT, env: { ...process.env, ...env }, stdio: 'inherit' })
  for (const signal of ['SIGINT', 'SIGTERM', 'SIGHUP']) process.on(signal, () => child.kill(signal))
  child.on('exit', (code, signal) => process.exit(code ?? (signal === 'SIGINT' || signal === 'SIGTERM' ? 0 : 1)))
  return child
}

/** Waits until the server answers, at most `seconds`; false when it does not. */
export async function waitUntilHealthy(address, seconds = 60) {
  for (const end = Date.now() + seconds * 1000; Date.now() < end;) {
    const answer = await fetch(`${address}/api/health`).catch(() => null)
    if (answer?.ok) return true
    await new Promise((resolve) => setTimeout(resolve, 150))
  }
  return false
}

/** Refuses a port that something else listens on: its answer would be taken for our server's. */
export function refuseTakenPort(host, port) {
  return new Promise((resolve, reject) => {
    const probe = createServer()
    probe.once('error', () =>
      reject(new Refusal(`Something already listens on ${host}:${port}. Stop it, or choose another port (PORT=3001).`)),
    )
    probe.listen(port, host, () => probe.close(() => resolve()))
  })
}

/** A port from a setting, or the usual one. */
export function readPort(text, usual) {
  if (text === undefined || text === '') return usual
  const port = Number(text)
  if (!Number.isInteger(port) || port < 1 || port > 65_535)
    throw new Refusal(`PORT is "${text}"; it must be a number from 1 to 65535.`)
  return port
}

/** Runs the script's work when the script itself was started, and turns a refusal into a message and exit code 1. */
export function main(url, work) {
  if (process.argv[1] !== fileURLToPath(url)) return
  process.chdir(ROOT)
  work(process.argv.slice(2)).catch((error) => {
    console.error(error instanceof Refusal ? `\n${error.message}` : error)
    process.exit(1)
  })
}
