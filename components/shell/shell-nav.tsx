'use client'

import Link from 'next/link'
import { usePathname } from 'next/navigation'
import { useEffect } from 'react'
import { writeCookie } from '@/lib/client/cookie'
import { cn } from '@/lib/shared/cn'
import { useShellUnit, type ShellUnit } from './shell-unit'

type Item = { href: string; label: string; isHere: boolean }

/** The pages of the unit, and those of the hospital's administration for administrators. */
export function ShellNav({
  units,
  fallbackUnitId,
  isAdministrator,
}: {
  units: readonly ShellUnit[]
  fallbackUnitId: string | null
  isAdministrator: boolean
}) {
  const path = usePathname()
  const unit = useShellUnit(units, fallbackUnitId)
  const unitId = unit?.id ?? null
  useEffect(() => {
    if (unitId !== null) writeCookie('daybreath-unit', unitId)
  }, [unitId])
  const items = [...(unit ? unitItems(unit, path) : []), ...(isAdministrator ? adminItems(path) : [])]
  return (
    <nav aria-label="Main" className="order-3 -mx-2 w-[calc(100%+1rem)] desk:order-1 desk:mx-0 desk:w-auto">
      <ul className="flex flex-wrap">
        {items.map((item) => (
          <li key={item.href}>
            <Link
              href={item.href}
              aria-current={item.isHere ? 'page' : undefined}
              className="group inline-flex min-h-[44px] min-w-[44px] items-center px-2 no-underline desk:px-2.5"
            >
              <span
                className={cn(
                  'border-b-[3px] py-1',
                  item.isHere ? 'border-dawn font-bold text-ink' : 'border-transparent text-muted group-hover:text-ink',
                )}
              >
                {item.label}
              </span>
            </Link>
          </li>
        ))}
      </ul>
    </nav>
  )
}

function unitItems(unit: ShellUnit, path: string): Item[] {
  const base = `/units/${unit.id}`
  const pages = [
    ['today', 'Today'],
    ['patients', 'Patients'],
    ['review', 'Review'],
    ['protocol', 'Protocol'],
    ['mail', 'Mail'],
  ] as const
  const items = pages.map(([page, label]) => {
    const href = `${base}/${page}`
    const isPatient = page === 'patients' && (path.startsWith('/patients/') || path.startsWith('/episodes/'))
    return { href, label, isHere: path === href || path.startsWith(`${href}/`) || isPatient }
  })
  if (!unit.roles.includes('unit_lead')) return items
  return [...items, { href: `${base}/openings`, label: 'Openings', isHere: path.startsWith(`${base}/openings`) }]
}

function adminItems(path: string): Item[] {
  const pages = [
    ['people', 'People'],
    ['units', 'Units'],
    ['hospital', 'Hospital'],
  ] as const
  return pages.map(([page, label]) => ({ href: `/admin/${page}`, label, isHere: path.startsWith(`/admin/${page}`) }))
}
