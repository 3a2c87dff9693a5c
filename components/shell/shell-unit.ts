'use client'

import { useParams } from 'next/navigation'
import { useSyncExternalStore } from 'react'
import type { ClinicalRole } from '@/lib/weaning/vocabulary'

/** A unit of the signed-in person, as the frame of the pages needs it. */
export type ShellUnit = { id: string; name: string; timeZone: string; roles: ClinicalRole[] }

let pageUnitId: string | null = null
const listeners = new Set<() => void>()

/** Tells the frame which unit the page is about, where the address does not; null when the page is left. */
export function setPageUnit(unitId: string | null): void {
  pageUnitId = unitId
  for (const listener of listeners) listener()
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener)
  return () => listeners.delete(listener)
}

/** The unit that the page is about: named by the address, else told by the page, else the one last looked at. */
export function useShellUnit(units: readonly ShellUnit[], fallbackUnitId: string | null): ShellUnit | null {
  const { unitId } = useParams<{ unitId?: string }>()
  const told = useSyncExternalStore(
    subscribe,
    () => pageUnitId,
    () => null,
  )
  return units.find((unit) => unit.id === (unitId ?? told)) ?? units.find((unit) => unit.id === fallbackUnitId) ?? null
}
