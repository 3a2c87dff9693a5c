import { request, type APIRequestContext, type Page } from '@playwright/test'
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import type { PatientListDto } from '@/lib/schemas/patients'
import type { TodayDto, TodayRowDto } from '@/lib/schemas/today'
import { expectAccessible, expectNoSidewaysScroll, setColours } from './support/look'
import { linkOf, waitForMail } from './support/mailbox'
import { baseUrlOf, testFolder } from './support/places'
import { expect, NOT_FOUND_404, signIn, test } from './support/test'

type Account = 'rt' | 'nurse' | 'physician' | 'unit_lead' | 'administrator' | 'nobody' | 'locked'
type Found = {
  unitId: string
  patientId: string
  breathing: string
  episode: string
  onHold: string
  onTrial: string
  toDecide: string
  decided: string
  ended: string
  endedPatient: string
  invitation: string
}
type Visit = { as: Account; to: (found: Found) => string; what?: string; then?: (page: Page) => Promise<void> }

const openDialog = (name: string | RegExp) => async (page: Page) => {
  await page.getByRole('button', { name }).first().click()
  await expect(page.getByRole('dialog')).toBeVisible()
}
const openAccountMenu = async (page: Page) => {
  await page.getByRole('banner').getByRole('button', { expanded: false }).last().click()
  await expect(page.getByRole('button', { name: 'Lock this screen now' })).toBeVisible()
}
const openAll = async (page: Page) => {
  await page.evaluate(() => document.querySelectorAll('details').forEach((each) => each.setAttribute('open', '')))
}
const at =
  (step: string, which: keyof Found = 'episode') =>
  (found: Found) =>
    `/episodes/${found[which]}/${step}`
const ofUnit = (page: string) => (found: Found) => `/units/${found.unitId}/${page}`
const ofPatient =
  (page: string, which: keyof Found = 'patientId') =>
  (found: Found) =>
    `/patients/${found[which]}${page}`

/** Every page of the application, by its file, in the states worth looking at. A page that is missing here fails the test. */
const VISITS: Record<string, Visit[]> = {
  '/page.tsx': [{ as: 'nurse', to: () => '/' }],
  '/(auth)/sign-in/page.tsx': [{ as: 'nobody', to: () => '/sign-in' }],
  '/(auth)/forgot-password/page.tsx': [{ as: 'nobody', to: () => '/forgot-password' }],
  '/(auth)/reset-password/page.tsx': [{ as: 'nobody', to: () => '/reset-password?token=not-a-real-token' }],
  '/(auth)/accept/page.tsx': [
    { as: 'nobody', to: ({ invitation }) => invitation },
    { as: 'nobody', what: 'used link', to: () => '/accept?token=not-a-real-token-at-all' },
  ],
  '/(auth)/locked/page.tsx': [{ as: 'locked', to: () => '/locked' }],
  '/(unit)/units/[unitId]/today/page.tsx': [
    { as: 'rt', to: ofUnit('today') },
    { as: 'unit_lead', to: ofUnit('today'), what: 'account menu', then: openAccountMenu },
  ],
  '/(unit)/units/[unitId]/patients/page.tsx': [{ as: 'nurse', to: ofUnit('patients') }],
  '/(unit)/units/[unitId]/patients/admit/page.tsx': [
    { as: 'nurse', to: ofUnit('patients/admit') },
    { as: 'unit_lead', to: ofUnit('patients/admit'), what: 'without the right' },
  ],
  '/(unit)/units/[unitId]/patients/open/page.tsx': [{ as: 'physician', to: ofUnit('patients/open') }],
  '/(unit)/units/[unitId]/review/page.tsx': [
    { as: 'unit_lead', to: ofUnit('review'), then: openAll },
    { as: 'unit_lead', to: ofUnit('review?from=2020-13&to=x'), what: 'wrong month' },
  ],
  '/(unit)/units/[unitId]/protocol/page.tsx': [{ as: 'physician', to: ofUnit('protocol'), then: openAll }],
  '/(unit)/units/[unitId]/protocol/edit/page.tsx': [{ as: 'unit_lead', to: ofUnit('protocol/edit') }],
  '/(unit)/units/[unitId]/mail/page.tsx': [
    { as: 'unit_lead', to: ofUnit('mail'), then: openAll },
    { as: 'rt', to: ofUnit('mail'), what: 'without the right' },
  ],
  '/(unit)/units/[unitId]/openings/page.tsx': [{ as: 'unit_lead', to: ofUnit('openings') }],
  '/(unit)/patients/[patientId]/page.tsx': [
    { as: 'physician', to: ofPatient(''), then: openAll },
    { as: 'unit_lead', to: ofPatient('', 'endedPatient'), what: 'ventilation ended', then: openAll },
    { as: 'nurse', to: ofPatient('', 'breathing'), what: 'not ventilated' },
  ],
  '/(unit)/patients/[patientId]/begin/page.tsx': [
    { as: 'rt', to: ofPatient('/begin', 'breathing') },
    { as: 'rt', to: ofPatient('/begin'), what: 'ventilated already' },
  ],
  '/(unit)/patients/[patientId]/correct/page.tsx': [{ as: 'nurse', to: ofPatient('/correct') }],
  '/(unit)/patients/[patientId]/move/page.tsx': [{ as: 'nurse', to: ofPatient('/move') }],
  '/(unit)/patients/[patientId]/leave/page.tsx': [{ as: 'nurse', to: ofPatient('/leave', 'breathing') }],
  '/(unit)/episodes/[episodeId]/screen/page.tsx': [
    { as: 'rt', to: at('screen'), then: openAll },
    { as: 'nurse', to: at('screen', 'decided'), what: 'to read only' },
  ],
  '/(unit)/episodes/[episodeId]/hold/page.tsx': [
    { as: 'nurse', to: at('hold'), then: (page) => page.getByRole('radio', { name: 'Continuous sedation is running' }).check() },
    { as: 'nurse', to: at('hold', 'onHold'), what: 'running' },
    {
      as: 'nurse',
      to: at('hold', 'onHold'),
      what: 'ending',
      then: (page) => page.getByRole('button', { name: 'Not tolerated', exact: true }).click(),
    },
  ],
  '/(unit)/episodes/[episodeId]/trial/page.tsx': [
    { as: 'rt', to: at('trial'), then: openAll },
    { as: 'rt', to: at('trial', 'onTrial'), what: 'running', then: openAll },
    {
      as: 'rt',
      to: at('trial', 'onTrial'),
      what: 'ending',
      then: (page) => page.getByRole('button', { name: 'Failed', exact: true }).click(),
    },
    { as: 'unit_lead', to: at('trial', 'decided'), what: 'ended' },
  ],
  '/(unit)/episodes/[episodeId]/decision/page.tsx': [
    { as: 'physician', to: at('decision', 'toDecide'), then: (page) => page.getByRole('radio', { name: 'Not today' }).check() },
    { as: 'unit_lead', to: at('decision', 'decided'), what: 'signed' },
  ],
  '/(unit)/episodes/[episodeId]/settings/page.tsx': [{ as: 'rt', to: at('settings') }],
  '/(unit)/episodes/[episodeId]/gases/page.tsx': [{ as: 'rt', to: at('gases') }],
  '/(unit)/episodes/[episodeId]/airway/page.tsx': [{ as: 'rt', to: at('airway') }],
  '/(unit)/episodes/[episodeId]/end/page.tsx': [
    {
      as: 'physician',
      to: at('end', 'onTrial'),
      then: (page) => page.getByRole('radio', { name: 'Extubated as planned' }).check(),
    },
    { as: 'physician', to: at('end', 'ended'), what: 'ended already' },
  ],
  '/(admin)/account/page.tsx': [{ as: 'administrator', to: () => '/account' }],
  '/(admin)/admin/people/page.tsx': [
    { as: 'administrator', to: () => '/admin/people' },
    { as: 'administrator', to: () => '/admin/people', what: 'inviting', then: openDialog('Invite a person') },
    { as: 'administrator', to: () => '/admin/people', what: 'changing', then: openDialog(/^Change /) },
  ],
  '/(admin)/admin/units/page.tsx': [
    { as: 'administrator', to: () => '/admin/units' },
    { as: 'administrator', to: () => '/admin/units', what: 'adding', then: openDialog('Add a unit') },
    { as: 'administrator', to: () => '/admin/units', what: 'beds', then: openDialog(/^Beds of /) },
  ],
  '/(admin)/admin/hospital/page.tsx': [{ as: 'administrator', to: () => '/admin/hospital' }],
}

const DEMO = baseUrlOf('demo')
const pageFiles = () =>
  readdirSync('app', { recursive: true, encoding: 'utf8' })
    .filter((path) => /(^|\/)page\.tsx$/.test(path))
    .map((path) => `/${path}`)

type DemoAccount = { role: Account; email: string; password: string }
const demoAccounts = (): DemoAccount[] =>
  readFileSync(join(testFolder('demo'), 'accounts.jsonl'), 'utf8')
    .trim()
    .split('\n')
    .map((line) => JSON.parse(line) as DemoAccount)

const accountOf = (role: Account) => {
  const account = demoAccounts().find((each) => each.role === role)
  if (!account) throw new Error(`The demo has no sign-in for ${role}.`)
  return account
}

/** What the demo hospital holds this morning, for the pages that are about one patient. */
async function lookAround(lead: APIRequestContext, administrator: APIRequestContext): Promise<Found> {
  const me = (await (await lead.get('/api/me')).json()) as { memberships: { unitId: string }[] }
  const unitIds = [...new Set(me.memberships.map(({ unitId }) => unitId))]
  const days = await Promise.all(
    unitIds.map(async (unitId) => (await (await lead.get(`/api/units/${unitId}/today`)).json()) as TodayDto),
  )
  const lists = await Promise.all(
    unitIds.map(async (unitId) => (await (await lead.get(`/api/units/${unitId}/patients`)).json()) as PatientListDto),
  )
  const rows = days.flatMap(({ rows: each }) => each)
  const pick = (what: string, fits: (row: TodayRowDto) => boolean): TodayRowDto => {
    const row = rows.find(fits)
    if (!row) throw new Error(`Nobody in the demo is ${what}.`)
    return row
  }
  const breathing = lists
    .flatMap(({ patients }) => patients)
    .find(({ episode, lastEndedAt }) => episode === null && lastEndedAt === null)
  if (!breathing) throw new Error('Everybody in the demo is ventilated.')
  const isRunning = (row: TodayRowDto) => row.endedAtMs === null
  const unscreened = pick('unscreened', (row) => isRunning(row) && row.track.screens.length === 0 && row.move.kind === 'move')
  const decided = pick('decided', (row) => isRunning(row) && row.track.decisions.length > 0 && row.track.trials.length > 0)
  const ended = pick('in the watch', (row) => row.endedAtMs !== null)
  // A worker that starts anew after a failure invites somebody else.
  const email = `newcomer.${Date.now()}@kestrel-ridge.example`
  const unit = unitIds[0] ?? ''
  const invited = await administrator.post('/api/admin/people', {
    data: { name: 'Nia Newcomer', email, isAdministrator: false, memberships: [{ unitId: unit, role: 'nurse' }] },
  })
  expect(invited.status()).toBe(200)
  return {
    unitId: unit,
    patientId: decided.patientId,
    breathing: breathing.patientId,
    episode: unscreened.episodeId,
    onHold: pick('on hold', (row) => row.track.holds.some(({ start, endMs }) => start === 'started' && endMs === null)).episodeId,
    onTrial: pick('on a trial', (row) => isRunning(row) && row.track.trials.some(({ endMs }) => endMs === null)).episodeId,
    toDecide: pick('waiting for a decision', (row) => row.move.kind === 'move' && row.move.step === 'decide').episodeId,
    decided: decided.episodeId,
    ended: ended.episodeId,
    endedPatient: ended.patientId,
    invitation: linkOf(await waitForMail(email, /choose a password/)),
  }
}

test('every page file is in the list, and every entry of the list is a page', () => {
  expect(Object.keys(VISITS).sort()).toEqual(pageFiles().sort())
})

type Storage = Awaited<ReturnType<typeof signIn>>
let found: Found
const cookies = new Map<Account, Storage>()

test.beforeAll(async () => {
  test.setTimeout(120_000)
  for (const role of ['rt', 'nurse', 'physician', 'unit_lead', 'administrator'] as const) {
    const { email, password } = accountOf(role)
    cookies.set(role, await signIn(DEMO, email, password))
  }
  const { email, password } = accountOf('nurse')
  const locked = await signIn(DEMO, email, password)
  cookies.set('locked', locked)
  const api = (storageState: Storage | undefined) =>
    request.newContext({ baseURL: DEMO, storageState, extraHTTPHeaders: { origin: DEMO } })
  const [lead, administrator, sleeper] = await Promise.all([
    api(cookies.get('unit_lead')),
    api(cookies.get('administrator')),
    api(locked),
  ])
  expect((await sleeper.post('/api/session/lock', { data: {} })).status()).toBe(200)
  found = await lookAround(lead, administrator)
  for (const context of [lead, administrator, sleeper]) await context.dispose()
})

for (const [file, visits] of Object.entries(VISITS)) {
  test(`${file}: axe finds nothing by day or night, and nothing has to be scrolled sideways at 360 px`, async ({
    openBrowser,
  }) => {
    test.setTimeout(120_000)
    for (const { as, to, what, then } of visits) {
      const where = `${file} as ${as}${what ? `, ${what}` : ''}`
      await test.step(where, async () => {
        const page = await openBrowser({
          baseURL: DEMO,
          storageState: cookies.get(as),
          viewport: { width: 360, height: 780 },
          reducedMotion: 'reduce',
        })
        const answer = await page.goto(to(found))
        expect.soft(answer?.status(), `status of ${where}`).toBe(200)
        await expect.soft(page.getByRole('heading', { level: 1 }).first(), `heading of ${where}`).toBeVisible()
        await then?.(page)
        await setColours(page, 'night')
        await expectNoSidewaysScroll(page, `${where}, phone`)
        await expectAccessible(page, `${where}, phone, night`)
        await page.setViewportSize({ width: 820, height: 1180 })
        await expectNoSidewaysScroll(page, `${where}, tablet`)
        await page.setViewportSize({ width: 1360, height: 900 })
        await setColours(page, 'day')
        await expectNoSidewaysScroll(page, `${where}, desktop`)
        await expectAccessible(page, `${where}, desktop, day`)
        await page.close()
      })
    }
  })
}

test('the pages that say "not found" are sound too', async ({ openBrowser, complaints }) => {
  complaints.expect(NOT_FOUND_404)
  const page = await openBrowser({ baseURL: DEMO, storageState: cookies.get('nurse'), viewport: { width: 360, height: 780 } })
  for (const path of ['/nowhere', '/patients/nobody-by-this-number', '/admin/people']) {
    await page.goto(path)
    await expect(page.getByRole('heading', { level: 1 }).first()).toBeVisible()
    await expectNoSidewaysScroll(page, path)
    await expectAccessible(page, path)
  }
})
