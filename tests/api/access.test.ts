import { existsSync, readFileSync } from 'node:fs'
import { eq } from 'drizzle-orm'
import { beforeAll, describe, expect, it } from 'vitest'
import { auditLog, session } from '@/db/schema'
import { routeParams, serveDatabase } from '../helpers/test-server'
import { dumpRows } from '../helpers/verb-checks'
import { ACCESS_TABLE, type Row } from './access-table'
import { filesBelow, findRoutes, METHODS, type Handler } from './routes'
import { CAST, freezeScene, IN_UNIT, makeScene, PASSWORD, PATIENT_WORDS, requestBy, type Cast, type Scene } from './scene'

let routes: Map<string, Partial<Record<string, Handler>>>
let freshScene: () => Scene
beforeAll(async () => {
  routes = await findRoutes()
  freshScene = freezeScene(await makeScene())
})

const name = (row: { route: string; method: string }) => `${row.method} ${row.route}`
const isOfSession = (row: Row) =>
  !row.route.startsWith('/api/auth/') && row.route !== '/api/health' && row.route !== '/api/session/accept'

async function call(row: Row, who: Cast, scene: Scene): Promise<{ status: number; text: string; headers: Headers }> {
  serveDatabase(scene.db)
  const { params = {}, body, search = '' } = row.prepare(scene)
  const path = row.route
    .replace('[...all]', 'update-user')
    .replaceAll(/\[(\w+)\]/g, (_, param: string) => params[param] ?? 'missing')
  const handler = routes.get(row.route)?.[row.method]
  if (!handler) throw new Error(`${name(row)} is not there.`)
  const before = dumpRows(scene.db, ['audit_log'])
  const response = await handler(requestBy(scene, path, { who, method: row.method, body, search }), routeParams(params))
  const text = await response.text()
  if (response.status >= 400)
    expect(dumpRows(scene.db, ['audit_log']), `${who} changed something by a refused ${name(row)}`).toEqual(before)
  return { status: response.status, text, headers: response.headers }
}

const denials = (scene: Scene) => scene.db.select().from(auditLog).where(eq(auditLog.action, 'access.denied')).all()

describe('the table of routes', () => {
  it('holds every route and method there is, each once, and none that is gone', () => {
    const there = [...routes].flatMap(([route, handlers]) =>
      METHODS.filter((method) => method in handlers).map((method) => `${method} ${route}`),
    )
    expect(there.length).toBeGreaterThan(40)
    expect(ACCESS_TABLE.map(name).sort()).toEqual(there.sort())
  })

  it('knows of every handler that a route file exports', () => {
    for (const [route, handlers] of routes) {
      const others = Object.keys(handlers).filter((key) => !METHODS.some((method) => method === key) && key !== 'dynamic')
      expect(others, route).toEqual([])
    }
  })

  it('lets nobody in by a server action or a page route outside app/api', () => {
    const sources = ['app', 'components', 'lib'].flatMap((folder) => filesBelow(folder, /\.tsx?$/))
    expect(sources.length).toBeGreaterThan(100)
    expect(sources.filter((file) => /^\s*['"]use server['"]/m.test(readFileSync(file, 'utf8')))).toEqual([])
    expect([...routes.keys()].filter((route) => !route.startsWith('/api/'))).toEqual([])
    expect(existsSync('pages')).toBe(false)
  })
})

describe.each(ACCESS_TABLE.map((row) => [name(row), row] as const))('%s', (_name, row) => {
  it.each(CAST.map((who) => [who, row.expected[who]] as const))('answers %s with %d', async (who, expected) => {
    const scene = freshScene()
    const { status, text, headers } = await call(row, who, scene)
    expect(status, text).toBe(expected)
    expect(headers.get('cache-control')).toBe('no-store')
    if (!IN_UNIT.includes(who) || status !== 200) {
      expect(
        PATIENT_WORDS.filter((word) => text.toLowerCase().includes(word.toLowerCase())),
        `patient data for ${who}`,
      ).toEqual([])
    }
    const denied = denials(scene)
    if (who === 'nobody' || who === 'deactivated' || !isOfSession(row) || (status !== 403 && status !== 404)) {
      expect(denied).toEqual([])
      return
    }
    const { requestId } = JSON.parse(text) as { requestId: string }
    expect(denied).toMatchObject([{ actorKind: 'person', actorId: scene.people[who].id, requestId }])
    expect(JSON.stringify(denied)).not.toMatch(new RegExp(PATIENT_WORDS.join('|'), 'i'))
  })
})

describe('what the table is worth', () => {
  it('finds the patient in the answers to those who work there, so that a leak would be seen', async () => {
    const naming = [
      '/api/units/[unitId]/today',
      '/api/units/[unitId]/patients',
      '/api/patients/[patientId]',
      '/api/episodes/[episodeId]/decisions',
    ]
    for (const route of naming) {
      const row = ACCESS_TABLE.find((one) => one.route === route && one.method === 'GET')
      if (!row) throw new Error(`${route} is not in the table.`)
      for (const who of IN_UNIT)
        expect((await call(row, who, freshScene())).text, `${route} for ${who}`).toContain(PATIENT_WORDS[0])
    }
  })

  it('shuts a person out of the unit from the moment a role ends, and a colleague’s role in another unit is of no use', async () => {
    const row = ACCESS_TABLE.find((one) => one.route === '/api/units/[unitId]/today')
    if (!row) throw new Error('Today is not in the table.')
    const scene = freshScene()
    scene.db.$client.prepare('update memberships set ended_at = 1 where person_id = ?').run(scene.people.physician.id)
    expect((await call(row, 'physician', scene)).status).toBe(404)
    expect((await call(row, 'rt', scene)).status).toBe(200)
  })

  it('answers 401 to every session route once the session is gone, and 423 at a locked screen, except where the lock itself is handled', async () => {
    const evenLocked = ['GET /api/me', 'POST /api/session/lock', 'POST /api/session/unlock']
    for (const row of ACCESS_TABLE.filter(isOfSession)) {
      const scene = freshScene()
      scene.db.$client.prepare('update session_states set locked_at = ?').run(Date.now())
      const locked = await call(
        row,
        row.expected.physician === 200 ? 'physician' : row.expected.unitLead === 200 ? 'unitLead' : 'administrator',
        scene,
      )
      expect(locked.status, name(row)).toBe(evenLocked.includes(name(row)) ? 200 : 423)
      const signedOut = freshScene()
      signedOut.db.delete(session).run()
      expect((await call(row, 'physician', signedOut)).status, name(row)).toBe(401)
    }
  })
})

describe('what sign-in opens', () => {
  const open = ['sign-in/email', 'sign-out', 'request-password-reset', 'reset-password']
  const bodies: Record<string, unknown> = {
    'sign-in/email': { email: 'nobody@example.invalid', password: PASSWORD },
    'sign-out': {},
    'request-password-reset': { email: 'nobody@example.invalid' },
    'reset-password': { token: 'x'.repeat(24), newPassword: 'another long sentence' },
  }

  it('answers these four, by POST only, and nothing else that the library has', async () => {
    const { createAuth } = await import('@/lib/server/auth')
    const scene = freshScene()
    serveDatabase(scene.db)
    const library = createAuth(scene.db, { baseUrl: 'http://daybreath.test', secret: 'x'.repeat(40), trustedProxyHeader: null })
    const paths = Object.values(library.api)
      .map((endpoint) => (endpoint as { path?: string }).path ?? '')
      .filter((path) => path.startsWith('/'))
    expect(paths).toEqual(expect.arrayContaining(['/sign-up/email', '/update-user', '/sign-in/email']))
    const POST = routes.get('/api/auth/[...all]')?.POST
    const GET = routes.get('/api/auth/[...all]')?.GET
    if (!POST || !GET) throw new Error('The route of the sign-in is not there.')
    const answered = []
    for (const path of new Set([
      ...paths.map((one) => one.slice(1).replaceAll(/:\w+/g, 'x')),
      ...open,
      'constructor',
      'sign-in/email/',
      'SIGN-OUT',
    ])) {
      const asked = `/api/auth/${path}`
      const post = await POST(requestBy(scene, asked, { who: 'rt', body: bodies[path] ?? {} }), routeParams())
      const get = await GET(requestBy(scene, asked, { who: 'rt', method: 'GET' }), routeParams())
      expect(get.status, `GET ${asked}`).toBe(404)
      if (post.status !== 404) answered.push(path)
    }
    expect(answered.sort()).toEqual([...open].sort())
  })
})

describe('pages', () => {
  const pages = filesBelow('app', /^app\/(\((unit|admin)\)\/.*)?page\.tsx$/)

  /** One leads on to another page, one is a form to be filled in: neither shows anything of a record. */
  const READS_NOTHING = ['app/page.tsx', 'app/(unit)/units/[unitId]/patients/open/page.tsx']

  it('are all found', () => {
    expect(pages).toEqual(expect.arrayContaining(READS_NOTHING))
    expect(pages.length).toBeGreaterThanOrEqual(14)
    const open = filesBelow('app/(auth)', /\/page\.tsx$/)
    expect(filesBelow('app', /\/page\.\w+$/)).toEqual([...pages, ...open].sort())
  })

  // A layout is no protection: it is not run again for each page below it.
  it.each(pages)('%s asks for the session itself, and reads by a verb that has a door', (file) => {
    const source = readFileSync(file, 'utf8')
    expect(source).toMatch(/await (pageCtx|requirePageActor)\(\)/)
    expect(source).not.toMatch(/from '@\/db\//)
    if (READS_NOTHING.includes(file)) {
      expect(source).not.toContain('@/lib/services/')
      return
    }
    const verbs = [...source.matchAll(/import \{([^}]+)\} from '@\/(lib\/services\/[^']+)'/g)]
    expect(verbs.length).toBeGreaterThan(0)
    for (const [, , path = ''] of verbs) expect(readFileSync(`${path}.ts`, 'utf8'), path).toContain('authorize(ctx,')
  })

  it('open to everybody read nothing of a unit', () => {
    for (const file of filesBelow('app/(auth)', /\.tsx$/)) {
      const services = [...readFileSync(file, 'utf8').matchAll(/from '@\/lib\/services\/([^']+)'/g)].map(([, path]) => path)
      expect(
        services.filter((path) => !['people/read-link', 'session/read-sign-in-page'].includes(path ?? '')),
        file,
      ).toEqual([])
    }
  })
})
