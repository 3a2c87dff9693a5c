import { ButtonLink } from '@/components/ui/button'
import type { PatientPageDto } from '@/lib/schemas/patient-page'

/** What the reader's role lets them record here: the day's steps first, then values, then the stay. */
export function PatientActions({ page }: { page: PatientPageDto }) {
  const { may, episode, patient, stay } = page
  const isVentilated = episode !== null && episode.endedAt === null
  const at = (path: string) => `/episodes/${episode?.id ?? ''}/${path}`
  const steps = isVentilated
    ? [
        may['screen.record'] ? { href: at('screen'), label: 'Screen' } : null,
        may['hold.start'] || may['hold.observe'] ? { href: at('hold'), label: 'Sedation hold' } : null,
        may['trial.start'] || may['trial.observe'] ? { href: at('trial'), label: 'Breathing trial' } : null,
        may['decision.sign'] ? { href: at('decision'), label: 'Decision' } : null,
        may['settings.record'] ? { href: at('settings'), label: 'Settings' } : null,
        may['gas.record'] ? { href: at('gases'), label: 'Blood gas' } : null,
        may['airway.record'] ? { href: at('airway'), label: 'Airway event' } : null,
        may['episode.end'] ? { href: at('end'), label: 'End ventilation' } : null,
      ]
    : [
        may['episode.begin'] && stay.endedAt === null
          ? { href: `/patients/${patient.id}/begin`, label: 'Begin ventilation' }
          : null,
      ]
  const others = [
    stay.endedAt === null && may['stay.move'] ? { href: `/patients/${patient.id}/move`, label: 'Move or leave' } : null,
    may['patient.correct'] ? { href: `/patients/${patient.id}/correct`, label: 'Correct who this is' } : null,
  ]
  const all = [...steps, ...others].filter((each) => each !== null)
  if (all.length === 0) return null
  return (
    <nav aria-label="Record for this patient" className="no-print flex flex-wrap gap-2">
      {all.map(({ href, label }) => (
        <ButtonLink key={href} href={href} prefetch={false}>
          {label}
        </ButtonLink>
      ))}
    </nav>
  )
}
