import type { RecordedDto, TrendsDto } from '@/lib/schemas/patient-page'
import { breathingIndex } from '@/lib/weaning/indices/breathing-index'
import { minuteVentilation } from '@/lib/weaning/indices/minute-ventilation'
import { pfRatio } from '@/lib/weaning/indices/pf-ratio'
import type { Reading } from '@/lib/weaning/readings'

const valueOf = (reading: Reading): number | null => (reading.known ? reading.value : null)

/** Series over the episode from current entries, earliest first. Indices are computed for adults only. */
export function toTrends(recorded: RecordedDto[], isAdult: boolean | null): TrendsDto {
  const current = recorded.filter((one) => !one.isWithdrawn).sort((a, b) => a.entry.observedAt - b.entry.observedAt)
  return {
    settings: current.flatMap((one) => {
      if (one.kind !== 'settings') return []
      const { entry } = one
      const breathsPerMin = entry.measuredRatePerMin
      const tidalVolumeMl = entry.measuredTidalVolumeMl
      return [
        {
          atMs: entry.observedAt,
          fio2Fraction: entry.fio2Fraction,
          peepCmH2O: entry.peepCmH2O,
          ratePerMin: breathsPerMin,
          tidalVolumeMl,
          spo2Percent: entry.spo2Percent,
          minuteVentilationLPerMin: valueOf(minuteVentilation({ breathsPerMin, tidalVolumeMl, isAdult })),
        },
      ]
    }),
    rsbi: current.flatMap((one): TrendsDto['rsbi'] => {
      const readings = one.kind === 'screen' || one.kind === 'trial_observation' ? one.entry.readings : null
      const value =
        readings &&
        valueOf(breathingIndex({ breathsPerMin: readings.breathsPerMin, tidalVolumeMl: readings.tidalVolumeMl, isAdult }))
      return value === null ? [] : [{ atMs: one.entry.observedAt, value, from: one.kind === 'screen' ? 'screen' : 'trial' }]
    }),
    gases: current.flatMap((one) => {
      if (one.kind !== 'gas') return []
      const { entry } = one
      return [
        {
          atMs: entry.observedAt,
          ph: entry.ph,
          paCO2MmHg: entry.paCO2MmHg,
          paO2MmHg: entry.paO2MmHg,
          pfRatio: valueOf(pfRatio({ paO2MmHg: entry.paO2MmHg, fio2Fraction: entry.fio2Fraction, isAdult })),
        },
      ]
    }),
  }
}
