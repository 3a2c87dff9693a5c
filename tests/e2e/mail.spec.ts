import { clockAgo, field, form, moveLink } from './support/forms'
import { countMail, linkOf, waitForMail } from './support/mailbox'
import { baseUrlOf, PASSWORD, PEOPLE } from './support/places'
import { expect, REFUSED_422, test } from './support/test'

const baseURL = baseUrlOf('ward')

test('a forgotten password is set anew through the link in the mail', async ({ openBrowser, complaints }) => {
  const { email } = PEOPLE.resetter
  const page = await openBrowser({ baseURL })
  await page.goto('/sign-in')
  await page.getByRole('link', { name: 'Set a new password by mail' }).click()
  const forgotten = form(page, 'New password')
  await forgotten.getByRole('button', { name: 'Send me a link' }).click()
  await expect(forgotten.getByRole('alert').filter({ hasText: 'Write the e-mail address.' })).toBeVisible()
  await field(forgotten, 'E-mail address').fill(email)
  await forgotten.getByRole('button', { name: 'Send me a link' }).click()
  await expect(page.getByText('the mail is on its way')).toBeVisible()

  const mail = await waitForMail(email, /choose a new password/)
  expect(mail.text).not.toContain(PASSWORD)
  await page.goto(linkOf(mail))
  const reset = form(page, 'Set a new password')
  const password = reset.getByLabel('New password', { exact: true })
  await reset.getByRole('button', { name: 'Set password' }).click()
  await expect(password).toHaveAccessibleDescription(/at least 12 characters/)
  await password.fill('a brand new sentence')
  await reset.getByRole('button', { name: 'Set password' }).dblclick()
  await expect(page.getByText('Your new password is set. Sign in with it.')).toBeVisible()

  complaints.expect(REFUSED_422)
  const signIn = form(page, 'Sign in')
  await field(signIn, 'E-mail address').fill(email)
  await signIn.getByLabel('Password', { exact: true }).fill(PASSWORD)
  await signIn.getByRole('button', { name: 'Sign in' }).click()
  await expect(signIn.getByRole('alert').filter({ hasText: /password/i })).toBeVisible()
  await signIn.getByLabel('Password', { exact: true }).fill('a brand new sentence')
  await signIn.getByRole('button', { name: 'Sign in' }).click()
  await expect(page).toHaveURL(/\/today$/)

  // The link works once.
  complaints.expect(/status of 40[09]/)
  const again = await openBrowser({ baseURL })
  await again.goto(linkOf(mail))
  const second = form(again, 'Set a new password')
  await second.getByLabel('New password', { exact: true }).fill('yet another long sentence')
  await second.getByRole('button', { name: 'Set password' }).click()
  await expect(second.getByRole('link', { name: 'Ask for a new link' })).toBeVisible()
})

test('the morning list comes by mail when its time has come, names beds only, and its link opens Today after signing in', async ({
  openAs,
  openBrowser,
  ward,
}) => {
  test.setTimeout(180_000)
  const lead = await openAs('lead')
  await lead.goto(`/units/${ward.unitId}/mail`)
  const schedule = form(lead, 'When mail goes out')
  const morning = schedule.getByRole('checkbox', { name: 'Morning list of patients due' })
  if (!(await morning.isChecked())) await morning.check()
  await field(schedule, 'Morning list at').fill('25:00')
  await schedule.getByRole('button', { name: 'Save' }).click()
  await expect(field(schedule, 'Morning list at')).toHaveAccessibleDescription(/24-hour clock/)
  await field(schedule, 'Morning list at').fill(clockAgo(1, ward.zone).time)
  await schedule.getByRole('button', { name: 'Save' }).dblclick()
  await expect(schedule.getByRole('status').filter({ hasText: 'Saved.' })).toBeVisible()

  const mail = await waitForMail(PEOPLE.rt.email, /screens? due/, 100_000)
  const unscreened = ward.patients.lone
  expect(mail.text).toContain(unscreened.bed)
  for (const { familyName, recordNumber } of Object.values(ward.patients)) {
    for (const words of [familyName, recordNumber]) expect(`${mail.subject} ${mail.text} ${mail.html}`).not.toContain(words)
  }
  await lead.reload()
  await expect(lead.getByRole('listitem').filter({ hasText: 'Morning list' }).filter({ hasText: PEOPLE.rt.name })).toHaveCount(1)

  const page = await openBrowser({ baseURL })
  await page.goto(linkOf(mail))
  await expect(page).toHaveURL(/\/sign-in\?next=/)
  const signIn = form(page, 'Sign in')
  await field(signIn, 'E-mail address').fill(PEOPLE.rt.email)
  await signIn.getByLabel('Password', { exact: true }).fill(PASSWORD)
  await signIn.getByRole('button', { name: 'Sign in' }).click()
  await expect(page).toHaveURL(new RegExp(`/units/${ward.unitId}/today$`))
  await expect(moveLink(page, 'RT · screen', unscreened.bed)).toBeVisible()
  expect(await countMail(PEOPLE.rt.email, /screens? due/)).toBe(1)
})
