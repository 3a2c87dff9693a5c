import Link from 'next/link'
import { Notice } from '@/components/ui/notice'

/** Why nothing is computed for this patient; nothing is drawn for an adult. */
export function AdultsOnly({
  isAdult,
  patientId,
  mayCorrect,
}: {
  isAdult: boolean | null
  patientId: string
  mayCorrect: boolean
}) {
  if (isAdult === true) return null
  if (isAdult === false) {
    return (
      <Notice tone="wait" title="Adults only" className="mb-6">
        This patient is under 18. Criteria, indices and stop rules here were published for adults, so none is computed, and no
        next step is derived. Settings, gases and airway events can be recorded.
      </Notice>
    )
  }
  return (
    <Notice tone="wait" title="Age not known" className="mb-6">
      Criteria and indices are computed for adults only, and the date of birth is not recorded.{' '}
      {mayCorrect ? (
        <Link href={`/patients/${patientId}/correct`}>Record the date of birth</Link>
      ) : (
        'Somebody of the unit has to record it.'
      )}
    </Notice>
  )
}
