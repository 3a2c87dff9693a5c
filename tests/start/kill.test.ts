import { spawn, type ChildProcessByStdio } from 'node:child_process'
import { once } from 'node:events'
import { rmSync } from 'node:fs'
import { join, resolve } from 'node:path'
import type { Readable, Writable } from 'node:stream'
import { build } from 'vite'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Db } from '@/db/client'
import { verifyAuditLog } from '@/lib/server/verify-audit'
import { makeTestFolder, openTestDatabaseFile } from '../helpers/database'
import { makeWorld, NOW, toActor, TODAY } from '../helpers/factories'
import type { Acknowledged, Orders } from '../helpers/write-until-killed'

const KILLS = 100
const MOST_ANSWERS = 12
const MOST_DELAY_MS = 15
type Writer = ChildProcessByStdio<Writable, Readable, null>

const OUTPUT = resolve(`node_modules/.cache/daybreath-kill-${process.pid}`)

/** Bundles the writer once, so that each of the hundred starts takes a fifth of a second. */
beforeAll(async () => {
  await build({
    configFile: false,
    logLevel: 'error',
    resolve: {
      alias: [
        { find: /^server-only$/, replacement: resolve('tests/helpers/server-only.ts') },
        { find: /^@\//, replacement: `${resolve('.')}/` },
      ],
    },
    ssr: { external: ['better-sqlite3', 'pino'], noExternal: true },
    build: { ssr: 'tests/helpers/write-until-killed.ts', outDir: OUTPUT, minify: false },
  })
})
afterAll(() => rmSync(OUTPUT, { recursive: true, force: true }))

/** A writer with its modules loaded, waiting for its orders; the next one warms up while the last one writes. */
async function startWriter(): Promise<Writer> {
  const writer = spawn(process.execPath, [join(OUTPUT, 'write-until-killed.js')], {
    stdio: ['pipe', 'pipe', 'inherit'],
    env: { ...process.env, NODE_ENV: 'production' },
  })
  await once(writer.stdout, 'data')
  return writer
}

/**
 * Lets a writer write and kills it with SIGKILL: after a random number of answers and a few random milliseconds more, so that the blow
 * falls in the middle of a write however slow the machine is; some at once, while the file is still being opened.
 */
async function writeAndKill(writer: Writer, orders: Orders): Promise<Acknowledged[]> {
  let text = ''
  const answersBefore = Math.floor(Math.random() * MOST_ANSWERS)
  const enough = new Promise<void>((resolve) => {
    if (answersBefore === 0) resolve()
    writer.stdout.on('data', (chunk: Buffer) => {
      text += chunk.toString()
      if (text.split('\n').length > answersBefore) resolve()
    })
  })
  const closed = once(writer, 'close')
  writer.stdin.write(`${JSON.stringify(orders)}\n`)
  await Promise.race([enough, closed])
  await new Promise((resolve) => setTimeout(resolve, Math.random() * MOST_DELAY_MS))
  writer.kill('SIGKILL')
  const [code, signal] = (await closed) as [number | null, string | null]
  expect({ code, signal }).toEqual({ code: null, signal: 'SIGKILL' })
  const whole = text
    .slice(0, text.lastIndexOf('\n') + 1)
    .split('\n')
    .filter(Boolean)
  return whole.map((line) => JSON.parse(line) as Acknowledged)
}

/** What must hold after every kill: all that was acknowledged is there once, with its audit row, and the file is sound. */
function check(db: Db, acknowledged: ReadonlyMap<number, string>): void {
  const ids = db.$client.prepare('select id from settings').pluck().all() as string[]
  const known = new Set(ids)
  expect([...acknowledged.values()].filter((id) => !known.has(id))).toEqual([])
  const unaudited = `select count(*) from settings where (select count(*) from audit_log where subject_id = settings.id and action = 'settings.record') <> 1`
  expect(db.$client.prepare(unaudited).pluck().get()).toBe(0)
  const unrecorded = `select count(*) from audit_log where action = 'settings.record' and subject_id not in (select id from settings)`
  expect(db.$client.prepare(unrecorded).pluck().get()).toBe(0)
  // At most one request was carried out whose answer did not get through any more.
  expect(ids.length - acknowledged.size).toBeGreaterThanOrEqual(0)
  expect(ids.length - acknowledged.size).toBeLessThanOrEqual(1)
  expect(verifyAuditLog(db)).toMatchObject({ isWhole: true })
  expect(db.$client.pragma('integrity_check', { simple: true })).toBe('ok')
  expect(db.$client.pragma('foreign_key_check')).toEqual([])
}

describe('a server that is killed while it writes', () => {
  it(`${KILLS} times keeps every acknowledged write once, and its audit log whole`, { timeout: 600_000 }, async () => {
    const file = join(makeTestFolder(), 'daybreath.db')
    const first = openTestDatabaseFile(file)
    const world = makeWorld(first)
    const orders = { file, episodeId: world.episode.id, actor: toActor(world.rt), now: NOW, day: TODAY, time: '07:30' }
    first.$client.close()

    const acknowledged = new Map<number, string>()
    let killsDuringWrites = 0
    let waiting: Promise<Writer> | null = startWriter()
    for (let kill = 1; kill <= KILLS; kill += 1) {
      const writer = await (waiting ?? startWriter())
      waiting = kill < KILLS ? startWriter() : null
      // Begins with the request after the last acknowledged one, which the killed writer may have carried out already.
      const answers = await writeAndKill(writer, { ...orders, firstNumber: acknowledged.size + 1 })
      for (const { number, id } of answers) acknowledged.set(number, id)
      if (answers.length > 0) killsDuringWrites += 1
      const db = openTestDatabaseFile(file)
      check(db, acknowledged)
      db.$client.close()
    }
    expect([...acknowledged.keys()]).toEqual(Array.from({ length: acknowledged.size }, (_, index) => index + 1))
    expect(acknowledged.size).toBeGreaterThan(KILLS)
    expect(killsDuringWrites).toBeGreaterThan(KILLS / 2)
  })
})
