import type { ReactNode } from 'react'
import { IdleGuard } from '@/components/session/idle-guard'
import type { MeDto } from '@/lib/schemas/session'
import { ROLE_WORDS } from '@/lib/weaning/words'
import { AccountMenu } from './account-menu'
import { Brand } from './brand'
import { PlaceAndTime } from './place-and-time'
import { ShellNav } from './shell-nav'
import type { ShellUnit } from './shell-unit'
import { UnitSwitch } from './unit-switch'

type AppShellProps = {
  me: MeDto
  /** The unit last looked at, for pages whose address names none. */
  rememberedUnitId: string | null
  theme: 'day' | 'night' | 'device'
  serverNowMs: number
  children: ReactNode
}

/** The frame of every page behind sign-in: skip link, header, page, cautions. */
export function AppShell({ me, rememberedUnitId, theme, serverNowMs, children }: AppShellProps) {
  const units = unitsOf(me)
  const fallbackUnitId = units.find((unit) => unit.id === rememberedUnitId)?.id ?? units[0]?.id ?? null
  return (
    <div className="flex min-h-dvh flex-col">
      <a
        href="#main"
        className="sr-only z-50 rounded-control bg-ink px-5 py-3 font-semibold text-paper focus:not-sr-only focus:absolute focus:top-2 focus:left-2"
      >
        Skip to the page
      </a>
      <header className="no-print border-b border-line">
        <div className="mx-auto flex max-w-page flex-wrap items-center gap-x-7 px-4 tablet:px-8">
          <Brand />
          <ShellNav units={units} fallbackUnitId={fallbackUnitId} isAdministrator={me.isAdministrator} />
          <div className="order-3 flex w-full min-w-0 flex-wrap items-center gap-x-4 pb-2 desk:ml-auto desk:w-auto desk:pb-0">
            {me.isDemo ? <strong className="rounded-control border border-ink px-2 py-0.5 text-sm">Invented data</strong> : null}
            <UnitSwitch units={units} fallbackUnitId={fallbackUnitId} />
            <PlaceAndTime
              units={units}
              fallbackUnitId={fallbackUnitId}
              hospitalName={me.hospitalName}
              serverNowMs={serverNowMs}
            />
          </div>
          <div className="order-2 ml-auto desk:order-4 desk:ml-0">
            <AccountMenu name={me.name} roles={rolesOf(me)} theme={theme} />
          </div>
        </div>
      </header>
      <main id="main" tabIndex={-1} className="mx-auto w-full max-w-page flex-1 px-4 py-6 outline-none tablet:px-8">
        {children}
      </main>
      <footer className="border-t border-line">
        <p className="mx-auto max-w-page px-4 py-4 text-sm text-muted tablet:px-8">
          Decision support for licensed clinicians. Local protocol and orders come first. Adults only.
        </p>
      </footer>
      <IdleGuard name={me.name} email={me.email} idleLockMin={me.idleLockMin} />
    </div>
  )
}

function unitsOf(me: MeDto): ShellUnit[] {
  const units = new Map<string, ShellUnit>()
  for (const { unitId, unitName, timeZone, role } of me.memberships) {
    const unit = units.get(unitId) ?? { id: unitId, name: unitName, timeZone, roles: [] }
    units.set(unitId, { ...unit, roles: [...unit.roles, role] })
  }
  return [...units.values()]
}

function rolesOf(me: MeDto): string[] {
  const roles = unitsOf(me).map((unit) => `${unit.roles.map((role) => ROLE_WORDS[role]).join(', ')}, ${unit.name}`)
  return me.isAdministrator ? [...roles, 'Administrator'] : roles
}
