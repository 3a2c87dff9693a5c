'use client'

import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { Dialog } from '@/components/ui/dialog'
import { PageHeading } from '@/components/ui/page-heading'
import { apiGet } from '@/lib/client/api'
import { adminKeys } from '@/lib/client/keys/admin'
import type { UnitAdminDto } from '@/lib/schemas/units'
import { AddBedsForm } from './add-beds-form'
import { BedsInUse } from './beds-in-use'
import { UnitForm } from './unit-form'

type Open = { kind: 'create' } | { kind: 'edit' | 'beds'; unitId: string } | null

/** The hospital's units: where they are, what their clocks show, and which beds they have. */
export function UnitList({ initial }: { initial: { units: UnitAdminDto[] } }) {
  const { data } = useQuery({
    queryKey: adminKeys.units(),
    queryFn: ({ signal }) => apiGet<{ units: UnitAdminDto[] }>('/api/admin/units', { signal }),
    initialData: initial,
  })
  const [open, setOpen] = useState<Open>(null)
  const [message, setMessage] = useState('')
  const chosen = open && 'unitId' in open ? (data.units.find((unit) => unit.id === open.unitId) ?? null) : null
  const finish = (text: string) => {
    setOpen(null)
    setMessage(text)
  }

  return (
    <>
      <PageHeading
        title="Units"
        below="Each unit has its own beds, clock and protocol. A new unit starts with the default protocol until one of its physicians approves another."
        aside={
          <Button variant="primary" onClick={() => setOpen({ kind: 'create' })}>
            Add a unit
          </Button>
        }
      />
      <p role="status" className="mb-4 font-semibold text-calm">
        {message}
      </p>
      {data.units.length === 0 ? (
        <p className="py-6 text-muted">No unit yet. Add the first one, then invite its people.</p>
      ) : null}
      <ul>
        {data.units.map((unit) => (
          <li key={unit.id} className="border-t border-line py-5">
            <UnitSummary unit={unit} />
            <div className="mt-3 flex flex-wrap gap-3">
              <Button aria-label={`Change ${unit.name}`} onClick={() => setOpen({ kind: 'edit', unitId: unit.id })}>
                Change
              </Button>
              <Button aria-label={`Beds of ${unit.name}`} onClick={() => setOpen({ kind: 'beds', unitId: unit.id })}>
                Beds
              </Button>
            </div>
          </li>
        ))}
      </ul>
      <Dialog isOpen={open?.kind === 'create'} title="Add a unit" onClose={() => setOpen(null)} closeLabel="Close without adding">
        <UnitForm unit={null} onDone={(unit) => finish(`${unit.name} is added.`)} />
      </Dialog>
      <Dialog
        isOpen={open?.kind === 'edit' && chosen !== null}
        title={`Change ${chosen?.name ?? ''}`}
        onClose={() => setOpen(null)}
        closeLabel="Close without changing"
      >
        {chosen ? <UnitForm key={chosen.version} unit={chosen} onDone={(unit) => finish(`${unit.name} is changed.`)} /> : null}
      </Dialog>
      <Dialog
        isOpen={open?.kind === 'beds' && chosen !== null}
        title={`Beds of ${chosen?.name ?? ''}`}
        onClose={() => setOpen(null)}
      >
        {chosen ? (
          <div className="flex flex-col gap-8">
            <AddBedsForm key={chosen.beds.length} unitId={chosen.id} />
            <BedsInUse unit={chosen} />
          </div>
        ) : null}
      </Dialog>
    </>
  )
}

function UnitSummary({ unit }: { unit: UnitAdminDto }) {
  const beds = unit.beds.filter((bed) => !bed.isRetired)
  const pressure = unit.barometricPressureMmHg === null ? '' : `, barometer ${unit.barometricPressureMmHg} mmHg`
  return (
    <>
      <h2 className="text-xl font-bold">{unit.name}</h2>
      <p>
        {unit.timeZone}, {unit.altitudeM} m{pressure}
      </p>
      <p className="text-muted">
        {beds.length === 0
          ? 'No beds yet.'
          : `${beds.length} ${beds.length === 1 ? 'bed' : 'beds'}: ${beds.map((bed) => bed.label).join(', ')}`}
      </p>
    </>
  )
}
