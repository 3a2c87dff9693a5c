'use client'

import { useEffect } from 'react'
import { setPageUnit } from './shell-unit'

/** Stands on a page whose address names no unit (patient, episode), so that the frame shows the right one. Draws nothing. */
export function CurrentUnit({ unitId }: { unitId: string }) {
  useEffect(() => {
    setPageUnit(unitId)
    return () => setPageUnit(null)
  }, [unitId])
  return null
}
