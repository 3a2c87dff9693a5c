import { render, screen, within } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { PathnameContext, PathParamsContext } from 'next/dist/shared/lib/hooks-client-context.shared-runtime'
import { AppRouterContext } from 'next/dist/shared/lib/app-router-context.shared-runtime'
import type { ReactNode } from 'react'
import { expect, test, vi } from 'vitest'
import { AppShell } from '@/components/shell/app-shell'
import { CurrentUnit } from '@/components/shell/current-unit'
import type { MeDto } from '@/lib/schemas/session'

const NOW = Date.parse('2026-12-01T08:52:00Z')
const MEDICAL = { unitId: 'micu', unitName: 'Medical ICU', timeZone: 'America/Denver' }
const SURGICAL = { unitId: 'sicu', unitName: 'Surgical ICU', timeZone: 'UTC' }
const ME: MeDto = {
  name: 'J. Whitlock',
  email: 'j@invented.example',
  hospitalName: 'Kestrel Ridge',
  isDemo: true,
  isAdministrator: false,
  memberships: [{ ...MEDICAL, role: 'rt' }],
  isLocked: false,
  idleLockMin: 15,
}

function open(me: MeDto, path: string, params: Record<string, string>, content: ReactNode = 'page') {
  const push = vi.fn()
  const router = { push, replace: vi.fn(), refresh: vi.fn(), prefetch: vi.fn(), back: vi.fn(), forward: vi.fn() }
  render(
    <AppRouterContext.Provider value={router as never}>
      <PathnameContext.Provider value={path}>
        <PathParamsContext.Provider value={params}>
          <AppShell me={me} rememberedUnitId={null} theme="day" serverNowMs={NOW}>
            {content}
          </AppShell>
        </PathParamsContext.Provider>
      </PathnameContext.Provider>
    </AppRouterContext.Provider>,
  )
  return { push }
}
const links = () =>
  within(screen.getByRole('navigation', { name: 'Main' }))
    .getAllByRole('link')
    .map((link) => link.textContent)

test('leads to the pages of the unit and marks the one that is open', () => {
  open(ME, '/units/micu/today', { unitId: 'micu' })
  expect(links()).toEqual(['Today', 'Patients', 'Review', 'Protocol', 'Mail'])
  expect(screen.getByRole('link', { current: 'page' }).textContent).toBe('Today')
  expect(screen.getByRole('link', { name: 'Mail' }).getAttribute('href')).toBe('/units/micu/mail')
})

test('shows the unit’s own time, whatever the device’s zone', () => {
  open(ME, '/units/micu/today', { unitId: 'micu' })
  expect(screen.getByRole('banner').textContent).toContain('Tue 1 Dec, 01:52')
})

test('says at all times that the data of a demo hospital are invented', () => {
  open(ME, '/units/micu/today', { unitId: 'micu' })
  expect(within(screen.getByRole('banner')).getByText('Invented data')).toBeTruthy()
})

test('says nothing of invention in real use', () => {
  open({ ...ME, isDemo: false }, '/units/micu/today', { unitId: 'micu' })
  expect(screen.queryByText('Invented data')).toBeNull()
})

test('shows an administrator without a unit only the administration', () => {
  open({ ...ME, isAdministrator: true, memberships: [] }, '/admin/people', {})
  expect(links()).toEqual(['People', 'Units', 'Hospital'])
})

test('shows the record openings to the unit lead alone', () => {
  open({ ...ME, memberships: [{ ...MEDICAL, role: 'unit_lead' }] }, '/units/micu/today', { unitId: 'micu' })
  expect(links()).toContain('Openings')
})

test('lets a member of two units change to the same page of the other', async () => {
  const { push } = open(
    {
      ...ME,
      memberships: [
        { ...MEDICAL, role: 'rt' },
        { ...SURGICAL, role: 'rt' },
      ],
    },
    '/units/micu/review',
    { unitId: 'micu' },
  )
  await userEvent.selectOptions(screen.getByRole('combobox', { name: 'Unit' }), 'Surgical ICU')
  expect(push).toHaveBeenCalledWith('/units/sicu/review')
})

test('takes the unit from a page whose address names none', () => {
  open(
    {
      ...ME,
      memberships: [
        { ...MEDICAL, role: 'rt' },
        { ...SURGICAL, role: 'rt' },
      ],
    },
    '/patients/p1',
    { patientId: 'p1' },
    <CurrentUnit unitId="sicu" />,
  )
  expect(screen.getByRole('combobox', { name: 'Unit' })).toHaveProperty('value', 'sicu')
  expect(screen.getByRole('link', { name: 'Today' }).getAttribute('href')).toBe('/units/sicu/today')
})

test('states the cautions once', () => {
  open(ME, '/units/micu/today', { unitId: 'micu' })
  expect(screen.getAllByText(/Decision support for licensed clinicians/)).toHaveLength(1)
})

test('tells who is signed in with which roles, and gives focus back on Escape', async () => {
  open(ME, '/units/micu/today', { unitId: 'micu' })
  const opener = screen.getByRole('button', { name: 'J. Whitlock' })
  await userEvent.click(opener)
  expect(opener.getAttribute('aria-expanded')).toBe('true')
  expect(screen.getByText('RT, Medical ICU')).toBeTruthy()
  await userEvent.tab()
  await userEvent.keyboard('{Escape}')
  expect(opener.getAttribute('aria-expanded')).toBe('false')
  expect(document.activeElement).toBe(opener)
})
