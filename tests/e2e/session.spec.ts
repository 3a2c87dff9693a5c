import { field, form } from './support/forms'
import { baseUrlOf, PASSWORD, PEOPLE, readWard } from './support/places'
import { startSpareServer } from './support/spare-server'
import { expect, LOCKED_423, signIn, test, UNAUTHENTICATED_401 } from './support/test'

const MINUTE_MS = 60_000
const baseURL = baseUrlOf('ward')

test('an idle screen locks, shows nothing, and brings back what was typed with the password', async ({
  openBrowser,
  ward,
  complaints,
}) => {
  complaints.expect(LOCKED_423, UNAUTHENTICATED_401)
  const { episodeId, familyName } = ward.patients.idle
  const page = await openBrowser({ baseURL, storageState: await signIn(baseURL, PEOPLE.sleeper.email, PASSWORD) })
  await page.clock.install({ time: new Date() })
  await page.goto(`/episodes/${episodeId}/screen`)
  const screen = form(page, 'Daily screen')
  await field(screen, 'FiO2').fill('0.45')
  await field(screen, 'Norepinephrine dose, 0 when none runs').fill('0.07')

  await page.clock.fastForward(14 * MINUTE_MS)
  await expect(field(screen, 'FiO2')).toBeVisible()
  await page.clock.fastForward(2 * MINUTE_MS)
  const cover = page.getByRole('dialog', { name: 'This screen is locked' })
  await expect(cover).toBeVisible()
  await expect(page).toHaveTitle('Locked')
  await expect(page.getByText(familyName)).toBeHidden()
  await expect(field(screen, 'FiO2')).toBeHidden()
  await page.keyboard.press('Escape')
  await expect(cover).toBeVisible()
  await expect.poll(async () => (await page.request.get(`/api/units/${ward.unitId}/today`)).status()).toBe(423)

  // The same browser cannot get round it by loading another page.
  const tab = await page.context().newPage()
  await tab.goto(`${baseURL}/units/${ward.unitId}/today`)
  await expect(tab.getByRole('heading', { name: 'This screen is locked' })).toBeVisible()
  await expect(tab.getByText(familyName)).toHaveCount(0)
  await tab.close()

  const password = cover.getByLabel(`Password of ${PEOPLE.sleeper.name}`)
  await cover.getByRole('button', { name: 'Unlock' }).click()
  await expect(password).toHaveAccessibleDescription('Write your password.')
  await password.fill('not the right sentence')
  await cover.getByRole('button', { name: 'Unlock' }).click()
  await expect(password).toHaveAccessibleDescription(/That is not your password/)
  complaints.expect(/status of 4(01|03|22)/)
  await password.fill(PASSWORD)
  await cover.getByRole('button', { name: 'Unlock' }).click()
  await expect(cover).toBeHidden()
  await expect(field(screen, 'FiO2')).toHaveValue('0.45')
  await expect(field(screen, 'Norepinephrine dose, 0 when none runs')).toHaveValue('0.07')
})

test('a session ended elsewhere ends here too, without losing what was typed', async ({ openBrowser, ward, complaints }) => {
  complaints.expect(UNAUTHENTICATED_401)
  const { episodeId } = ward.patients.idle
  const [here, today, elsewhere] = await Promise.all(
    [1, 2, 3].map(async () => openBrowser({ baseURL, storageState: await signIn(baseURL, PEOPLE.sleeper.email, PASSWORD) })),
  )
  if (!here || !today || !elsewhere) throw new Error('Three browsers are needed.')
  await here.goto(`/episodes/${episodeId}/settings`)
  const settings = form(here, 'Ventilator settings')
  await field(settings, 'PEEP').fill('7')
  await today.goto(`/units/${ward.unitId}/today`)

  await elsewhere.goto('/account')
  await elsewhere.getByRole('button', { name: 'Sign out everywhere' }).click()
  await expect(elsewhere).toHaveURL(/\/sign-in\?done=everywhere$/)

  await expect(today).toHaveURL(/\/sign-in\?next=/)
  await settings.getByRole('combobox', { name: 'Mode' }).selectOption('PC-CSV')
  await field(settings, 'FiO2').fill('0.40')
  await settings.getByRole('button', { name: 'Record', exact: true }).click()
  await expect(settings.getByRole('alert').filter({ hasText: 'Please sign in' })).toBeVisible()
  await expect(settings.getByRole('link', { name: 'Sign in in a new tab' })).toBeVisible()
  await expect(field(settings, 'PEEP')).toHaveValue('7')
})

test('Today says when it has not heard the server, and goes on by itself when the server is back', async ({
  openBrowser,
  complaints,
}) => {
  test.setTimeout(180_000)
  complaints.expect(/ERR_CONNECTION_REFUSED|ERR_EMPTY_RESPONSE|ERR_INCOMPLETE_CHUNKED_ENCODING|ERR_CONNECTION_RESET/)
  const server = await startSpareServer()
  try {
    const ward = readWard('spare')
    const spareUrl = baseUrlOf('spare')
    const page = await openBrowser({ baseURL: spareUrl, storageState: await signIn(spareUrl, PEOPLE.rt.email, PASSWORD) })
    await page.goto(`/units/${ward.unitId}/today`)
    const notice = page.getByRole('status').filter({ hasText: 'Not live' })
    await expect(page.getByText(ward.patients.rt.familyName)).toBeVisible()
    await expect(notice).toHaveCount(0)

    await server.kill()
    await expect(notice).toBeVisible({ timeout: 30_000 })
    await expect(page.getByText(ward.patients.rt.familyName)).toBeVisible()
    await server.startAgain()
    await expect(notice).toHaveCount(0, { timeout: 30_000 })

    const { episodeId, familyName } = ward.patients.rt
    const answer = await page.request.post(`/api/episodes/${episodeId}/screens`, {
      headers: { origin: spareUrl },
      data: { observed: server.clock(5, ward.zone), seenLatestId: null, excuse: 'prone', note: null, readings: null },
    })
    expect(answer.status()).toBe(200)
    await expect(page.getByRole('listitem').filter({ hasText: familyName })).toContainText('Excused today', { timeout: 5_000 })
  } finally {
    await server.end()
  }
})
