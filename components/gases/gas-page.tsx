'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm, useWatch } from 'react-hook-form'
import { BedsideForm } from '@/components/episodes/bedside-form'
import { ReadingField } from '@/components/episodes/reading-field'
import { useServerNow } from '@/components/episodes/use-server-now'
import { Value } from '@/components/ui/value'
import { wallClock } from '@/lib/client/wall-clock'
import type { GasFormDto } from '@/lib/schemas/bedside-forms'
import { recordGasSchema } from '@/lib/schemas/gases'
import { pfRatio } from '@/lib/weaning/indices/pf-ratio'

const NEEDED = ['ph', 'paCO2MmHg', 'paO2MmHg', 'fio2Fraction'] as const
const FURTHER = ['bicarbonateMmolPerL', 'lactateMmolPerL', 'haemoglobinGPerDl'] as const

/** An arterial blood gas with the FiO2 at which it was drawn. */
export function GasPage({ dto }: { dto: GasFormDto }) {
  const nowMs = useServerNow(dto.nowMs)
  const { patient } = dto
  const form = useGasForm(dto)
  return (
    <BedsideForm
      dto={dto}
      form={form}
      title="Blood gas"
      path={`/api/episodes/${patient.episodeId}/gases`}
      mayRecord={dto.may.record}
      nowMs={nowMs}
    >
      <div className="flex flex-wrap gap-x-6 gap-y-4">
        {NEEDED.map((name) => (
          <ReadingField
            key={name}
            form={form}
            name={name}
            reading={name}
            label={name === 'fio2Fraction' ? 'FiO2 when drawn' : undefined}
          />
        ))}
      </div>
      <PfLine form={form} isAdult={patient.isAdult} />
      <div className="flex flex-wrap gap-x-6 gap-y-4">
        {FURTHER.map((name) => (
          <ReadingField key={name} form={form} name={name} reading={name} hint="may stay empty" />
        ))}
      </div>
    </BedsideForm>
  )
}

function useGasForm({ amending, patient, wallClock: now }: GasFormDto) {
  return useForm({
    resolver: zodResolver(recordGasSchema),
    defaultValues: {
      episodeId: patient.episodeId,
      observed: amending ? wallClock(amending.observedAt, patient.timeZone) : now,
      amends: amending ? { id: amending.id, reason: '' } : null,
      confirmedUnlikely: amending?.unlikely ?? [],
      bicarbonateMmolPerL: amending?.bicarbonateMmolPerL ?? null,
      lactateMmolPerL: amending?.lactateMmolPerL ?? null,
      haemoglobinGPerDl: amending?.haemoglobinGPerDl ?? null,
      ...(amending
        ? { ph: amending.ph, paCO2MmHg: amending.paCO2MmHg, paO2MmHg: amending.paO2MmHg, fio2Fraction: amending.fio2Fraction }
        : {}),
    },
  })
}

type GasForm = ReturnType<typeof useGasForm>

/** P/F of what is typed, as it stands. */
function PfLine({ form, isAdult }: { form: GasForm; isAdult: boolean | null }) {
  const [paO2MmHg = null, fio2Fraction = null] = useWatch({ control: form.control, name: ['paO2MmHg', 'fio2Fraction'] })
  const ratio = pfRatio({ paO2MmHg, fio2Fraction, isAdult })
  return (
    <p role="status" className="flex flex-wrap items-baseline gap-2">
      <span className="text-muted">P/F ratio, computed</span>
      <Value value={ratio.known ? ratio.value.toFixed(0) : null} unit="mmHg" missing="not computed yet" />
    </p>
  )
}
