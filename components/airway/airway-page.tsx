'use client'

import { zodResolver } from '@hookform/resolvers/zod'
import { useForm } from 'react-hook-form'
import { BedsideForm } from '@/components/episodes/bedside-form'
import { useServerNow } from '@/components/episodes/use-server-now'
import { ChoiceField } from '@/components/forms/choice-field'
import { TextareaField } from '@/components/forms/textarea-field'
import { Notice } from '@/components/ui/notice'
import { wallClock } from '@/lib/client/wall-clock'
import { recordAirwaySchema } from '@/lib/schemas/airway'
import type { AirwayFormDto } from '@/lib/schemas/bedside-forms'
import { sentenceCase } from '@/lib/weaning/sentence-case'
import { AIRWAY_EVENT_WORDS } from '@/lib/weaning/words'

/** What happens to the airway while ventilation goes on; its begin and end have pages of their own. */
export function AirwayPage({ dto }: { dto: AirwayFormDto }) {
  const nowMs = useServerNow(dto.nowMs)
  const { amending, patient } = dto
  const form = useForm({
    resolver: zodResolver(recordAirwaySchema),
    defaultValues: {
      episodeId: patient.episodeId,
      observed: amending ? wallClock(amending.observedAt, patient.timeZone) : dto.wallClock,
      amends: amending ? { id: amending.id, reason: '' } : null,
      reason: amending?.reason ?? null,
      ...(amending ? { event: 'tracheostomy_placed' as const } : {}),
    },
  })
  return (
    <BedsideForm
      dto={dto}
      form={form}
      title="Airway event"
      path={`/api/episodes/${patient.episodeId}/airway`}
      mayRecord={dto.may.record}
      nowMs={nowMs}
    >
      {patient.airway === 'tracheostomy' && !amending ? (
        <Notice tone="info">A tracheostomy stands on record for this patient already.</Notice>
      ) : null}
      <ChoiceField
        control={form.control}
        name="event"
        label="What happened"
        options={[{ value: 'tracheostomy_placed', label: sentenceCase(AIRWAY_EVENT_WORDS.tracheostomy_placed) }]}
      />
      <TextareaField control={form.control} name="reason" label="Remark (may stay empty)" />
      <p className="text-muted">Extubation, planned or not, is recorded under “End ventilation”.</p>
    </BedsideForm>
  )
}
