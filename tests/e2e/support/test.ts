import { test as base, expect, request, type APIRequestContext, type BrowserContextOptions, type Page } from '@playwright/test'
import Database from 'better-sqlite3'
import { join } from 'node:path'
import { baseUrlOf, PASSWORD, PEOPLE, PORTS, readWard, testFolder, type Ward, type Who } from './places'

type Storage = Awaited<ReturnType<APIRequestContext['storageState']>>

/** Signs in through the API, as the page does, and answers the cookies. */
export async function signIn(baseURL: string, email: string, password: string): Promise<Storage> {
  const context = await request.newContext({ baseURL, extraHTTPHeaders: { origin: baseURL } })
  const answer = await context.post('/api/auth/sign-in/email', { data: { email, password } })
  if (!answer.ok()) throw new Error(`Signing in as ${email} was refused: ${answer.status()} ${await answer.text()}`)
  const storage = await context.storageState()
  await context.dispose()
  return storage
}

/** Whatever a page complained about. A test says beforehand which complaints are part of what it shows. */
export class Complaints {
  readonly #heard: string[] = []
  readonly #expected: RegExp[] = []

  /** A refusal (422, 403 …) that the test provokes stands in the browser's console. */
  expect(...patterns: RegExp[]): void {
    this.#expected.push(...patterns)
  }
  listenTo(page: Page): void {
    page.on('console', (message) => {
      if (message.type() === 'error') this.#heard.push(`${page.url()}: ${message.text()}`)
    })
    page.on('pageerror', (error) => this.#heard.push(`${page.url()}: ${error.message}`))
  }
  unexpected(): string[] {
    return this.#heard.filter((text) => !this.#expected.some((pattern) => pattern.test(text)))
  }
}

export const REFUSED_422 = /status of 422/
export const REFUSED_409 = /status of 409/
export const REFUSED_403 = /status of 403/
export const NOT_FOUND_404 = /status of 404/
export const UNAUTHENTICATED_401 = /status of 401/
export const LOCKED_423 = /status of 423/

type Fixtures = {
  complaints: Complaints
  ward: Ward
  /** A browser of its own for this person of the ward. Closed when the test ends. */
  openAs: (who: Who, options?: BrowserContextOptions) => Promise<Page>
  /** A browser of its own with these cookies, or with none, on any of the servers. */
  openBrowser: (options: BrowserContextOptions) => Promise<Page>
  /** Rows that the ward's database holds for a question. */
  rows: <Row = Record<string, unknown>>(sql: string, ...values: unknown[]) => Row[]
}
type WorkerFixtures = {
  storageOf: (who: Who) => Promise<Storage>
  /** The ward's API with this person's cookies, sent as our own pages send. */
  apiOf: (who: Who) => Promise<APIRequestContext>
}

export const test = base.extend<Fixtures, WorkerFixtures>({
  storageOf: [
    async ({}, provide) => {
      const known = new Map<Who, Promise<Storage>>()
      await provide((who) => {
        const storage = known.get(who) ?? signIn(baseUrlOf('ward'), PEOPLE[who].email, PASSWORD)
        known.set(who, storage)
        return storage
      })
    },
    { scope: 'worker' },
  ],
  apiOf: [
    async ({ storageOf }, provide) => {
      const opened: APIRequestContext[] = []
      await provide(async (who) => {
        const baseURL = baseUrlOf('ward')
        const context = await request.newContext({
          baseURL,
          storageState: await storageOf(who),
          extraHTTPHeaders: { origin: baseURL },
        })
        opened.push(context)
        return context
      })
      for (const context of opened) await context.dispose()
    },
    { scope: 'worker' },
  ],
  complaints: [
    async ({}, provide) => {
      const complaints = new Complaints()
      await provide(complaints)
      expect(complaints.unexpected(), 'complaints in the browser’s console').toEqual([])
    },
    { auto: true },
  ],
  ward: async ({}, provide) => provide(readWard()),
  openBrowser: async ({ browser, complaints }, provide) => {
    const opened: { close: () => Promise<void> }[] = []
    await provide(async (options) => {
      // A clock far away from the unit's: every time on a page is the unit's, wherever the browser is.
      const context = await browser.newContext({
        locale: 'en-GB',
        timezoneId: 'Pacific/Auckland',
        viewport: { width: 1280, height: 900 },
        ...options,
      })
      opened.push(context)
      const page = await context.newPage()
      complaints.listenTo(page)
      return page
    })
    for (const context of opened) await context.close()
  },
  openAs: async ({ openBrowser, storageOf }, provide) =>
    provide(async (who, options = {}) =>
      openBrowser({ baseURL: baseUrlOf('ward'), storageState: await storageOf(who), ...options }),
    ),
  rows: async ({}, provide) => {
    const db = new Database(join(testFolder('ward'), 'daybreath.db'), { readonly: true })
    await provide(<Row>(sql: string, ...values: unknown[]) => db.prepare(sql).all(...values) as Row[])
    db.close()
  },
})

export { expect, PORTS }
