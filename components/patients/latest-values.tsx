import type { ReactNode } from 'react'
import { readingText } from '@/components/episodes/reading-label'
import { LabelledValue } from '@/components/ui/value'
import { clockTime } from '@/lib/client/wall-clock'
import { formatDuration } from '@/lib/shared/format'
import type { PatientPageDto } from '@/lib/schemas/patient-page'
import type { UnknownReason } from '@/lib/weaning/readings'
import { MODE_WORDS, UNKNOWN_WORDS } from '@/lib/weaning/words'

/** The latest settings and gas, large, each group with its time and age. */
export function LatestValues({ page, nowMs }: { page: PatientPageDto; nowMs: number }) {
  const { settings, gas } = page.latest
  const perKg = page.tidalVolumePerKg.reading
  const minuteVolume =
    settings && settings.measuredRatePerMin !== null && settings.measuredTidalVolumeMl !== null
      ? (page.trends.settings.find(({ atMs }) => atMs === settings.observedAt)?.minuteVentilationLPerMin ?? null)
      : null
  const volume = settings ? (settings.measuredTidalVolumeMl ?? settings.setTidalVolumeMl) : null
  const rate = settings ? (settings.measuredRatePerMin ?? settings.setRatePerMin) : null
  const pf = gas ? (page.trends.gases.find(({ atMs }) => atMs === gas.observedAt)?.pfRatio ?? null) : null
  return (
    <div className="flex flex-col gap-6">
      <Group title="Ventilator" at={settings?.observedAt ?? null} page={page} nowMs={nowMs} none="No settings recorded yet.">
        {settings ? (
          <>
            <LabelledValue label="Mode" value={settings.mode}>
              <p className="text-sm text-muted">{MODE_WORDS[settings.mode]}</p>
            </LabelledValue>
            <LabelledValue label="FiO2" value={readingText('fio2Fraction', settings.fio2Fraction)} />
            <LabelledValue label="PEEP" value={readingText('peepCmH2O', settings.peepCmH2O)} unit="cmH2O" />
            <LabelledValue
              label={settings.measuredRatePerMin === null ? 'Rate, set' : 'Rate, measured'}
              value={rate === null ? null : String(rate)}
              unit="/min"
            />
            <LabelledValue
              label={settings.measuredTidalVolumeMl === null ? 'Tidal volume, set' : 'Tidal volume, measured'}
              value={volume === null ? null : String(volume)}
              unit="mL"
            >
              <p className="text-sm text-muted">
                {perKg.known ? `${perKg.value.toFixed(1)} mL/kg PBW` : perKgReason(perKg.reason)}
              </p>
            </LabelledValue>
            <LabelledValue
              label="Minute ventilation"
              value={minuteVolume === null ? null : minuteVolume.toFixed(1)}
              unit="L/min"
            />
            <LabelledValue label="SpO2" value={settings.spo2Percent === null ? null : String(settings.spo2Percent)} unit="%" />
          </>
        ) : null}
      </Group>
      <Group title="Blood gas" at={gas?.observedAt ?? null} page={page} nowMs={nowMs} none="No blood gas recorded yet.">
        {gas ? (
          <>
            <LabelledValue label="pH" value={readingText('ph', gas.ph)} />
            <LabelledValue label="PaCO2" value={String(gas.paCO2MmHg)} unit="mmHg" />
            <LabelledValue label="PaO2" value={String(gas.paO2MmHg)} unit="mmHg">
              <p className="text-sm text-muted">on FiO2 {readingText('fio2Fraction', gas.fio2Fraction)}</p>
            </LabelledValue>
            <LabelledValue
              label="P/F ratio"
              value={pf === null ? null : String(Math.round(pf))}
              unit="mmHg"
              missing="not computed"
            >
              <p className="text-sm text-muted">not corrected for altitude</p>
            </LabelledValue>
          </>
        ) : null}
      </Group>
    </div>
  )
}

function perKgReason(reason: UnknownReason): string {
  return reason === 'missing' ? 'mL/kg not computed: height, sex or volume not recorded' : `mL/kg ${UNKNOWN_WORDS[reason]}`
}

type GroupProps = { title: string; at: number | null; page: PatientPageDto; nowMs: number; none: string; children: ReactNode }

function Group({ title, at, page, nowMs, none, children }: GroupProps) {
  return (
    <section aria-label={title}>
      <h3 className="mb-2 flex flex-wrap items-baseline gap-x-3">
        <span className="font-semibold">{title}</span>
        <span className="text-sm text-muted">
          {at === null ? none : `${clockTime(at, page.unit.timeZone, nowMs)}, ${formatDuration(nowMs - at)} ago`}
        </span>
      </h3>
      {at === null ? null : <dl className="grid grid-cols-2 gap-x-6 gap-y-4 tablet:grid-cols-4 desk:grid-cols-7">{children}</dl>}
    </section>
  )
}
