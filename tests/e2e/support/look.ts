import { AxeBuilder } from '@axe-core/playwright'
import { expect, type Page } from '@playwright/test'

/** axe finds nothing: no rule is switched off. */
export async function expectAccessible(page: Page, where: string): Promise<void> {
  const { violations } = await new AxeBuilder({ page }).setLegacyMode(true).analyze()
  const found = violations.flatMap(({ id, nodes }) =>
    nodes.map((node) => `${id}: ${node.target.join(' ')} ${node.failureSummary ?? ''}`),
  )
  expect.soft(found, `axe on ${where}`).toEqual([])
}

/** The page is no wider than the window, so nothing has to be scrolled sideways. */
export async function expectNoSidewaysScroll(page: Page, where: string): Promise<void> {
  const { width, windowWidth, widest } = await page.evaluate(() => {
    const root = document.scrollingElement ?? document.documentElement
    const tooWide = [...document.querySelectorAll('body *')].filter(
      (element) =>
        element.getBoundingClientRect().right > window.innerWidth + 1 &&
        !element.closest('[class*="overflow-x-auto"], .sr-only, dialog:not([open])'),
    )
    return {
      width: root.scrollWidth,
      windowWidth: window.innerWidth,
      widest: tooWide.slice(0, 3).map((element) => element.outerHTML.slice(0, 160)),
    }
  })
  expect.soft(width, `${where} is ${width} px wide at ${windowWidth}: ${widest.join(' | ')}`).toBeLessThanOrEqual(windowWidth)
}

/** Day or night colours, as the switch in the account menu sets them. */
export async function setColours(page: Page, colours: 'day' | 'night'): Promise<void> {
  await page.evaluate((chosen) => {
    document.documentElement.classList.toggle('dark', chosen === 'night')
    document.documentElement.setAttribute('data-theme', chosen)
  }, colours)
}
