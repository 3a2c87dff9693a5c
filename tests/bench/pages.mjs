// What a browser loads for each page: compressed script, and the time to a usable Today.
import { gzipSync } from 'node:zlib'
import { chromium } from '@playwright/test'

const FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]

/** Opens a browser that is signed in. */
async function openBrowser({ address, cookie }) {
  const browser = await chromium.launch({ executablePath: process.env.DAYBREATH_CHROMIUM ?? '/usr/bin/chromium', args: FLAGS })
  const cookies = cookie
    .split('; ')
    .map((pair) => ({ name: pair.slice(0, pair.indexOf('=')), value: pair.slice(pair.indexOf('=') + 1), url: address }))
  return {
    browser,
    newContext: async () => {
      const context = await browser.newContext()
      await context.addCookies(cookies)
      return context
    },
  }
}

/** Compressed script of each page in kB (1,000 bytes), everything that is loaded until the page is quiet. */
export async function scriptPerPage(server, paths) {
  const { browser, newContext } = await openBrowser(server)
  const sizes = {}
  for (const [name, path] of Object.entries(paths)) {
    const context = await newContext()
    const page = await context.newPage()
    const scripts = new Map()
    page.on('response', async (response) => {
      if (new URL(response.url()).pathname.endsWith('.js'))
        scripts.set(
          response.url(),
          response.body().catch(() => Buffer.alloc(0)),
        )
    })
    const answer = await page.goto(server.address + path)
    if (!answer.ok()) throw new Error(`${path} answered ${answer.status()}.`)
    await page.waitForTimeout(1500)
    const bodies = await Promise.all(scripts.values())
    sizes[name] = bodies.reduce((sum, body) => sum + gzipSync(body).length, 0) / 1000
    await context.close()
  }
  await browser.close()
  return sizes
}

/** Milliseconds from the request to a Today whose first patient can be opened and whose view can be switched: a new browser, and again with a full cache. */
export async function timeToToday(server, path) {
  const { browser, newContext } = await openBrowser(server)
  const times = { cold: [], warm: [] }
  for (let round = 0; round < 5; round += 1) {
    const context = await newContext()
    const page = await context.newPage()
    for (const kind of ['cold', 'warm']) {
      const from = performance.now()
      await page.goto(server.address + path, { waitUntil: 'commit' })
      await page.getByRole('main').getByRole('link').first().waitFor()
      await page.waitForFunction(() =>
        Object.keys(document.querySelector('main a') ?? {}).some((key) => key.startsWith('__react')),
      )
      times[kind].push(performance.now() - from)
    }
    await context.close()
  }
  await browser.close()
  return Object.fromEntries(Object.entries(times).map(([kind, values]) => [kind, values.sort((a, b) => a - b)[2]]))
}
