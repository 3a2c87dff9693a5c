import { spawnSync } from 'node:child_process'
import { join } from 'node:path'
import { describe, expect, it } from 'vitest'
import { isWithoutHospital, refuseMixture } from '@/lib/server/prepare-database'
import { makeTestFolder, openTestDatabase, openTestDatabaseFile } from '../helpers/database'

function makeDatabase(isDemo: boolean | null) {
  const db = openTestDatabase()
  if (isDemo !== null)
    db.$client.exec(`insert into hospitals (id, name, is_demo, created_at) values ('h', 'Invented', ${isDemo ? 1 : 0}, 1)`)
  return db
}

describe('real and invented data', () => {
  it.each([
    ['a real server', 'an empty database', false, null],
    ['a real server', 'a real hospital', false, false],
    ['the demo', 'an empty database', true, null],
    ['the demo', 'the demo hospital', true, true],
  ])('%s opens %s', (_server, _database, isDemo, hospital) => {
    expect(() => refuseMixture(makeDatabase(hospital), isDemo)).not.toThrow()
  })

  it('a real server refuses the demo hospital', () => {
    expect(() => refuseMixture(makeDatabase(true), false)).toThrow('invented demo data')
  })

  it('the demo refuses a real hospital', () => {
    expect(() => refuseMixture(makeDatabase(false), true)).toThrow('belongs to a real hospital')
  })

  it('a database without a hospital asks for set-up', () => {
    expect([isWithoutHospital(makeDatabase(null)), isWithoutHospital(makeDatabase(false))]).toEqual([true, false])
  })
})

/** Runs the server's start in a process of its own, as the server does, without a server around it. */
function bootIn(settings: Record<string, string>) {
  const program = `import('@/lib/server/boot').then(({ boot }) => { boot(); boot() })`
  return spawnSync(process.execPath, ['--conditions=react-server', '--import', 'tsx', '--input-type=module', '-e', program], {
    env: { PATH: process.env.PATH ?? '', NODE_ENV: 'production', DAYBREATH_JOBS: '0', ...settings },
    encoding: 'utf8',
  })
}

describe('the start of a server', { timeout: 60_000 }, () => {
  const SECRET = 'for-this-test-only-0123456789abcdef'

  it('prints a set-up link once for an empty database, and begins its record', () => {
    const file = join(makeTestFolder(), 'daybreath.db')
    const done = bootIn({ DAYBREATH_SECRET: SECRET, DAYBREATH_DATABASE: file, DAYBREATH_BASE_URL: 'https://daybreath.example' })
    expect(done.stderr).toBe('')
    expect(done.status).toBe(0)
    expect(done.stdout.match(/https:\/\/daybreath\.example\/accept\?token=\S{20,}/g)).toHaveLength(1)
    const db = openTestDatabaseFile(file)
    expect(db.$client.prepare('select action from audit_log').pluck().all()).toEqual(['setup.link_created'])
    db.$client.close()
  })

  it('prints no link once there is a hospital', () => {
    const file = join(makeTestFolder(), 'daybreath.db')
    const db = openTestDatabaseFile(file)
    db.$client.exec(`insert into hospitals (id, name, created_at) values ('h', 'Invented', 1)`)
    db.$client.close()
    const done = bootIn({ DAYBREATH_SECRET: SECRET, DAYBREATH_DATABASE: file })
    expect(done.status).toBe(0)
    expect(done.stdout).not.toContain('token')
  })

  it('ends with a message that names the wrong setting', () => {
    const done = bootIn({ DAYBREATH_DATABASE: join(makeTestFolder(), 'daybreath.db') })
    expect(done.status).toBe(1)
    expect(done.stderr).toContain('DAYBREATH_SECRET is missing')
  })

  it('ends when the database is the demo', () => {
    const file = join(makeTestFolder(), 'daybreath.db')
    const db = openTestDatabaseFile(file)
    db.$client.exec(`insert into hospitals (id, name, is_demo, created_at) values ('h', 'Invented', 1, 1)`)
    db.$client.close()
    const done = bootIn({ DAYBREATH_SECRET: SECRET, DAYBREATH_DATABASE: file })
    expect(done.status).toBe(1)
    expect(done.stderr).toContain('invented demo data')
  })
})
