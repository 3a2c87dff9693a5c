import { readFileSync } from 'node:fs'
import { choose, clockAgo, field, fill, form, moveLink, observedAgo } from './support/forms'
import { PASSWORD } from './support/places'
import { expect, REFUSED_422, test } from './support/test'

const SAFETY = [
  'Sedation for active seizures',
  'Sedation for alcohol withdrawal',
  'Dose rising for agitation',
  'Neuromuscular blocker running',
  'Active myocardial ischaemia in 24 h',
  'Raised intracranial pressure',
]

test('a respiratory therapist screens a patient in the morning and runs a breathing trial', async ({ openAs, apiOf, ward }) => {
  const { patientId, episodeId, bed } = ward.patients.rt
  const page = await openAs('rt')
  await page.goto('/')
  await expect(page).toHaveURL(new RegExp(`/units/${ward.unitId}/today$`))
  await moveLink(page, 'RT · screen', bed).click()

  const screen = form(page, 'Daily screen')
  await fill(screen, { FiO2: '0.40', PEEP: '5' })
  await expect(screen.getByRole('status', { name: 'Verdict as typed so far' })).toContainText('Incomplete')
  await field(screen.getByRole('group', { name: 'Norepinephrine' }), 'Norepinephrine dose, 0 when none runs').fill('0')
  await choose(screen, 'Other vasopressor', 'no')
  await choose(screen, 'Active ischaemia in 24 h', 'no')
  await fill(screen, { 'Respiratory rate, spontaneous': '20', 'Tidal volume, spontaneous': '400' })
  await choose(screen, 'Measured', 'one minute without support')
  await expect(screen.getByRole('group', { name: 'RSBI' })).toContainText('50')
  await expect(screen.getByRole('status', { name: 'Verdict as typed so far' })).toContainText('Ready')
  await observedAgo(screen, 'Observed at', 60, ward.zone)
  await screen.getByRole('button', { name: 'Record screen' }).click()
  await expect(page).toHaveURL(new RegExp(`/patients/${patientId}$`))
  await expect(page.getByText('Screen: ready').first()).toBeVisible()

  // The nurse's part, so that the day leads to a trial.
  const nurse = await apiOf('nurse')
  const answer = await nurse.post(`/api/episodes/${episodeId}/holds`, {
    data: { observed: clockAgo(55, ward.zone), seenLatestId: null, start: 'not_needed', safety: null, infusions: [], note: null },
  })
  expect(answer.status()).toBe(200)

  await page.goto(`/units/${ward.unitId}/today`)
  await moveLink(page, 'RT · start trial', bed).click()
  const start = form(page, 'Start of the breathing trial')
  await choose(start, 'Technique', 'Pressure support with PEEP')
  await fill(start, {
    'Pressure support': '8',
    PEEP: '5',
    FiO2: '0.40',
    'Respiratory rate': '20',
    'Tidal volume': '400',
    SpO2: '96',
    'Heart rate': '88',
  })
  await observedAgo(start, 'Trial starts at', 50, ward.zone)
  await start.getByRole('button', { name: 'Start the trial' }).click()

  const look = form(page, 'Observation during the trial')
  for (const [minutes, rate] of [
    [40, '38'],
    [34, '39'],
  ] as const) {
    await fill(look, { 'Respiratory rate': rate, SpO2: '93', 'Heart rate': '95' })
    await observedAgo(look, 'Observed at', minutes, ward.zone)
    await look.getByRole('button', { name: 'Record observation' }).click()
    await expect(page.getByRole('table', { name: 'Observations of this trial' })).toContainText(rate)
  }
  await expect(page.getByRole('alert').filter({ hasText: 'A stop rule is met' })).toContainText('35')

  await page.getByRole('button', { name: 'Failed', exact: true }).click()
  const end = form(page, 'End of the trial')
  await field(end, 'Returned to').fill('PC-CSV, pressure support 12')
  await observedAgo(end, 'Ended at', 30, ward.zone)
  await end.getByRole('button', { name: 'Record the end' }).click()
  await expect(page.getByRole('region', { name: 'What comes next' })).toContainText('trial failed')
})

test('a nurse holds sedation: safety screen, RASS as it wears off, outcome, restart rates', async ({ openAs, ward }) => {
  const { patientId, bed } = ward.patients.nurse
  const page = await openAs('nurse')
  await page.goto(`/units/${ward.unitId}/today`)
  await moveLink(page, 'Nurse · start sedation hold', bed).click()

  const start = form(page, 'Sedation hold')
  await choose(start, 'Sedation', 'Continuous sedation is running')
  for (const item of SAFETY) await choose(start, item, 'no')
  for (const [index, drug, rate, unit, purpose] of [
    [1, 'propofol', '30', 'mL/h', /for sedation/],
    [2, 'fentanyl', '50', 'µg/h', /for pain/],
  ] as const) {
    await start.getByRole('button', { name: 'Add an infusion' }).click()
    const infusion = start.getByRole('group', { name: `Infusion ${index}` })
    await fill(infusion, { Drug: drug, Rate: rate })
    await infusion.getByRole('combobox', { name: 'Unit' }).selectOption(unit)
    await choose(infusion, 'Given', purpose)
  }
  await observedAgo(start, 'Hold starts at', 40, ward.zone)
  await start.getByRole('button', { name: 'Start the hold' }).click()

  const look = form(page, 'Observation during the hold')
  await choose(look, 'Opens eyes to voice', 'yes')
  await choose(look, 'RASS', '−1')
  await fill(look, { 'Respiratory rate': '24', SpO2: '95' })
  await observedAgo(look, 'Observed at', 20, ward.zone)
  await look.getByRole('button', { name: 'Record observation' }).click()
  await expect(page.getByRole('table', { name: 'Observations of this hold' })).toContainText('−1')

  await page.getByRole('button', { name: 'Not tolerated', exact: true }).click()
  const end = form(page, 'End of the hold')
  await end.getByRole('group', { name: 'What else ended it' }).getByRole('checkbox').first().check()
  await expect(end.getByRole('listitem').filter({ hasText: 'propofol' }).first()).toContainText('15')
  await end.getByRole('button', { name: 'Record the end' }).click()
  await expect(page).toHaveURL(new RegExp(`/patients/${patientId}$`))
  await expect(page.getByText('Hold ended: not tolerated').first()).toBeVisible()
  await expect(page.getByText(/Propofol 30 mL\/h before, computed restart rate 15 mL\/h/)).toBeVisible()
  await expect(page.getByText(/fentanyl .* restart/i)).toHaveCount(0)
})

test('a physician documents and signs the decision', async ({ openAs, ward, complaints }) => {
  complaints.expect(REFUSED_422)
  const { bed, patientId } = ward.patients.physician
  const page = await openAs('physician')
  await page.goto(`/units/${ward.unitId}/today`)
  await moveLink(page, 'Physician · decide', bed).click()
  await expect(page.getByRole('heading', { name: 'Decision', level: 1 })).toBeVisible()
  await expect(page.getByRole('main')).toContainText('50') // RSBI of the trial: 20 / 0.400 L

  const decision = form(page, 'Decision')
  for (const option of await decision.getByRole('radiogroup', { name: 'What do you decide?' }).getByRole('radio').all()) {
    await expect(option).not.toBeChecked()
  }
  await choose(decision, 'What do you decide?', 'Extubate')
  await choose(decision, 'Support planned after extubation', 'High flow')
  await choose(decision, 'Steroids before extubation planned', 'no')
  await field(decision, 'Note').fill('Family told.')
  await expect(decision.getByRole('region', { name: 'What you sign' })).toContainText(
    'I have decided to extubate this patient, with high flow planned afterwards',
  )

  await decision.getByLabel('Your password, to sign', { exact: true }).fill('not the right sentence')
  await decision.getByRole('button', { name: 'Sign the decision' }).click()
  await expect(decision.getByRole('alert').filter({ hasText: /password/i })).toBeVisible()
  await expect(field(decision, 'Note')).toHaveValue('Family told.')

  await decision.getByLabel('Your password, to sign', { exact: true }).fill(PASSWORD)
  await decision.getByRole('button', { name: 'Sign the decision' }).click()
  const signed = page.getByRole('region', { name: 'Signed today' })
  await expect(signed).toContainText('I have decided to extubate this patient')
  await expect(signed).toContainText('Parrish Fenn')
  await page.goto(`/patients/${patientId}`)
  await expect(page.getByText('Signed: extubate').first()).toBeVisible()
})

test('a unit lead reads the trend, takes it as a file, drafts the protocol for a physician to approve, and sets when mail goes', async ({
  openAs,
  ward,
}) => {
  const page = await openAs('lead')
  await page.goto(`/units/${ward.unitId}/review`)
  const days = page.getByRole('region', { name: 'Ventilator days', exact: true })
  await expect(days.getByRole('img', { name: /Chart of Ventilator days by month/ })).toBeVisible()
  await days.getByText('Table', { exact: true }).click()
  await expect(days.getByRole('table')).toBeVisible()
  const [download] = await Promise.all([
    page.waitForEvent('download'),
    days.getByRole('link', { name: 'CSV of Ventilator days' }).click(),
  ])
  expect(download.suggestedFilename()).toMatch(/\.csv$/)
  const lines = readFileSync(await download.path(), 'utf8')
    .trim()
    .split('\n')
  expect(lines.length).toBeGreaterThan(1)

  await page.goto(`/units/${ward.unitId}/protocol`)
  await page.getByRole('link', { name: /^(Draft a new version|Go on with the draft)$/ }).click()
  const draft = form(page, 'Draft of the protocol')
  await field(draft, 'Answer to a passed trial within').fill('45')
  await field(draft, 'What changes, and why').fill('Sooner answer, agreed in the unit meeting')
  await draft.getByRole('button', { name: 'Save the draft' }).click()
  await expect(page.getByRole('region', { name: /^Draft of version 2/ })).toContainText('Sooner answer')
  await expect(page.getByRole('form', { name: /^Approve version/ })).toHaveCount(0)

  const doctor = await openAs('physician')
  await doctor.goto(`/units/${ward.unitId}/protocol`)
  const approval = form(doctor, 'Approve version 2')
  await approval.getByRole('radio', { name: 'from the start of a later day' }).check()
  await approval.getByLabel('First day').fill(clockAgo(-24 * 60, ward.zone).day)
  await approval.getByRole('button', { name: 'Approve version 2' }).click()
  await expect(doctor.getByText(/^Version 2, from/)).toBeVisible()

  await page.goto(`/units/${ward.unitId}/mail`)
  const schedule = form(page, 'When mail goes out')
  await choose(schedule, 'Reminder when the screening window closes', 'off')
  await schedule.getByRole('button', { name: 'Save' }).click()
  await expect(schedule.getByRole('status').filter({ hasText: 'Saved.' })).toBeVisible()
  await page.reload()
  await expect(
    schedule.getByRole('radiogroup', { name: 'Reminder when the screening window closes' }).getByRole('radio', { name: 'off' }),
  ).toBeChecked()
})
