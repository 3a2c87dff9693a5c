import { request } from '@playwright/test'
import Database from 'better-sqlite3'
import { newId } from '@/lib/shared/ids'
import { checkAuditLog } from './support/audit-check'
import { clockAgo } from './support/forms'
import { PASSWORD, PEOPLE, readWard } from './support/places'
import { startSpareServer } from './support/spare-server'
import { expect, signIn, test } from './support/test'

const KILLS = 5
const ENTRIES_BEFORE_KILL = 12

test('the server is killed while settings are written: whatever was acknowledged stands there afterwards, once, and the audit log is whole', async () => {
  test.setTimeout(240_000)
  const server = await startSpareServer()
  try {
    const ward = readWard('spare')
    const api = await request.newContext({
      baseURL: server.url,
      storageState: await signIn(server.url, PEOPLE.rt.email, PASSWORD),
      extraHTTPHeaders: { origin: server.url },
    })
    const observed = clockAgo(3, ward.zone)
    const acknowledged = new Map<string, string>()
    const write = async (key: string) => {
      const answer = await api.post(`/api/episodes/${ward.patients.lone.episodeId}/settings`, {
        headers: { 'idempotency-key': key },
        data: {
          observed,
          mode: 'PC-CSV',
          fio2Fraction: 0.4,
          peepCmH2O: 6,
          setRatePerMin: null,
          setTidalVolumeMl: null,
          inspiratoryPressureCmH2O: null,
          pressureSupportCmH2O: 8,
          measuredRatePerMin: 18,
          measuredTidalVolumeMl: 420,
          peakPressureCmH2O: null,
          plateauPressureCmH2O: null,
          spo2Percent: 96,
        },
      })
      expect(answer.status()).toBe(200)
      acknowledged.set(key, ((await answer.json()) as { id: string }).id)
    }
    const unanswered: string[] = []
    for (let kill = 0; kill < KILLS; kill += 1) {
      const target = acknowledged.size + ENTRIES_BEFORE_KILL
      let isKilled = false
      const writers = [1, 2, 3].map(async () => {
        while (!isKilled) {
          const key = newId()
          try {
            await write(key)
          } catch (error) {
            if (!isKilled) throw error
            unanswered.push(key)
          }
        }
      })
      await expect.poll(() => acknowledged.size, { intervals: [5], timeout: 60_000 }).toBeGreaterThanOrEqual(target)
      isKilled = true
      await server.kill()
      await Promise.all(writers)
      await server.startAgain()
    }
    expect(unanswered.length, 'requests that were under way when the server was killed').toBeGreaterThan(0)

    const before = new Map(acknowledged)
    // Sent again with its key, an unanswered request is recorded once whether or not it had been; an answered one is not recorded again.
    for (const key of [...unanswered, ...before.keys()]) await write(key)
    for (const [key, id] of before) expect(acknowledged.get(key)).toBe(id)
    await server.kill()

    const client = new Database(server.databaseFile, { readonly: true })
    const kept = client
      .prepare('select id from settings where measured_rate_per_min = 18 and episode_id = ?')
      .pluck()
      .all(ward.patients.lone.episodeId)
    expect(new Set(kept)).toEqual(new Set(acknowledged.values()))
    expect(kept).toHaveLength(acknowledged.size)
    expect(client.pragma('integrity_check', { simple: true })).toBe('ok')
    expect(checkAuditLog(server.databaseFile)).toMatchObject({ isWhole: true })
    const audited = client.prepare("select count(*) from audit_log where action = 'settings.record'").pluck().get()
    expect(audited).toBe(acknowledged.size)
    client.close()
    await api.dispose()
  } finally {
    await server.end()
  }
})
