import { expect, test } from './support/test'

test('the whole screen form works from the keyboard alone', async ({ openAs, ward }) => {
  const { patientId, episodeId } = ward.patients.keyboard
  const page = await openAs('rt')
  await page.goto(`/episodes/${episodeId}/screen`)
  const { keyboard } = page
  const focused = page.locator(':focus')
  /** Presses Tab until focus stands at this, as somebody without a mouse does. */
  const tabTo = async (name: string | RegExp, role: 'textbox' | 'radio' | 'button', limit = 60) => {
    const target = page.getByRole(role, { name, exact: typeof name === 'string' })
    for (let step = 0; step < limit; step += 1) {
      await keyboard.press('Tab')
      if (await target.evaluateAll((all) => all.includes(document.activeElement as never))) return
    }
    throw new Error(`Tab never reached ${role} ${name}.`)
  }

  await keyboard.press('Tab')
  await expect(focused).toHaveText('Skip to the page')
  await keyboard.press('Enter')
  await tabTo('FiO2', 'textbox')
  await expect(focused).toHaveCSS('outline-style', /.*/)
  await keyboard.press('ControlOrMeta+A')
  await keyboard.type('0.35')
  // Enter in a field leads on to the next one.
  await keyboard.press('Enter')
  await expect(page.getByRole('textbox', { name: 'PEEP', exact: true })).toBeFocused()
  await keyboard.press('ControlOrMeta+A')
  await keyboard.type('5')
  await keyboard.press('Enter')
  await keyboard.type('0.02')
  await expect(page.getByRole('textbox', { name: 'Norepinephrine dose, 0 when none runs' })).toHaveValue('0.02')

  for (const group of ['Other vasopressor', 'Active ischaemia in 24 h']) {
    const radios = page.getByRole('radiogroup', { name: group, exact: true })
    for (let step = 0; step < 10; step += 1) {
      await keyboard.press('Tab')
      if (await radios.evaluate((element) => element.contains(document.activeElement))) break
    }
    const no = radios.getByRole('radio', { name: 'no', exact: true })
    for (let step = 0; step < 3 && !(await no.isChecked()); step += 1) await keyboard.press('ArrowDown')
    await expect(no).toBeChecked()
  }

  await tabTo('Respiratory rate, spontaneous', 'textbox')
  await keyboard.type('24')
  await tabTo('Tidal volume, spontaneous', 'textbox')
  await keyboard.type('300')
  const measured = page.getByRole('radiogroup', { name: 'Measured', exact: true })
  await keyboard.press('Tab')
  await expect.poll(() => measured.evaluate((element) => element.contains(document.activeElement))).toBe(true)
  const unsupported = measured.getByRole('radio', { name: 'one minute without support' })
  for (let step = 0; step < 3 && !(await unsupported.isChecked()); step += 1) await keyboard.press('ArrowDown')
  await expect(unsupported).toBeChecked()
  await expect(page.getByRole('group', { name: 'RSBI' })).toContainText('80')
  await expect(page.getByRole('status', { name: 'Verdict as typed so far' })).toContainText('Ready')

  await tabTo('Record screen', 'button')
  await keyboard.press('Enter')
  await expect(page).toHaveURL(new RegExp(`/patients/${patientId}$`))
  await expect(page.getByText('Screen: ready').first()).toBeVisible()
})
