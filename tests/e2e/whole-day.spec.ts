import type { Page } from '@playwright/test'
import { choose, field, fill, form, moveLink, observedAgo } from './support/forms'
import { PASSWORD } from './support/places'
import { expect, test } from './support/test'

/** A colleague's entry is to be seen within this time. */
const SOON = { timeout: 5_000 }

async function currentMonthOf(page: Page, measure: string, column: string): Promise<number> {
  const section = page.getByRole('region', { name: measure, exact: true }).first()
  await section.getByText('Table', { exact: true }).click()
  const table = section.getByRole('table')
  const headings = await table.getByRole('columnheader').allInnerTexts()
  const row = table.getByRole('row').filter({ hasText: 'so far' })
  const cells = await row.locator('th, td').allInnerTexts()
  return Number(cells[headings.findIndex((heading) => heading.trim() === column)])
}

test('four people carry one patient through the day, and each sees the others’ entries within five seconds', async ({
  openAs,
  ward,
}) => {
  test.setTimeout(180_000)
  const { patientId, episodeId, bed, familyName } = ward.patients.day
  const today = `/units/${ward.unitId}/today`
  const rt = await openAs('rt')
  const nurse = await openAs('nurse')
  const physician = await openAs('physician')
  const lead = await openAs('lead')

  await lead.goto(`/units/${ward.unitId}/review`)
  const before = {
    planned: await currentMonthOf(lead, 'Extubations', 'Planned'),
    passed: await currentMonthOf(lead, 'Breathing trials passed', 'Passed'),
  }

  const rowOn = (page: Page) =>
    page.getByRole('listitem').filter({ has: page.getByRole('link', { name: new RegExp(`^${familyName},`) }) })
  for (const page of [rt, physician, lead]) await page.goto(today)
  await nurse.goto(`/episodes/${episodeId}/hold`)
  await expect(nurse.getByText('No screen recorded today')).toBeVisible()
  for (const page of [physician, lead]) await expect(rowOn(page)).toContainText('RT · screen')

  await test.step('the RT screens', async () => {
    await moveLink(rt, 'RT · screen', bed).click()
    const screen = form(rt, 'Daily screen')
    await fill(screen, { FiO2: '0.40', PEEP: '5' })
    await field(screen, 'Norepinephrine dose, 0 when none runs').fill('0')
    await choose(screen, 'Other vasopressor', 'no')
    await choose(screen, 'Active ischaemia in 24 h', 'no')
    await observedAgo(screen, 'Observed at', 100, ward.zone)
    await screen.getByRole('button', { name: 'Record screen' }).click()
    await expect(nurse.getByText(/^Screen \d\d:\d\d: ready, by Rowan Tidewell/)).toBeVisible(SOON)
    for (const page of [physician, lead]) await expect(rowOn(page)).toContainText('Nurse · start sedation hold', SOON)
    await expect(rt).toHaveURL(new RegExp(`/patients/${patientId}$`))
  })

  await rt.goto(`/episodes/${episodeId}/trial`)
  await expect(rt.getByText('Sedation hold: not recorded today')).toBeVisible()
  await test.step('the nurse holds sedation', async () => {
    const start = form(nurse, 'Sedation hold')
    await choose(start, 'Sedation', 'Continuous sedation is running')
    const safety = start.getByRole('group', { name: /^Safety screen/ }).getByRole('radiogroup')
    for (const item of await safety.all()) await item.getByRole('radio', { name: 'no', exact: true }).check()
    await start.getByRole('button', { name: 'Add an infusion' }).click()
    const infusion = start.getByRole('group', { name: 'Infusion 1' })
    await fill(infusion, { Drug: 'propofol', Rate: '30' })
    await infusion.getByRole('combobox', { name: 'Unit' }).selectOption('mL/h')
    await choose(infusion, 'Given', /for sedation/)
    await observedAgo(start, 'Hold starts at', 95, ward.zone)
    await start.getByRole('button', { name: 'Start the hold' }).click()
    await expect(rt.getByText(/Sedation hold \d\d:\d\d: started, Noor Nightgale/)).toBeVisible(SOON)
    for (const page of [physician, lead]) await expect(rowOn(page)).toContainText('Nurse · observe sedation hold', SOON)

    const look = form(nurse, 'Observation during the hold')
    await choose(look, 'Opens eyes to voice', 'yes')
    await choose(look, 'RASS', '0')
    await observedAgo(look, 'Observed at', 70, ward.zone)
    await look.getByRole('button', { name: 'Record observation' }).click()
    for (const page of [physician, lead]) await expect(rowOn(page)).toContainText('eyes open to voice', SOON)

    await nurse.getByRole('button', { name: 'Tolerated', exact: true }).click()
    const end = form(nurse, 'End of the hold')
    await observedAgo(end, 'Ended at', 65, ward.zone)
    await end.getByRole('button', { name: 'Record the end' }).click()
    await expect(rt.getByText(/Sedation hold \d\d:\d\d: tolerated, Noor Nightgale/)).toBeVisible(SOON)
    for (const page of [physician, lead]) await expect(rowOn(page)).toContainText('RT · start trial', SOON)
  })

  await test.step('the RT runs the trial, the nurse adds an observation', async () => {
    const start = form(rt, 'Start of the breathing trial')
    await choose(start, 'Technique', 'T-piece')
    await fill(start, { FiO2: '0.40', 'Respiratory rate': '20', 'Tidal volume': '400', SpO2: '96', 'Heart rate': '88' })
    await observedAgo(start, 'Trial starts at', 50, ward.zone)
    await start.getByRole('button', { name: 'Start the trial' }).click()
    for (const page of [physician, lead]) await expect(rowOn(page)).toContainText('RT · record outcome of trial', SOON)

    await physician.goto(`/episodes/${episodeId}/decision`)
    await nurse.goto(`/episodes/${episodeId}/trial`)
    const look = form(nurse, 'Observation during the trial')
    await fill(look, { 'Respiratory rate': '22', 'Tidal volume': '380', SpO2: '95', 'Heart rate': '92' })
    await observedAgo(look, 'Observed at', 35, ward.zone)
    await look.getByRole('button', { name: 'Record observation' }).click()
    await expect(rt.getByRole('table', { name: 'Observations of this trial' })).toContainText('380', SOON)

    await rt.getByRole('button', { name: 'Passed', exact: true }).click()
    const end = form(rt, 'End of the trial')
    await observedAgo(end, 'Ended at', 10, ward.zone)
    await end.getByRole('button', { name: 'Record the end' }).click()
    await expect(rowOn(lead)).toContainText('Physician · decide', SOON)
    await expect(physician.getByRole('alert').filter({ hasText: 'The record changed while this page was open' })).toBeVisible(
      SOON,
    )
    await expect(nurse.getByRole('form', { name: 'Observation during the trial' })).toHaveCount(0, SOON)
  })

  await nurse.goto(today)
  await test.step('the physician signs', async () => {
    await physician.getByRole('button', { name: 'Show the record as it stands now' }).click()
    const decision = form(physician, 'Decision')
    await choose(decision, 'What do you decide?', 'Extubate')
    await choose(decision, 'Support planned after extubation', 'Oxygen')
    await decision.getByLabel('Your password, to sign', { exact: true }).fill(PASSWORD)
    await decision.getByRole('button', { name: 'Sign the decision' }).click()
    await expect(physician.getByRole('region', { name: 'Signed today' })).toContainText('I have decided to extubate this patient')
    for (const page of [nurse, lead]) await expect(rowOn(page)).toContainText(/· extubate/, SOON)
  })

  await test.step('the RT extubates', async () => {
    await rt.goto(`/patients/${patientId}`)
    await expect(rt.getByRole('region', { name: 'Next move' })).toContainText('extubate')
    await rt.getByRole('link', { name: 'End ventilation' }).click()
    const end = form(rt, 'End ventilation')
    await choose(end, 'How it ended', 'Extubated as planned')
    await choose(end, 'Support afterwards', 'Oxygen')
    await end.getByRole('button', { name: 'Record the end of ventilation' }).click()
    for (const page of [nurse, lead]) await expect(rowOn(page)).toContainText('Ventilation ended', SOON)
    await expect(physician.getByText('There is nothing left to decide.')).toBeVisible(SOON)
  })

  await lead.goto(`/units/${ward.unitId}/review`)
  expect(await currentMonthOf(lead, 'Extubations', 'Planned')).toBe(before.planned + 1)
  expect(await currentMonthOf(lead, 'Breathing trials passed', 'Passed')).toBe(before.passed + 1)
})
