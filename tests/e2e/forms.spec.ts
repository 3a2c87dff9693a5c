import type { Request } from '@playwright/test'
import { clockAgo, expectMarked, expectRefused, field, form, observedAgo, untilLive } from './support/forms'
import { expectAccessible } from './support/look'
import { CLINICAL_FORMS, OTHER_FORMS, type FormCase } from './support/form-cases'
import { expect, NOT_FOUND_404, REFUSED_403, REFUSED_409, REFUSED_422, test } from './support/test'

const isWrite = (request: Request) => request.method() === 'POST' && !/\/api\/(me|session)/.test(request.url())

function tryForm(each: FormCase): void {
  test(`${each.what}: empty, wrong, late and twice is refused, kept and recorded once; another role may not`, async ({
    openAs,
    apiOf,
    ward,
    rows,
    complaints,
  }) => {
    complaints.expect(REFUSED_422, REFUSED_409, REFUSED_403, NOT_FOUND_404)
    const path = each.path(ward)
    const count = () => rows<{ n: number }>(each.count.sql, ...each.count.values(ward))[0]?.n ?? 0
    const before = count()

    const other = await openAs(each.wrongRole.who)
    await other.goto(path)
    await expect(other.getByRole('main')).toContainText(each.wrongRole.seen)
    await expect(other.getByRole('button', { name: each.submit, exact: true })).toHaveCount(0)
    await other.close()

    const page = await openAs(each.who)
    const sent: Request[] = []
    page.on('request', (request) => {
      if (isWrite(request)) sent.push(request)
    })
    await page.goto(path)
    await each.open?.(page)
    const target = form(page, each.form)
    const submit = target.getByRole('button', { name: each.submit, exact: true })

    if (each.empty !== undefined) {
      await each.clear?.(target)
      await submit.click()
      const carried = target.getByRole('button', { name: 'Record them as not assessed' })
      if (await carried.isVisible()) await carried.click()
      await expectRefused(target, each.empty)
      await expect
        .poll(() => target.evaluate((element) => element.contains(document.activeElement) && document.activeElement !== element))
        .toBe(true)
      await expectAccessible(page, `${each.what} with refusals`)
    }
    const wrong = each.wrong ?? []
    for (const { label, typed } of wrong) await field(target, label).fill(typed)
    if (wrong.length > 0) await submit.click()
    for (const { label, typed, words } of wrong) {
      await expectMarked(field(target, label), words)
      await expect(field(target, label)).toHaveValue(typed)
    }
    expect(count(), 'nothing is recorded so far').toBe(before)

    await each.fillRight(target, ward)
    if (each.late) await observedAgo(target, each.late.legend, each.late.minutes, ward.zone)
    await submit.dblclick()
    await expect.poll(count).toBe(before + 1)
    await expect(submit)
      .toHaveCount(0)
      .catch(() => undefined)

    const recorded = sent.at(-1)
    if (!recorded) throw new Error('The form sent nothing.')
    const again = {
      data: recorded.postDataJSON() as object,
      headers: { 'idempotency-key': recorded.headers()['idempotency-key'] ?? '' },
    }
    const url = new URL(recorded.url()).pathname
    const repeated = await (await apiOf(each.who)).post(url, again)
    expect(repeated.status(), 'the same request once more').toBe(200)
    const refused = await (await apiOf(each.wrongRole.who)).post(url, { data: again.data })
    expect(refused.status(), `sent by ${each.wrongRole.who}`).toBe(403)
    const stranger = await (await apiOf('outsider')).post(url, { data: again.data })
    if (!each.mayStranger) expect([403, 404], 'sent by somebody of another unit').toContain(stranger.status())
    expect(count(), 'recorded once').toBe(before + 1)

    if (each.late) {
      await page.goto(`/patients/${each.late.patient(ward)}`)
      const entry = page.getByRole('listitem').filter({ hasText: each.late.entry }).filter({ hasText: 'late entry' })
      await expect(entry.first()).toBeVisible()
    }
  })
}

for (const each of CLINICAL_FORMS) tryForm(each)
for (const each of OTHER_FORMS) tryForm(each)

test('a time in the future, before ventilation began, or unreadable is refused at its field, and nothing else is lost', async ({
  openAs,
  ward,
  complaints,
  rows,
}) => {
  complaints.expect(REFUSED_422)
  const { episodeId } = ward.patients.lone
  const count = () => rows<{ n: number }>('select count(*) as n from settings where episode_id = ?', episodeId)[0]?.n
  const before = count()
  const page = await openAs('rt')
  await page.goto(`/episodes/${episodeId}/settings`)
  await untilLive(page)
  const target = form(page, 'Ventilator settings')
  await target.getByRole('combobox', { name: 'Mode' }).selectOption('PC-CSV')
  await field(target, 'FiO2').fill('0.40')
  await field(target, 'PEEP').fill('6')
  const time = target.getByRole('textbox', { name: 'Time, 24-hour clock' })
  const submit = target.getByRole('button', { name: 'Record', exact: true })

  await observedAgo(target, 'Observed at', -30, ward.zone)
  await submit.click()
  await expectMarked(time, /future|not yet/i)
  await observedAgo(target, 'Observed at', 40 * 60, ward.zone)
  await submit.click()
  await expectMarked(time, /ventilation began|before/i)
  await time.fill('7 o’clock')
  await submit.click()
  await expectMarked(time, /24-hour clock/)
  await expect(field(target, 'FiO2')).toHaveValue('0.40')
  expect(count()).toBe(before)

  // Possible but unusual: kept after a second look, and marked.
  await observedAgo(target, 'Observed at', 2, ward.zone)
  await field(target, 'PEEP').fill('24')
  await submit.click()
  await expectMarked(field(target, 'PEEP'), /24 cmH2O is unusual/)
  await target.getByRole('checkbox', { name: /24.* is unusual: looked again, it is right/ }).check()
  await submit.click()
  await expect(page.getByText(/unusual, kept after a second look: PEEP/i).first()).toBeVisible()
  expect(count()).toBe((before ?? 0) + 1)
})

test('two people at the same step: the second is shown the first one’s entry and nothing is lost', async ({
  openAs,
  apiOf,
  ward,
  complaints,
  rows,
}) => {
  complaints.expect(REFUSED_409)
  const { episodeId } = ward.patients.idle
  const page = await openAs('rt')
  await page.goto(`/episodes/${episodeId}/screen`)
  const target = form(page, 'Daily screen')
  await target.getByRole('button', { name: 'Excuse from the screen today' }).click()
  await target.getByRole('radio', { name: 'Planned procedure' }).check()

  const first = await (
    await apiOf('physician')
  ).post(`/api/episodes/${episodeId}/screens`, {
    data: {
      observed: clockAgo(5, ward.zone),
      seenLatestId: null,
      excuse: 'prone',
      note: null,
      readings: null,
    },
  })
  expect(first.status()).toBe(200)
  await expect(page.getByRole('status').filter({ hasText: 'Another screen was just recorded' })).toContainText('Parrish Fenn', {
    timeout: 5_000,
  })
  await target.getByRole('button', { name: 'Record as excused today' }).click()
  const dialog = page.getByRole('dialog', { name: 'Screen not recorded yet' })
  await expect(dialog).toContainText('Parrish Fenn')
  await dialog.getByRole('button', { name: 'Record mine as well' }).click()
  await expect(page).toHaveURL(new RegExp(`/patients/${ward.patients.idle.patientId}$`))
  expect(rows<{ n: number }>('select count(*) as n from screens where episode_id = ?', episodeId)[0]?.n).toBe(2)
})
