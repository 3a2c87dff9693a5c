'use client'

import { useMutation, useQueryClient } from '@tanstack/react-query'
import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { apiPost, failureMessage } from '@/lib/client/api'
import { adminKeys } from '@/lib/client/keys/admin'
import type { UnitAdminDto } from '@/lib/schemas/units'
import { newId } from '@/lib/shared/ids'

/** The beds of a unit, each of which can be taken out of use when it is empty. */
export function BedsInUse({ unit }: { unit: UnitAdminDto }) {
  const queries = useQueryClient()
  const [message, setMessage] = useState<{ text: string; isProblem: boolean }>({ text: '', isProblem: false })
  const retiring = useMutation({
    mutationFn: (bed: { id: string; label: string }) =>
      apiPost(`/api/admin/beds/${bed.id}/retire`, {}, { idempotencyKey: newId() }),
    onSuccess: async (_answer, bed) => {
      await queries.invalidateQueries({ queryKey: adminKeys.root })
      setMessage({ text: `Bed ${bed.label} is out of use. Adding its label brings it back.`, isProblem: false })
    },
    onError: (error) => setMessage({ text: failureMessage(error), isProblem: true }),
  })
  const inUse = unit.beds.filter((bed) => !bed.isRetired)
  const retired = unit.beds.filter((bed) => bed.isRetired)

  return (
    <section aria-label="Beds in use">
      <p role="status" className={message.isProblem ? 'font-semibold text-stop' : 'font-semibold text-calm'}>
        {message.text}
      </p>
      {inUse.length === 0 ? <p className="text-muted">No beds yet.</p> : null}
      <ul>
        {inUse.map((bed) => (
          <li key={bed.id} className="flex items-center justify-between border-t border-line">
            <span className="figure font-semibold">{bed.label}</span>
            <Button
              variant="quiet"
              aria-label={`Take bed ${bed.label} out of use`}
              onClick={() => {
                if (!retiring.isPending) retiring.mutate(bed)
              }}
            >
              Take out of use
            </Button>
          </li>
        ))}
      </ul>
      {retired.length > 0 ? (
        <p className="mt-3 text-sm text-muted">Out of use: {retired.map((bed) => bed.label).join(', ')}</p>
      ) : null}
    </section>
  )
}
