import { ButtonLink } from '@/components/ui/button'

/** What stands on Today before the first patient. */
export function EmptyUnit({ unitId, mayAdmit }: { unitId: string; mayAdmit: boolean }) {
  return (
    <div className="max-w-reading py-10">
      <p>Nobody is ventilated in this unit. Every ventilated patient will stand here with the day so far and the next move.</p>
      {mayAdmit ? (
        <>
          <p className="mt-2">Begin by admitting a patient to a bed and recording when ventilation began.</p>
          <ButtonLink href={`/units/${unitId}/patients/admit`} variant="primary" className="mt-4">
            Admit a patient
          </ButtonLink>
        </>
      ) : (
        <p className="mt-2">A therapist, nurse or physician of the unit begins by admitting a patient.</p>
      )}
    </div>
  )
}
