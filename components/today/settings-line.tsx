import type { TodayRowDto } from '@/lib/schemas/today'
import { EXCUSE_WORDS } from '@/lib/weaning/words'

/** Ventilator day and current settings in one line, values in the tabular face. */
export function SettingsLine({ row }: { row: TodayRowDto }) {
  // Settings are current only while the patient is ventilated.
  const settings = row.endedAtMs === null ? row.settings : null
  return (
    <p className="text-sm text-muted">
      <Measured label={row.endedAtMs === null ? 'day' : 'last ventilator day'}>{row.ventilatorDayNumber}</Measured>
      {row.airway === 'tracheostomy' ? ' · tracheostomy' : null}
      {row.excuse ? ` · ${EXCUSE_WORDS[row.excuse]}` : null}
      {settings ? (
        <>
          {' '}
          · {settings.mode} · <Measured label="FiO2">{settings.fio2Fraction.toFixed(2)}</Measured> ·{' '}
          <Measured label="PEEP">{settings.peepCmH2O}</Measured>
        </>
      ) : row.endedAtMs === null ? (
        ' · no settings recorded'
      ) : null}
    </p>
  )
}

function Figure({ children }: { children: string | number }) {
  return <span className="figure text-ink">{children}</span>
}

function Measured({ label, children }: { label: string; children: string | number }) {
  return (
    <span className="whitespace-nowrap">
      {label} <Figure>{children}</Figure>
    </span>
  )
}
