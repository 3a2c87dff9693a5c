'use client'

import { usePathname, useRouter } from 'next/navigation'
import { useShellUnit, type ShellUnit } from './shell-unit'

/** For members of several units: the same page of another unit. */
export function UnitSwitch({ units, fallbackUnitId }: { units: readonly ShellUnit[]; fallbackUnitId: string | null }) {
  const router = useRouter()
  const path = usePathname()
  const unit = useShellUnit(units, fallbackUnitId)
  if (units.length < 2 || !unit) return null
  return (
    <select
      aria-label="Unit"
      value={unit.id}
      className="min-h-[44px] max-w-full rounded-control border border-muted/80 bg-field px-3 font-semibold"
      onChange={(event) => {
        const page = /^\/units\/[^/]+\/(today|patients|review|protocol|mail)/.exec(path)?.[1] ?? 'today'
        router.push(`/units/${event.target.value}/${page}`)
      }}
    >
      {units.map((each) => (
        <option key={each.id} value={each.id}>
          {each.name}
        </option>
      ))}
    </select>
  )
}
