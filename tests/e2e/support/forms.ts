import { expect, type Locator, type Page } from '@playwright/test'
import { wallClock } from '@/lib/client/wall-clock'

type Scope = Page | Locator

/** The unit's clock some minutes ago, as the record keeps it. */
export const clockAgo = (minutes: number, zone: string) => wallClock(Date.now() - minutes * 60_000, zone)

export const form = (page: Page, name: string | RegExp) => page.getByRole('form', { name })

/** A number or a line of text, by its label. */
export const field = (scope: Scope, label: string) => scope.getByRole('textbox', { name: label, exact: true })

export async function fill(scope: Scope, values: Record<string, string>): Promise<void> {
  for (const [label, text] of Object.entries(values)) await field(scope, label).fill(text)
}

/** Chooses one of a group of choices. */
export async function choose(scope: Scope, group: string, option: string | RegExp): Promise<void> {
  const radios = scope.getByRole('radiogroup', { name: group, exact: true })
  await radios.getByRole('radio', typeof option === 'string' ? { name: option, exact: true } : { name: option }).check()
}

/** Sets when it was observed, by the unit's clock. */
export async function observedAgo(scope: Scope, legend: string, minutes: number, zone: string): Promise<void> {
  const { day, time } = clockAgo(minutes, zone)
  const group = scope.getByRole('group', { name: legend, exact: true })
  await group.getByRole('combobox', { name: 'Day' }).selectOption(day)
  await group.getByRole('textbox', { name: 'Time, 24-hour clock' }).fill(time)
}

/** The form was not recorded: it says so, focus is at something to mend, and its message stands there. */
export async function expectRefused(scope: Locator, words: string | RegExp): Promise<void> {
  await expect(scope.getByRole('alert').filter({ hasText: words })).toBeVisible()
}

/** A field that is marked as wrong, with these words at it. */
export async function expectMarked(control: Locator, words: string | RegExp): Promise<void> {
  await expect(control).toHaveAttribute('aria-invalid', 'true')
  await expect(control).toHaveAccessibleDescription(words)
}

/** The next move of a bed on Today, for those who may take it. */
export const moveLink = (page: Page, title: string, bed: string) =>
  page.getByRole('link', { name: new RegExp(`^${title} ?, bed ${bed}$`) })

/** Waits until the page's script has taken its form over; what is chosen before that is asked for again. */
export async function untilLive(page: Page): Promise<void> {
  await page.waitForFunction(() =>
    Object.keys(document.querySelector('main form') ?? {}).some((key) => key.startsWith('__react')),
  )
}
