import { readFileSync } from 'node:fs'
import { join } from 'node:path'
import { choose, expectMarked, expectRefused, field, fill, form } from './support/forms'
import { expectAccessible } from './support/look'
import { linkOf, waitForMail } from './support/mailbox'
import { baseUrlOf, morningZone, testFolder } from './support/places'
import { expect, NOT_FOUND_404, REFUSED_403, REFUSED_422, test, UNAUTHENTICATED_401 } from './support/test'

const baseURL = baseUrlOf('empty')
const PASSWORD = 'harbour lights at dawn'
const ADMINISTRATOR = 'first.administrator@harbour.example'
const NURSE = 'new.nurse@harbour.example'

/** What the server prints when nobody is set up yet. */
const printedSetupLink = () => {
  const link = /http:\/\/\S+\/accept\?token=\S+/.exec(readFileSync(join(testFolder('empty'), 'server.log'), 'utf8'))?.[0]
  if (!link) throw new Error('The server printed no set-up link.')
  return link
}

test('an administrator sets up hospital, units, beds, people and roles, and sees no patient data', async ({
  openBrowser,
  complaints,
}) => {
  test.setTimeout(180_000)
  const page = await openBrowser({ baseURL, timezoneId: morningZone() })
  const link = printedSetupLink()

  await test.step('the first administrator opens the printed link', async () => {
    await page.goto('/sign-in')
    await expect(page.getByText('Not set up yet')).toBeVisible()
    await page.goto(link)
    const setup = form(page, 'Set up Daybreath')
    await setup.getByRole('button', { name: 'Set up' }).click()
    await expectRefused(setup, 'Write the name of the hospital.')
    await expectAccessible(page, 'set-up with refusals')
    await fill(setup, { Hospital: 'Harbour Infirmary', 'Your name': 'Avery Firstkey', 'Your e-mail address': ADMINISTRATOR })
    await setup.getByLabel('Password', { exact: true }).fill('short')
    await setup.getByRole('button', { name: 'Set up' }).click()
    await expectMarked(setup.getByLabel('Password', { exact: true }), /at least 12 characters/)
    await expect(field(setup, 'Hospital')).toHaveValue('Harbour Infirmary')
    await setup.getByLabel('Password', { exact: true }).fill(PASSWORD)
    await setup.getByRole('button', { name: 'Set up' }).dblclick()
    await expect(page.getByText('Your password is set. Sign in with it.')).toBeVisible()
    const again = await openBrowser({ baseURL })
    await again.goto(link)
    await expect(again.getByRole('heading', { name: 'This link opens nothing' })).toBeVisible()
  })

  await test.step('signing in: empty, wrong, right', async () => {
    complaints.expect(REFUSED_422)
    const signIn = form(page, 'Sign in')
    await signIn.getByRole('button', { name: 'Sign in' }).click()
    await expectRefused(signIn, 'Write the e-mail address.')
    await field(signIn, 'E-mail address').fill(ADMINISTRATOR)
    await signIn.getByLabel('Password', { exact: true }).fill('not the right sentence')
    await signIn.getByRole('button', { name: 'Sign in' }).click()
    await expect(signIn.getByRole('alert').filter({ hasText: /password|e-mail/i })).toBeVisible()
    await expect(field(signIn, 'E-mail address')).toHaveValue(ADMINISTRATOR)
    await signIn.getByLabel('Password', { exact: true }).fill(PASSWORD)
    await signIn.getByRole('button', { name: 'Sign in' }).click()
    await expect(page).toHaveURL(/\/admin\/people$/)
  })

  await test.step('hospital', async () => {
    await page.getByRole('link', { name: 'Hospital', exact: true }).click()
    const hospital = form(page, 'Hospital')
    await field(hospital, 'Screens lock after').fill('0')
    await hospital.getByRole('button', { name: 'Save' }).click()
    await expectMarked(field(hospital, 'Screens lock after'), /At least 1 minute/)
    await field(hospital, 'Name').fill('')
    await hospital.getByRole('button', { name: 'Save' }).click()
    await expectMarked(field(hospital, 'Name'), /Write the name of the hospital/)
    await fill(hospital, { Name: 'Harbour Infirmary', 'Screens lock after': '20' })
    await hospital.getByRole('button', { name: 'Save' }).dblclick()
    await expect(hospital.getByRole('status').filter({ hasText: 'Saved.' })).toBeVisible()
  })

  await test.step('units and beds', async () => {
    await page.getByRole('link', { name: 'Units', exact: true }).click()
    await page.getByRole('button', { name: 'Add a unit' }).click()
    const unit = form(page, 'Add a unit')
    await unit.getByRole('button', { name: 'Add unit' }).click()
    await expectRefused(unit, 'Write the name of the unit.')
    await fill(unit, { Name: 'Harbour ICU', Altitude: '12', 'Barometer reading': '1013', 'Bed labels': 'H01..H04' })
    await unit.getByRole('button', { name: 'Add unit' }).click()
    await expectMarked(field(unit, 'Barometer reading'), /hPa/)
    await expect(field(unit, 'Bed labels')).toHaveValue('H01..H04')
    await field(unit, 'Barometer reading').fill('')
    await unit.getByRole('button', { name: 'Add unit' }).dblclick()
    await expect(page.getByRole('status').filter({ hasText: 'Harbour ICU is added.' })).toBeVisible()
    await expect(page.getByRole('heading', { name: 'Harbour ICU' })).toHaveCount(1)
    await expect(page.getByText('4 beds: H01, H02, H03, H04')).toBeVisible()

    await page.getByRole('button', { name: 'Beds of Harbour ICU' }).click()
    const beds = form(page, 'Add beds')
    await beds.getByRole('button', { name: 'Add beds' }).click()
    await expectRefused(beds, 'Write at least one bed label.')
    await field(beds, 'Bed labels').fill('H05')
    await beds.getByRole('button', { name: 'Add beds' }).dblclick()
    await expect(page.getByRole('button', { name: 'Take bed H05 out of use' })).toHaveCount(1)
    await page.getByRole('button', { name: 'Take bed H04 out of use' }).click()
    await expect(page.getByText('Out of use: H04')).toBeVisible()
    await page.getByRole('dialog').getByRole('button', { name: 'Close' }).click()
  })

  const nurse = await openBrowser({ baseURL })
  await test.step('an invitation by mail, followed through its link', async () => {
    await page.getByRole('link', { name: 'People', exact: true }).click()
    await page.getByRole('button', { name: 'Invite a person' }).click()
    const invitation = form(page, 'Invite a person')
    await invitation.getByRole('button', { name: 'Send invitation' }).click()
    await expectRefused(invitation, 'Write the name.')
    await fill(invitation, { Name: 'Nell Newberth', 'E-mail address': 'not an address' })
    await invitation.getByRole('button', { name: 'Send invitation' }).click()
    await expectMarked(field(invitation, 'E-mail address'), /Write an e-mail address/)
    await expect(field(invitation, 'Name')).toHaveValue('Nell Newberth')
    await field(invitation, 'E-mail address').fill(NURSE)
    await invitation.getByRole('group', { name: 'Harbour ICU' }).getByRole('checkbox', { name: 'Nurse' }).check()
    await invitation.getByRole('button', { name: 'Send invitation' }).dblclick()
    await expect(page.getByRole('row').filter({ hasText: NURSE })).toHaveCount(1)
    await expect(page.getByRole('row').filter({ hasText: NURSE })).toContainText('Harbour ICU: Nurse')

    await nurse.goto(linkOf(await waitForMail(NURSE, /choose a password/)))
    await expect(nurse.getByRole('heading', { name: 'Welcome, Nell Newberth' })).toBeVisible()
    const accept = form(nurse, 'Set your password')
    await accept.getByRole('button', { name: 'Set password' }).click()
    await expectMarked(accept.getByLabel('Password', { exact: true }), /at least 12 characters/)
    await accept.getByLabel('Password', { exact: true }).fill('quiet harbour evening')
    await accept.getByRole('button', { name: 'Set password' }).dblclick()
    await expect(nurse.getByText('Your password is set. Sign in with it.')).toBeVisible()
    const signIn = form(nurse, 'Sign in')
    await field(signIn, 'E-mail address').fill(NURSE)
    await signIn.getByLabel('Password', { exact: true }).fill('quiet harbour evening')
    await signIn.getByRole('button', { name: 'Sign in' }).dblclick()
    await expect(nurse).toHaveURL(/\/units\/[^/]+\/today$/)
    await expect(nurse.getByText('Nobody is ventilated in this unit.')).toBeVisible()
  })
  const unitId = /units\/([^/]+)\//.exec(nurse.url())?.[1] ?? ''

  await test.step('the nurse admits a patient, whom the administrator does not see', async () => {
    complaints.expect(NOT_FOUND_404, REFUSED_403, UNAUTHENTICATED_401)
    await nurse.getByRole('link', { name: 'Admit a patient' }).click()
    const admission = form(nurse, 'Admit a patient')
    await admission.getByRole('combobox', { name: 'Bed' }).selectOption({ label: 'H01' })
    await fill(admission, {
      'Record number': 'HX-7731',
      'Family name': 'Quillifer',
      'Given name': 'Zebedee',
      Height: '176',
      Weight: '80',
    })
    await admission.getByLabel('Date of birth').fill('1961-05-20')
    await choose(admission, 'Sex, for predicted body weight', 'Man')
    await admission.getByRole('button', { name: 'Admit', exact: true }).click()
    await expect(nurse.getByRole('heading', { name: 'Quillifer, Zebedee' })).toBeVisible()
    const patientPath = new URL(nurse.url()).pathname

    for (const path of ['/admin/people', '/admin/units', '/admin/hospital', '/account']) {
      await page.goto(path)
      await expect(page.getByRole('heading', { level: 1 })).toBeVisible()
      await expect(page.locator('body')).not.toContainText(/Quillifer|HX-7731/)
      await expect(page.getByRole('link', { name: 'Today' })).toHaveCount(0)
    }
    for (const path of [
      patientPath,
      ...['today', 'patients', 'review', 'mail', 'protocol'].map((name) => `/units/${unitId}/${name}`),
    ]) {
      await page.goto(path)
      await expect(page.getByRole('heading', { name: 'Not found' })).toBeVisible()
      await expect(page.locator('body')).not.toContainText(/Quillifer|HX-7731/)
    }
    for (const path of [`/api/units/${unitId}/today`, `/api/units/${unitId}/patients`, `/api${patientPath}`]) {
      expect((await page.request.get(path)).status(), path).toBe(404)
    }
    await nurse.goto('/admin/people')
    await expect(nurse.getByRole('heading', { name: 'Invite a person' })).toHaveCount(0)
    await expect(nurse.locator('body')).not.toContainText(ADMINISTRATOR)
    expect((await nurse.request.get('/api/admin/people')).status()).toBe(403)
  })

  await test.step('roles change, and the end of an account ends its sessions', async () => {
    await nurse.goto(`/units/${unitId}/today`)
    await page.goto('/admin/people')
    await page.getByRole('button', { name: 'Change Nell Newberth' }).click()
    const roles = form(page, 'Roles of Nell Newberth')
    await roles.getByRole('checkbox', { name: 'Nurse' }).uncheck()
    await roles.getByRole('button', { name: 'Save roles' }).click()
    await expectRefused(roles, 'Give at least one role')
    await roles.getByRole('checkbox', { name: 'RT' }).check()
    await roles.getByRole('button', { name: 'Save roles' }).click()
    await expect(page.getByRole('row').filter({ hasText: NURSE })).toContainText('Harbour ICU: RT')

    await page.getByRole('button', { name: 'Change Nell Newberth' }).click()
    await page.getByRole('button', { name: 'Deactivate', exact: true }).click()
    await page.getByRole('button', { name: 'Deactivate now' }).click()
    await expect(page.getByRole('row').filter({ hasText: NURSE })).toContainText('Deactivated')
    await expect(nurse).toHaveURL(/\/sign-in\?next=/)
  })
})
